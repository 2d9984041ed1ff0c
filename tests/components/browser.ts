/** What jsdom lacks of a browser and the components use. */

/** A window that is wide, or narrow, as `matchMedia` tells it. */
export function playWindow({ wide }: { wide: boolean }): void {
  window.matchMedia = (query) =>
    ({
      matches: wide && query.includes('min-width'),
      media: query,
      addEventListener: () => undefined,
      removeEventListener: () => undefined,
    }) as unknown as MediaQueryList;
}

/** jsdom knows the dialog element, but not how to open it. */
export function playDialogs(): void {
  HTMLDialogElement.prototype.showModal = function showModal() {
    this.setAttribute('open', '');
    this.querySelector<HTMLElement>('button, input, select, textarea')?.focus();
  };
  HTMLDialogElement.prototype.close = function close() {
    this.removeAttribute('open');
  };
}
