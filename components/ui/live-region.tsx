/** Says changes to those who cannot see them; polite, so that it never cuts a sentence off. */
export function LiveRegion({ text }: { text: string }) {
  return (
    <div className="visually-hidden" aria-live="polite" role="status">
      {text}
    </div>
  );
}
