/** Words of convergence studies. */
import type { MethodName } from '@/pricing/contract';
import type { StudyStatus } from '@/shared/contracts/studies';

/** The scheme that a route computes with, as it is spoken of in a sentence about its order. */
const schemes: Record<MethodName, string> = {
  'closed-form': 'the closed form',
  'heat-crank-nicolson': 'Crank–Nicolson with four damped half-steps',
  'heat-explicit': 'the explicit step at a fixed k/h²',
  'heat-implicit': 'the implicit step',
  'spectral-boundary': 'the collocation',
  'lattice-crr': 'the binomial tree',
  'lattice-symmetric': 'the plain walk',
  'lattice-jarrow-rudd': 'the tree of Jarrow and Rudd',
  'lattice-tian': 'the tree of Tian',
  'lattice-trinomial': 'the tree of three branches',
  'lattice-leisen-reimer': 'the tree of Leisen and Reimer',
};

const seriesWords = { all: 'Order', odd: 'Odd lengths: order', even: 'Even lengths: order' };

const verdictWords = {
  'as-expected': 'as expected',
  lower: 'lower than expected',
  higher: 'higher than expected',
  'not-determined': 'not determined',
};

type Fit = {
  series: keyof typeof seriesWords;
  points: number;
  order: number | null;
  standardError: number | null;
  verdict: 'as-expected' | 'lower' | 'higher' | 'not-determined';
};

/** Two decimals, and more where the standard error needs them to be seen. */
function uncertain(order: number, standardError: number): string {
  const decimals = standardError >= 0.005 ? 2 : standardError >= 0.0005 ? 3 : 4;
  return `${order.toFixed(decimals)} ± ${standardError.toFixed(decimals)}`;
}

function orderSentence(name: MethodName, expected: number, fit: Fit): string {
  const word = seriesWords[fit.series];
  if (fit.order === null || fit.standardError === null)
    return `${word} not determined: three rows with errors above the reference’s own are needed, and there are ${fit.points}`;
  const measured = `${word} ${uncertain(fit.order, fit.standardError)}`;
  switch (fit.verdict) {
    case 'as-expected':
      return `${measured}, as expected of ${schemes[name]}`;
    case 'lower':
      return `${measured}, lower than expected: ${schemes[name]} should reach ${expected}`;
    case 'higher':
      return `${measured}, higher than the ${expected} expected of ${schemes[name]}`;
    case 'not-determined':
      return `${measured}, not determined: the errors wander too much to tell an order`;
  }
}

export const studiesText = {
  title: 'Studies',
  caption: 'Convergence studies of the desk, newest first',
  study: (number: string) => `Study ${number}`,
  start: 'Start a study',
  back: 'All studies',
  emptyTitle: 'No study yet',
  emptyBody: 'A study shows how a value settles as its grid or walk is refined, and at what order.',
  nothingTitle: 'No study in this state',
  nothingBody: 'Choose another state, or show all.',
  showAll: 'Show all',
  state: 'State',
  stateColumn: 'state',
  anyState: 'any',
  number: 'study',
  terms: 'of',
  order: 'order',
  found: (
    route: string,
    series: Fit['series'],
    order: number | null,
    standardError: number | null,
    verdict: Fit['verdict'],
  ) => {
    const which = series === 'all' ? route : `${route}, ${series}`;
    const measured =
      order === null || standardError === null ? '' : ` ${uncertain(order, standardError)}`;
    return `${which}:${measured} ${verdictWords[verdict]}`;
  },
  started: 'started',
  trade: (number: string) => `Trade ${number}`,
  quote: (number: string) => `Quote ${number}`,
  statuses: {
    queued: 'waiting',
    running: 'computing',
    finished: 'to be decided',
    cancelled: 'stopped',
    'signed-off': 'signed off',
    'sent-back': 'sent back',
  } satisfies Record<StudyStatus, string>,
  question: (labels: readonly string[]) =>
    labels.length === 1 ? `Does the ${labels[0]} converge?` : 'Do these methods converge?',
  of: (kind: 'trade' | 'quote' | 'free', number: string | null) =>
    kind === 'free' || number === null ? 'Study of free terms' : `Study of ${kind} ${number}`,
  orderSentence,
  progress: (done: number, total: number) => `${done} of ${total} rows`,
  progressNote: 'You may close this page: the rows are computed on the server and stay here.',
  stop: 'Stop',
  download: 'Download CSV',
  against: (route: string, error: string) => `against ${route}, error below ${error}`,
  sameMachinery:
    'The reference is this same grid, refined further: it tells the order, not that the grid is right.',
  pastLimit: 'Past the stability limit',
  stability: (value: string) => `k/h² is ${value} in the last row: no limit for this scheme.`,
  digitsNote: 'Digits that have settled stand in ink, those still moving in grey.',
  columns: {
    grid: 'space × time',
    steps: 'steps',
    value: (currency: string, unit: string) => `value, ${currency} / ${unit}`,
    error: 'error',
    ratio: 'ratio',
    order: 'order',
    richardson: 'Richardson',
    stability: 'k/h²',
    time: 'time',
  },
  series: { all: 'row by row', odd: 'odd lengths', even: 'even lengths' },
  seriesOf: (route: string, series: string) => `${route}, ${series}`,
  unstable: (factor: string) => `unstable, ×${factor} a step`,
  noValue: 'no value',
  belowReference: 'below the reference’s own error; not part of the order',
  decisionTitle: 'Decision',
  comment: 'Comment',
  commentHint: 'Others will read it with the study.',
  signOff: 'Sign off',
  sendBack: 'Send back',
  decisionNote:
    'Signing off records that you found these orders sufficient. It asks for your password, and neither it nor sending back can be undone.',
  ownStudy: 'You started this study, so that another risk officer decides.',
  waitsForOfficer: 'A risk officer who did not start it decides.',
  decided: {
    'signed-off': (name: string, at: string) => `Signed off by ${name}, ${at}`,
    'sent-back': (name: string, at: string) => `Sent back by ${name}, ${at}`,
  },
  caution:
    'A model value is indicative. One volatility per strike and expiry and moves without jumps are assumed; that a method converges says that the sums are right, not that the model is.',
} as const;

export const studyChartText = {
  title: (route: string) => `Error against size, ${route}`,
  series: 'rows',
  error: (currency: string) => `error, ${currency}`,
  size: { grid: 'space steps', steps: 'steps' },
  slope: (order: number) => `slope ${order}`,
  showTable: 'show as table',
  showChart: 'show as chart',
  empty: 'The chart begins with the second row.',
  readOut: (size: number, error: string) => `${size}: error ${error}`,
  hint: 'Arrow keys move from point to point.',
} as const;

export const newStudyText = {
  title: 'New study',
  ofQuote: (number: string) => `Quote ${number}`,
  ofTrade: (number: string) => `Trade ${number}`,
  tradeNote:
    'Priced on an approved close, at the desk’s cut-off of its day, as a valuation run does.',
  termsTitle: 'What is studied',
  freeNote: 'The terms as they stand on your ticket; a change here is a change there.',
  methodsTitle: 'Methods and ladders',
  methodsNote:
    'Each size is at least twice the one before. Walks are run with odd and even lengths side by side, that of Leisen and Reimer with odd lengths only; the explicit grid adds one row past its limit.',
  rows: 'Rows in each ladder',
  rowsHint: 'An order needs three; a further row costs about four times the one before.',
  chooseMethod: 'Choose at least one method.',
  act: 'Start the study',
  starting: 'Starting',
} as const;
