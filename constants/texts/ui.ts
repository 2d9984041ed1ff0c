/** Words of the design system itself. */
export const uiText = {
  close: 'Close',
  cancel: 'Cancel',
  tryAgain: 'Try again',
  loading: 'Loading',
  showMore: 'Show more',
  requestId: (id: string) => `Request id ${id}`,
  skipToContent: 'Skip to the content',
  product: 'Driftless',
} as const;
