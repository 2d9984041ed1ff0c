import { useId, type ReactNode } from 'react';

/** What every field shares: its label, one line of help, and what is wrong with it. */
export type FieldFrameProps = {
  label: string;
  hint?: string;
  error?: string;
};

export function useFieldIds({ hint, error }: FieldFrameProps, unit?: string) {
  const base = useId();
  const described = [
    unit ? `${base}-unit` : null,
    error ? `${base}-error` : null,
    hint ? `${base}-hint` : null,
  ].filter((id) => id !== null);
  return {
    base,
    control: `${base}-control`,
    label: `${base}-label`,
    describedBy: described.length > 0 ? described.join(' ') : undefined,
  };
}

/** Error and hint below the box; the error is announced when it appears. */
export function FieldNotes({ base, hint, error }: { base: string; hint?: string; error?: string }) {
  return (
    <>
      {error ? (
        <p className="field-error" id={`${base}-error`} role="alert">
          {error}
        </p>
      ) : null}
      {hint ? (
        <p className="field-note" id={`${base}-hint`}>
          {hint}
        </p>
      ) : null}
    </>
  );
}

export function FieldBox({
  invalid,
  disabled,
  children,
}: {
  invalid: boolean;
  disabled?: boolean;
  children: ReactNode;
}) {
  return (
    <div className="field-box" data-invalid={invalid} data-disabled={disabled ?? false}>
      {children}
    </div>
  );
}
