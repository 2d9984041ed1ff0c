/** Words of a trade: its page, its time line, the forms that propose and amend it, and its acts. */
import type { TradeEvent, TradeVersion } from '@/shared/contracts/trades';
import type { TradeStatus } from '@/shared/trade-moves';

export const statusWord: Record<TradeStatus, string> = {
  proposed: 'proposed',
  returned: 'returned',
  live: 'live',
  amended: 'live, amended',
  closed: 'closed',
  expired: 'expired',
};

export const eventWord: Record<TradeEvent['event'], string> = {
  proposed: 'Proposed',
  amended: 'Amended',
  approved: 'Approved',
  returned: 'Returned',
  closed: 'Closed',
  lapsed: 'Lapsed',
  exercised: 'Exercised',
};

export const versionStateWord: Record<TradeVersion['state'], string> = {
  proposed: 'waits for approval',
  approved: 'in force',
  returned: 'returned',
  superseded: 'superseded',
};

export const tradeText = {
  title: 'Trade',
  trade: (number: string) => `Trade ${number}`,
  next: {
    proposed: (maker: string) =>
      `Waits for a desk head other than ${maker}, who approves it or returns it with a reason.`,
    returned: 'Was returned: amend it, and it waits for approval again.',
    live: 'In force. Each run values it until it is closed or expires.',
    due: 'Its expiry has passed: record whether it lapsed or was exercised.',
    amended: (maker: string) =>
      `The terms in force stay so until a desk head other than ${maker} approves the new version.`,
    closed: 'Ended: it was closed and nothing follows.',
    expired: 'Ended: nothing follows.',
  },
  ownTrade: 'You proposed or amended this trade, so someone else decides on it.',
  returnedWith: (name: string, at: string) => `Returned by ${name}, ${at}`,

  valueTitle: 'Last value',
  valued: 'Valued',
  valuedOn: (date: string) => `on the close of ${date}`,
  noValue: 'No run has valued this trade yet.',
  notLiveYet: 'A trade is valued once it is live.',
  change: 'Change since the close before',
  firstValue: 'none: this is the first value',
  total: 'Position',
  openRun: 'Open the run',
  history: 'Values over time',

  termsTitle: 'Terms in force',
  proposedTermsTitle: 'Proposed terms',
  underlying: 'Underlying',
  option: 'Option',
  position: 'Position',
  expiry: 'Expiry',
  counterparty: 'Counterparty',
  premium: 'Premium',
  premiumPaid: (amount: string, date: string) => `${amount}, paid ${date}`,
  tradedAt: 'Agreed',
  book: 'Book',
  note: 'Note',
  quote: 'Quote',
  openQuote: 'Open the quote',
  identifier: 'Identifier',
  atZone: (instant: string, zone: string) => `${instant} ${zone}`,
  endTitle: 'How it ended',
  endItTitle: 'End this trade',
  endItBody: 'Closed before its time, or exercised by its holder: recorded here, for good.',
  outcome: 'Outcome',
  outcomeWord: { closed: 'closed', lapsed: 'lapsed', exercised: 'exercised' },
  endDate: 'Day',
  endAmount: 'Received',

  differencesTitle: 'What the new version changes',
  field: 'field',
  before: 'in force',
  after: 'proposed',
  amendedBecause: (name: string, reason: string) => `${name}: ${reason}`,

  timeLineTitle: 'Time line',
  versionOf: (number: number) => `version ${number}`,
  byAt: (name: string, at: string) => `${name}, ${at}`,
  versionsTitle: 'Versions',
  versionIs: (number: number, state: string) => `Version ${number}, ${state}`,
  proposedAt: (name: string, at: string) => `Proposed by ${name}, ${at}`,
  decidedAt: (name: string, at: string) => `Decided by ${name}, ${at}`,
  version: 'version',
  state: 'state',
  proposedBy: 'proposed by',
  decidedBy: 'decided by',
  why: 'why',

  fields: {
    direction: 'Direction',
    quantity: 'Quantity',
    contractSize: 'Contract size',
    kind: 'Option',
    exercise: 'Exercise',
    strike: 'Strike',
    expiryDate: 'Expiry',
    counterparty: 'Counterparty',
    premiumAmount: 'Premium',
    premiumCurrency: 'Premium currency',
    premiumDate: 'Premium paid on',
    tradedAt: 'Agreed at',
    note: 'Note',
  },
  choices: {
    buy: 'buy',
    sell: 'sell',
    call: 'call',
    put: 'put',
    european: 'European',
    american: 'American',
  },
  lots: 'lots',
} as const;

export const tradeFormText = {
  proposeTitle: 'Propose trade',
  amendTitle: (number: string) => `Amend ${number}`,
  propose: 'Propose trade',
  amend: 'Propose the amendment',
  fromQuote: (number: string) => `On the terms of quote ${number}`,
  back: 'Back to the quote',
  backToTrade: 'Back to the trade',
  quotedTitle: 'The option, as quoted',
  termsTitle: 'The option',
  dealTitle: 'The deal',
  book: 'Book',
  chooseBook: 'choose a book',
  noBook: 'Choose the book that the trade goes on.',
  noBooks: 'The desk has no book yet; a desk head opens one.',
  counterpartyHint: 'As the desk writes it; it stays out of the sealed records.',
  premiumHint: 'For the whole trade. The server’s own value stands beside it.',
  serverValue: (amount: string) => `Server’s value ${amount}`,
  premiumDateHint: 'A day as YYYY-MM-DD or a tenor such as 2d.',
  tradedAtHint: (zone: string) => `YYYY-MM-DD HH:MM, ${zone}`,
  expiryHint: 'A day as YYYY-MM-DD or a tenor such as 3m, at the desk’s cut-off.',
  reason: 'Why it is amended',
  reasonHint: 'Whoever approves it reads this; it is sealed in the desk’s records.',
  noteLabel: 'Note',
  willPropose: (book: string) =>
    `A trade is proposed${book === '' ? '' : ` on ${book}`}. It waits until a desk head other than you approves it; nothing is in force before.`,
  willAmend: 'A new version waits for a desk head other than you.',
  liveStays: 'The terms in force stay so until then.',
  badInstant: 'Give a day and time as YYYY-MM-DD HH:MM.',
  badDate: 'Give a day as YYYY-MM-DD or a tenor such as 2d.',
  kept: 'What you typed is kept in this browser until it is proposed.',
  refused: 'This could not be proposed',
  unsent: 'The server did not answer. Press again: it is proposed once, however often it is sent.',
  stale:
    'Someone changed the trade meanwhile. What you typed is still here; look at it, then send again.',
} as const;

export const tradeActText = {
  approve: 'Approve',
  return: 'Return',
  amend: 'Amend',
  close: 'Close trade',
  expire: 'Record the end',
  reason: 'Reason',
  reasonHint: 'It is sealed in the desk’s records, where others read it.',
  willApprove: (number: string, book: string) =>
    `The terms of trade ${number} come into force on ${book}, and every run values them from now on.`,
  willReplace: (number: string) =>
    `The new version of trade ${number} takes the place of the terms in force.`,
  willReturn: (number: string, maker: string) =>
    `Trade ${number} goes back to ${maker}, with your reason. Nothing comes into force.`,
  willReturnAmendment: (number: string, maker: string) =>
    `The amendment of trade ${number} goes back to ${maker}; the terms in force stay as they are.`,
  willClose: (number: string, amount: string, date: string) =>
    `Trade ${number} is closed on ${date} for ${amount}; no later run values it.`,
  willExpire: (number: string, outcome: string, date: string) =>
    `Trade ${number} ends on ${date}: ${outcome}. No later run values it.`,
  dropsAmendment: 'The amendment that waits is dropped.',
  willHappen: 'What will happen',
  recorded: 'It is sealed with your name in the desk’s records, and cannot be undone.',
  stale: 'Someone was first',
  staleBody: 'The trade has been read again; look at it, then decide once more.',
  closingDate: 'Day',
  closingAmount: 'Amount received',
  closingHint: 'Negative when the desk paid.',
  currency: 'Currency',
  outcome: 'Outcome',
  lapsed: 'lapsed',
  exercised: 'exercised',
  early: 'Only an American option ends before its expiry, by exercise.',
  done: {
    approve: (number: string) => `Trade ${number} is approved.`,
    return: (number: string) => `Trade ${number} is returned.`,
    close: (number: string) => `Trade ${number} is closed.`,
    expire: (number: string) => `The end of trade ${number} is recorded.`,
  },
} as const;
