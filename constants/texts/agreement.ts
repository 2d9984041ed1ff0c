/** Words of the agreement strip and of what it opens to. */
export const agreementText = {
  agree: (apart: string, tolerance: string) =>
    `Routes agree: they lie ${apart} apart, within the tolerance ${tolerance}.`,
  wideApart: (apart: string, tolerance: string) =>
    `Routes lie ${apart} apart, more than the tolerance ${tolerance}, but no more than their error estimates allow.`,
  wideError: (apart: string, error: string, tolerance: string) =>
    `Routes lie ${apart} apart, but one of them is known only to ${error}, more than the tolerance ${tolerance}.`,
  disagree: (apart: string, tolerance: string) =>
    `Routes differ by ${apart}, more than the tolerance ${tolerance} and than their error estimates allow.`,
  oneRoute: 'One route only: there is nothing to compare it with.',
  unknownError: 'A route gave no error estimate, so there is no agreement to speak of.',
  refuted: 'An error estimate is refuted: the routes lie further apart than their estimates allow.',
  caution: '“Routes agree” says that the sums are right, not that the model is.',
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
  open: 'Show the figures.',
  dialogTitle: 'How far the routes agree',
  route: 'route',
  value: (currency: string) => `value, ${currency}`,
  error: '±',
  apart: 'apart',
  reference: 'reference',
  table: 'Routes with value, error estimate and distance',
} as const;
