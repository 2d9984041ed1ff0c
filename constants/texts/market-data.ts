/** Words of the closes: their list, one of them, and the grid in which they are entered. */
const plural = (count: number, one: string, many: string) =>
  count === 1 ? `1 ${one}` : `${count} ${many}`;

export const marketDataText = {
  title: 'Market data',
  caption: 'Closes, newest day first',
  enter: 'Enter a close',
  back: 'Market data',
  stateFilter: 'Show',
  anyState: 'every close',
  statuses: { draft: 'waits for approval', approved: 'approved', superseded: 'superseded' },
  sources: { typed: 'typed or pasted', file: 'from a file', restatement: 'restatement' },
  emptyTitle: 'No close yet',
  emptyBody: 'A ticket starts from the last approved close. Enter the first one.',
  nothingTitle: 'No such close',
  nothingBody: 'No close stands where you asked.',
  showAll: 'Show every close',
  showMore: 'Show earlier closes',
  columns: {
    date: 'day',
    state: 'state',
    source: 'numbers',
    count: 'underlyings',
    entered: 'entered',
    approved: 'approved',
  },
  closeOf: (date: string) => `Close of ${date}`,
  numbers: (source: string, count: number) =>
    `${source}, ${plural(count, 'underlying', 'underlyings')}`,
  enteredBy: (name: string, at: string) => `Entered by ${name}, ${at}`,
  approvedBy: (name: string, at: string) => `Approved by ${name}, ${at}`,
  savedAt: (at: string) => `Saved last ${at}`,
  restates: 'It restates an approved close:',
  restatedClose: 'the close as it was',
  supersededBy: 'A later version has taken its place:',
  laterClose: 'the close as it is now',
  reason: (reason: string) => `Why: ${reason}`,
  change: 'Change the numbers',
  approve: 'Approve',
  restate: 'Restate',
  ownDraft: 'You had a hand in these numbers: someone else approves them.',
  waits: 'These numbers wait for a risk officer.',
  missingTitle: 'Not complete yet',
  missing: (symbols: string) => `${symbols}: no close yet. It is approved when all are filled in.`,
} as const;

export const marketTableText = {
  title: (date: string | null) =>
    date === null ? 'Numbers' : `Numbers, beside the close of ${date}`,
  caption: 'Numbers of each underlying',
  underlying: 'underlying',
  price: 'price',
  before: 'before',
  move: 'move',
  rate: 'rate',
  yield: 'yield',
  volatility: 'volatility',
  volatilityBefore: 'before',
  none: '–',
} as const;

export const marketEditorText = {
  newTitle: 'Enter a close',
  changeTitle: (date: string) => `Change the close of ${date}`,
  date: 'Day of the close',
  dateHint: 'YYYY-MM-DD',
  badDate: 'Give the day as YYYY-MM-DD.',
  restatedDay: 'A restatement keeps its day.',
  gridTitle: 'Numbers',
  gridCaption: 'One row for each underlying',
  pasteHint:
    'Paste rows from a spreadsheet into any cell: rows that begin with a symbol find their place.',
  columns: { price: 'price', rate: 'rate', yield: 'yield', volatility: 'volatility' },
  percent: '%',
  cell: (column: string, symbol: string) => `${column} of ${symbol}`,
  noYield: 'no yield of its own',
  fileTitle: 'From a file',
  fileBody:
    'A CSV file in UTF-8 with commas and decimal points. Reading it changes nothing yet: its problems are listed, or its numbers are put into the grid.',
  chooseFile: 'Read a CSV file',
  sample: 'Sample file',
  sampleName: 'close.csv',
  reading: (name: string) => `Reading ${name}`,
  tooLarge: (name: string, largest: string) =>
    `${name} is larger than ${largest}; a close takes a few kilobytes. It was not sent.`,
  fileTitleOk: (name: string, count: number) =>
    `${name}: ${plural(count, 'close was', 'closes were')} put into the grid`,
  fileOkBody: 'Look at them, then save the draft.',
  fileMissing: (symbols: string) => `Not in the file: ${symbols}.`,
  problemsTitle: (name: string, count: number) =>
    `${name}: ${plural(count, 'problem', 'problems')}, and nothing was taken from it`,
  problemsCaption: 'Problems of the file, by row and column',
  problemColumns: { row: 'row', column: 'column', message: 'what to do' },
  wholeFile: 'file',
  wholeRow: 'whole row',
  problemsLeftOut: (count: number) => `${count} more are not listed; mend these first.`,
  problemPlace: (row: string, column: string) => `row ${row}, ${column}`,
  warningsTitle: 'Unlikely, but allowed',
  confirmWarnings: 'I have looked at each of these',
  confirmFirst: 'Look at the unlikely numbers and confirm them.',
  nothingFilled: 'Fill in the close of at least one underlying.',
  correct: 'Some cells need another look; each one says what to do.',
  pasted: (count: number) => `${plural(count, 'row was', 'rows were')} pasted.`,
  pastedUnknown: (symbols: string) => `Not on this desk, and left out: ${symbols}.`,
  kept: 'What you type is kept in this browser until it is saved.',
  discard: 'Discard what was typed',
  save: 'Save the draft',
  stale:
    'Someone saved this draft meanwhile. Your numbers are still here; look at them and save again.',
} as const;

export const marketActText = {
  willHappen: 'What will happen',
  recorded: 'It is recorded under your name and sealed in the desk’s records.',
  approveTitle: (date: string) => `Approve the close of ${date}`,
  willApprove: (date: string, count: number) =>
    `The close of ${date} with ${plural(count, 'underlying', 'underlyings')} becomes official and cannot be changed afterwards.`,
  willSupersede: (date: string) =>
    `The approved close of ${date} is superseded; it stays readable.`,
  willStart: 'Tickets start from it if it is the newest.',
  restateTitle: (date: string) => `Restate the close of ${date}`,
  willRestate: (date: string) =>
    `A draft with the numbers of ${date} opens. The approved close holds until the draft is approved by someone else.`,
  restateReason: 'Why is it restated?',
  restateReasonHint: 'At least 8 characters; others will read it.',
  staleTitle: 'The close has changed meanwhile',
  staleBody: 'It was read again: look at it before you go on.',
} as const;
