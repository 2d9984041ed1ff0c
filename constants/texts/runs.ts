/** Words of valuation runs: their list, how one is started, its page, its exceptions, its sign-off. */
import type { ExceptionAnswer, ExceptionKind, RunCounts, RunStatus } from '@/shared/contracts/runs';

const many = (count: number, one: string, several: string) =>
  count === 1 ? `1 ${one}` : `${count} ${several}`;

const countWords: Record<keyof RunCounts, string> = {
  agree: 'agree',
  wide: 'wide',
  disagree: 'disagree',
  oneRoute: 'one route',
  failed: 'without value',
  refuted: 'estimate refuted',
};

export const runsText = {
  title: 'Runs',
  subtitle: 'Every live trade of some books, valued on one approved close',
  caption: 'Valuation runs of the desk, newest first',
  start: 'Start a run',
  back: 'All runs',
  run: (number: string) => `Run ${number}`,
  emptyTitle: 'No run yet',
  emptyBody:
    'A run values the live trades of some books by two routes on one approved close, and shows first what does not agree.',
  nothingTitle: 'No run fits',
  nothingBody: 'Nothing on this desk fits both of these filters.',
  showAll: 'Show all runs',
  state: 'State',
  anyState: 'any state',
  book: 'Book',
  anyBook: 'any book',
  statuses: {
    queued: 'waiting',
    running: 'running',
    finished: 'to be signed off',
    cancelled: 'cancelled',
    'signed-off': 'signed off',
  } satisfies Record<RunStatus, string>,
  columns: {
    number: 'run',
    close: 'close of',
    books: 'books',
    state: 'state',
    found: 'found',
    exceptions: 'exceptions',
    started: 'started',
    signedOff: 'signed off',
  },
  counted: (name: keyof RunCounts, count: number) => `${count} ${countWords[name]}`,
  exceptionsOf: (open: number, all: number) => {
    if (all === 0) return 'none';
    return open === 0 ? `${all}, all answered` : `${open} of ${all} open`;
  },
  openExceptions: (open: number) => `${open} open`,
  progress: (done: number, total: number) => `${done} of ${many(total, 'trade', 'trades')}`,
  by: (name: string, at: string) => `${name}, ${at}`,
} as const;

export const newRunText = {
  title: 'New run',
  booksTitle: 'Which books',
  noBooksTitle: 'The desk has no book yet',
  noBooksBody: 'A run values the live trades of books. A desk head opens the first one.',
  openBooks: 'Open the books',
  live: (count: number) => (count === 0 ? 'no live trade' : `${count} live`),
  allBooks: 'All books',
  closeTitle: 'On which close',
  close: 'Approved close',
  closeHint: 'Only closes that someone independent has approved, newest first.',
  earlierCloses: 'Show earlier closes',
  latest: (date: string) => `${date}, the latest`,
  noCloseTitle: 'No close is approved yet',
  noCloseBody: 'A run stands on a close that a risk officer has approved.',
  openCloses: 'Open the market data',
  policyTitle: 'By which policy',
  policyInForce: (number: number) => `Policy ${number}, in force`,
  noPolicyTitle: 'No pricing policy is in force',
  noPolicyBody:
    'The policy says by which routes trades are valued and how far those may lie apart. One risk officer writes it, another approves it.',
  openPolicy: 'Open the policy',
  willTitle: 'What will happen',
  will: (trades: number, books: number, date: string) =>
    `${many(trades, 'live trade', 'live trades')} of ${many(books, 'book', 'books')} ${
      trades === 1 ? 'is' : 'are'
    } valued on the close of ${date}, each by two routes. Trades that had expired by then, or were agreed only later, are left out.`,
  nothingLive: 'The chosen books have no live trade, so that there is nothing to value.',
  waitsForChoice: 'Choose the books first.',
  background: 'The run goes on when this page is closed; its values are sealed as they are found.',
  act: 'Start the run',
  starting: 'Starting',
  unsent: 'The server did not answer. Press again: it is started once, however often it is sent.',
} as const;

export const runText = {
  heading: {
    queued: (number: string) => `Run ${number} waits to be worked off`,
    running: (done: number, total: number) => `${done} of ${total} trades are valued`,
    cancelled: (done: number, total: number) => `Cancelled after ${done} of ${total} trades`,
  },
  allAgree: (total: number) => (total === 1 ? 'The one value agrees' : `All ${total} values agree`),
  someAgree: (agree: number, total: number) => `${agree} of ${total} values agree`,
  need: (open: number) => (open === 1 ? '1 needs an answer' : `${open} need an answer`),
  answered: 'all exceptions are answered',
  closeOf: (date: string) => `close of ${date}`,
  policy: (number: number) => `policy ${number}`,
  startedBy: (name: string, at: string) => `started by ${name}, ${at}`,
  repeats: (number: string) => `repeats run ${number}`,

  progress: 'Progress of the run',
  valued: (done: number, total: number) => `${done} of ${many(total, 'trade', 'trades')} valued`,
  timeLeft: (words: string) => `about ${words} left`,
  seconds: (count: number) => `${count} s`,
  minutes: (count: number) => `${count} min`,
  waits: 'Waits for a worker',
  background: 'You may close this page: the run goes on, and is listed under Runs.',
  cancel: 'Cancel the run',
  cancelTitle: (number: string) => `Cancel run ${number}`,
  willCancel: (done: number) =>
    done === 0
      ? 'Nothing is valued yet, and nothing will be.'
      : `What has been valued so far stays in the history; the rest is not valued.`,
  cancelFoot: 'A cancelled run cannot be signed off; it can be run again.',
  keepRunning: 'Let it run',
  cancelledBy: (name: string, at: string) => `Cancelled by ${name}, ${at}`,
  cancelledBody:
    'What was valued before stays in the history. Run it again to have every trade valued.',

  rerun: 'Run again',
  rerunTitle: (number: string) => `Run ${number} again`,
  willRerun: (books: string, date: string) =>
    `The same books (${books}) are valued on the close of ${date} once more, under the policy and the terms in force now.`,
  rerunAnswers: 'It answers those exceptions of this run whose routes then agree.',
  rerunFoot: 'It is a run of its own, which you start; this one stays as it is.',
  rerunIs: (number: string, state: string) => `Run ${number}, ${state}`,

  factsTitle: 'What it stands on',
  close: 'Close',
  valuedAt: 'Valued as of',
  policyName: 'Policy',
  books: 'Books',
  tradesName: 'Trades',
  tradesOf: (total: number, leftOut: number) =>
    leftOut === 0
      ? `${total}`
      : `${total}; ${leftOut} left out: expired by then, or agreed only later`,
  engine: 'Engine',
  started: 'Started',
  finished: 'Finished',
  identifier: 'Identifier',
  history: 'Its values in the history',

  totalsTitle: 'What the books are worth',
  totalsNote: 'Amounts of different currencies are never added.',
  currency: 'currency',
  total: 'positions',
  before: (date: string) => `close of ${date}`,
  change: 'change',
  firstRun: 'These books have no finished run on an earlier close to compare with.',
  comparedWith: (number: string) => `Compared with run ${number}`,
} as const;

export const exceptionText = {
  title: 'Exceptions',
  none: 'Nothing to answer: every value was checked by a second route, and they agree.',
  noneSoFar: 'No exceptions so far.',
  kinds: {
    failure: 'no value',
    disagree: 'disagree',
    refuted: 'estimate refuted',
    unchecked: 'unchecked',
    wide: 'wide',
  } satisfies Record<ExceptionKind, string>,
  show: 'Show',
  all: 'all',
  open: 'open',
  answered: 'answered',
  kind: 'Kind',
  anyKind: 'any kind',
  nothing: 'No exception fits both of these filters.',
  caption: 'Exceptions, open ones first, the gravest on top',
  apart: (money: string) => `${money} apart on the position`,
  unknownMateriality: 'How much it matters is not known: a route gave no value.',
  failed: (route: string, message: string) => `${route} gave no value. ${message}`,
  why: 'Show why',
  whyNot: 'Hide',
  figuresCaption: (trade: string) => `Routes of ${trade}`,
  roles: { primary: 'values', check: 'checks' },
  route: 'route',
  value: (currency: string, unit: string) => `value, ${currency} / ${unit}`,
  estimate: '±',
  noValue: 'no value',
  apartLabel: 'Apart',
  tolerance: 'Tolerance',
  position: 'Position',
  before: 'Value before',
  beforeIn: (value: string, run: string) => `${value}, run ${run}`,
  noneBefore: 'none: this is the first value',
  valueLink: 'The value with its inputs and settings',
  tradeLink: 'The trade',

  answerTitle: 'Answer it',
  study: 'Answer by a study',
  startStudy: 'Start a study',
  override: 'Write a note',
  rerun: 'Run again',
  ownRun: 'You started this run: a note on its values is somebody else’s to write.',
  ownTrade:
    'You proposed, amended or approved this trade: a note on its value is somebody else’s to write.',
  mayNot: 'It is answered by a convergence study, a note of somebody independent, or a new run.',

  overrideTitle: (trade: string) => `Note on ${trade}`,
  overrideValue: 'Value to use instead',
  overrideUnit: (currency: string, unit: string) => `${currency} / ${unit}`,
  overrideHint: 'Leave it empty to keep the model’s value with your reason.',
  reason: 'Reason',
  reasonHint: 'It is sealed in the desk’s records; whoever signs off reads it.',
  willKeep: (trade: string, value: string) =>
    `The model’s value of ${trade}, ${value}, is kept with your reason.`,
  willKeepNothing: (trade: string) => `${trade} stays without a value, with your reason.`,
  willOverride: (trade: string, value: string, model: string) =>
    `${value} stands beside the model’s value of ${trade}, ${model}, which stays as it is.`,
  willOverrideNothing: (trade: string, value: string) =>
    `${value} stands in for ${trade}, of which the model gave no value.`,
  cannotSignOff: 'Whoever writes a note cannot sign this run off afterwards.',
  recorded: 'It is sealed with your name in the desk’s records, and cannot be undone.',
  willHappen: 'What will happen',

  studyTitle: (trade: string) => `Study that answers ${trade}`,
  studyField: 'Study',
  chooseStudy: 'choose a study',
  noStudy: 'Choose the study that answers it.',
  noStudies: 'No study of these terms is finished yet. Start one; it is found here once it is.',
  studyOption: (number: string, state: string, name: string) => `${number}, ${state}, ${name}`,
  finding: 'What it shows',
  findingHint: 'In a sentence: which route is right, and to how much.',
  willLink: (trade: string) =>
    `The study stands as the answer to ${trade}; the value itself is not changed.`,
  staleTitle: 'Someone was first',
  staleBody: 'It has been read again; look at it, then decide once more.',

  answers: {
    study: 'Answered by study',
    override: 'Answered by a note',
    rerun: 'Answered by run',
  } satisfies Record<ExceptionAnswer['kind'], string>,
  overridden: (value: string, model: string) => `${value} beside the model’s ${model}`,
  kept: 'The model’s value is kept.',
  by: (name: string, at: string) => `${name}, ${at}`,
} as const;

export const valuesText = {
  title: 'All values',
  soFar: 'Values so far',
  caption: 'Values of the run, exceptions first',
  verdict: 'Verdict',
  anyVerdict: 'any verdict',
  book: 'Book',
  anyBook: 'any book',
  trade: 'trade',
  noValue: 'no value',
  firstValue: 'first value',
  changed: (change: string) => `change ${change}`,
  openValue: (trade: string, value: string) => `${value}: value of ${trade} with its inputs`,
  empty: 'Nothing was valued.',
  emptySoFar: 'Nothing is valued yet.',
  nothing: 'No value fits both of these filters.',
  clear: 'Clear the filters',
  loadedAll: (count: number) => (count === 1 ? 'The one value.' : `All ${count} values are shown.`),
  columns: {
    terms: 'terms',
    book: 'book',
    value: 'value ±',
    agreement: 'agreement',
    change: 'change',
    total: 'position',
  },
} as const;

export const signOffText = {
  act: 'Sign off',
  title: (number: string) => `Sign off run ${number}`,
  opens: (open: number) =>
    open === 1
      ? 'Sign-off opens when the one exception is answered.'
      : `Sign-off opens when the ${open} exceptions are answered.`,
  started: 'You started this run, so that another risk officer signs it off.',
  hadAHand:
    'You touched one of its trades or wrote a note on one of its values, so that another risk officer signs it off.',
  waitsForOfficer:
    'A risk officer signs it off who neither started it nor touched one of its trades.',
  comment: 'Comment',
  commentHint: 'Others will read it with the run.',
  will: (values: string, books: string, date: string) =>
    `${values} of ${books} become the desk’s official ones of ${date}.`,
  values: (total: number) => (total === 1 ? 'The one value' : `The ${total} values`),
  willAnchor: 'The heads of the chain are signed, so that later changes show.',
  foot: 'It is sealed with your name in the desk’s records, and cannot be undone.',
  decided: (name: string, at: string) => `Signed off by ${name}, ${at}`,
} as const;
