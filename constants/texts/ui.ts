/** Words of the design system itself. */
export const uiText = {
  close: 'Close',
  cancel: 'Cancel',
  tryAgain: 'Try again',
  loading: 'Loading',
  requestId: (id: string) => `Request id ${id}`,
  skipToContent: 'Skip to the content',
  product: 'Driftless',
} as const;
