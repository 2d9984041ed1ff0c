/** Words of the design system itself. */
export const uiText = {
  close: 'Close',
  cancel: 'Cancel',
  tryAgain: 'Try again',
  loading: 'Loading',
  requestId: (id: string) => `Request id ${id}`,
  skipToContent: 'Skip to the content',
  product: 'Driftless',
  verdictWord: {
    agree: 'agree',
    wide: 'wide',
    disagree: 'disagree',
    'one-route': 'one route',
  },
  verdictTitle: {
    agree: 'Routes agree',
    wide: 'Agreement is wide',
    disagree: 'Routes differ',
    'one-route': 'One route only',
  },
} as const;
