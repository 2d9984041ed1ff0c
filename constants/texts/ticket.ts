/** Words of the ticket, in the trade's own terms. */
import type { Underlying } from '@/shared/contracts/underlyings';

const yieldLabels: Record<Underlying['kind'], string> = {
  share: 'Dividend yield',
  index: 'Dividend yield',
  'currency-pair': 'Foreign rate',
  future: 'Yield',
};

const spotLabels: Record<Underlying['kind'], string> = {
  share: 'Share price',
  index: 'Index level',
  'currency-pair': 'Spot rate',
  future: 'Futures price',
};

export const ticketText = {
  title: 'Ticket',
  underlying: 'Underlying',
  kind: 'Kind',
  kinds: { call: 'call', put: 'put' },
  exercise: 'Exercise',
  exercises: { european: 'European', american: 'American' },
  direction: 'Direction',
  directions: { buy: 'buy', sell: 'sell' },
  directionTitle: { buy: 'Buy', sell: 'Sell' },
  strike: 'Strike',
  expiry: 'Expiry',
  spot: (kind: Underlying['kind']) => spotLabels[kind],
  volatility: 'Volatility',
  rate: 'Rate',
  yield: (kind: Underlying['kind']) => yieldLabels[kind],
  quantity: 'Lots',
  contractSize: 'Contract size',
  note: 'Note',
  moreTerms: 'More terms',
  fewerTerms: 'Fewer terms',
  percent: '%',
  closeSays: (text: string, unit = '') => `close ${text}${unit === '' ? '' : ` ${unit}`}`,
  marketOfClose: (date: string) => `Market: close of ${date}`,
  marketOfQuote: (number: string) => `Market of quote ${number}`,
  noClose: 'No close is approved yet: type the market yourself.',
  newerClose: (date: string) => `The close of ${date} is approved.`,
  useClose: 'Use it',

  missing: {
    underlying: 'Choose an underlying.',
    strike: 'Enter a strike, such as 210.',
    expiry: 'Enter a date such as 2027-06-01, or a tenor such as 3m.',
    spot: 'Enter a price, such as 212.4.',
    volatility: 'Enter a volatility in percent, such as 24.5.',
    rate: 'Enter a rate in percent, such as 3; 0 is fine.',
    yield: 'Enter a yield in percent, such as 2; 0 is fine.',
    quantity: 'Enter a number of lots, such as 10.',
    contractSize: 'Enter the units in one lot, such as 500.',
  },
  notPositive: {
    strike: 'A strike must be more than zero.',
    quantity: 'The number of lots must be more than zero; choose buy or sell for the direction.',
    contractSize: 'The contract size must be more than zero.',
    spot: 'A price must be more than zero.',
    volatility: 'A volatility must be more than zero.',
  },
  tooLarge: (most: string) => `This is beyond what can be priced: type ${most} at most.`,
  tooSmall: (least: string) => `This is too near to zero: type ${least} at least.`,
  outside: (least: string, most: string) => `Type a percentage between ${least} and ${most}.`,
  tooFar: (years: number) => `Choose an expiry within ${years} years.`,
  tooNear: 'This expiry is less than a minute away: choose a later day.',
  tooLong: {
    strike: 'A strike has at most 15 digits before the point and 10 after it.',
    quantity: 'A number of lots has at most 15 digits before the point and 10 after it.',
    contractSize: 'A contract size has at most 15 digits before the point and 10 after it.',
  },
  notAnExpiry: (typed: string) =>
    `“${typed}” is neither a date nor a tenor: type 2027-06-01, or 10d, 2w, 3m, 1y.`,
  noSuchDay: (typed: string) => `There is no ${typed} in the calendar.`,
  expiryPassed: (date: string, cutoff: string) =>
    `${date} ${cutoff} has passed at the desk: choose a later day.`,

  perUnit: (currency: string, unit: string) => `${currency} / ${unit}`,
  within: (tolerance: string) => `within ${tolerance}`,
  more: (tolerance: string) => `by more than ${tolerance}`,
  known: (tolerance: string) => `not known to ${tolerance}`,
  comparing: 'Comparing routes',
  firstPrice: 'Pricing',
  stoppedBy: (field: string) => `Not priced: see ${field}.`,
  staleBecause: (field: string) => `Last good price; see ${field}.`,
  workerFailed: 'The pricing thread stopped. Reload the page; the ticket is kept.',
  position: (direction: string, size: string, unit: string, lots: string) =>
    `${direction} ${size} ${unit} × ${lots} ${lots === '1' ? 'lot' : 'lots'}`,

  fromPremium: 'by premium',
  fromPremiumTitle: 'Volatility for a premium',
  fromPremiumBody: 'Which volatility gives this price of one unit, all else as on the ticket?',
  premium: 'Premium',
  missingPremium: 'Enter the premium of one unit.',
  fromDelta: 'by delta',
  fromDeltaTitle: 'Strike for a delta',
  fromDeltaBody:
    'Which strike gives this delta per 1.00 of the underlying, all else as on the ticket?',
  delta: 'Delta',
  missingDelta: 'Enter a delta, such as 0.25.',
  perOne: 'per 1.00',
  solving: 'Solving',
  volatilityFound: (volatility: string) => `A volatility of ${volatility} gives this premium.`,
  strikeFound: (strike: string) => `A strike of ${strike} gives this delta.`,
  take: 'Take it',
  otherFieldStops: (field: string) => `First put ${field} right on the ticket.`,

  save: 'Save quote',
  saving: 'Saving',
  savedTitle: (number: string) => `Saved as quote ${number}`,
  sameBits: 'Priced again by the server: the same 64 bits.',
  otherBits: (server: string, ticket: string, difference: string) =>
    `The server’s own value is ${server}; the ticket showed ${ticket} (${difference}).`,
  proposeTrade: 'Propose trade',
  openQuote: 'Open the quote',
  keptTitle: 'The quote is kept on this device',
  keptTitles: (count: number) => `${count} quotes are kept on this device`,
  keptBody:
    'The server did not take it yet. Nothing was lost; it is sent as it stands when you retry.',
  keptLine: (terms: string, at: string) => `${terms}, kept at ${at}`,
  retry: 'Retry',
  discard: 'Discard',
  refusedTitle: 'The server did not take the quote',

  live: (value: string, unit: string, error: string, verdict: string) =>
    `${value} ${unit}, plus or minus ${error}. ${verdict}`,
  storageFull: 'This browser keeps no drafts: what you type is lost when the page closes.',

  noUnderlyingsTitle: 'No underlyings on this desk yet',
  noUnderlyingsBody: 'Market data brings them; once there is one, it can be priced here.',
} as const;

const fieldNames = {
  underlying: 'underlying',
  strike: 'strike',
  expiry: 'expiry',
  spot: 'price',
  volatility: 'volatility',
  rate: 'rate',
  yield: 'yield',
  quantity: 'lots',
  contractSize: 'contract size',
  note: 'note',
} as const;

/** A field inside a sentence: `the strike`. */
export const fieldName = (field: keyof typeof fieldNames): string => `the ${fieldNames[field]}`;
