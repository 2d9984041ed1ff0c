/**
 * What stands on a ticket: the texts as typed, the choices, and where the market data came from.
 * Pure, so that the same steps can be tested, stored and replayed; `ticket-terms.ts` reads it.
 */
import { z } from 'zod';
import Decimal from 'decimal.js';
import type { Market } from '@/pricing/contract';
import { directionSchema, type Quote } from '@/shared/contracts/quotes';
import { exerciseSchema, optionKindSchema } from '@/shared/contracts/pricing';
import type { Underlying } from '@/shared/contracts/underlyings';
import { numberText, parseDecimal, percentText } from '@/shared/format/parse';

export const ticketTextFields = [
  'strike',
  'expiry',
  'spot',
  'volatility',
  'rate',
  'yield',
  'quantity',
  'contractSize',
] as const;
export type TicketTextField = (typeof ticketTextFields)[number];

const textsSchema = z.record(z.enum(ticketTextFields), z.string());

const marketTextsSchema = z.object({
  spot: z.string(),
  volatility: z.string(),
  rate: z.string(),
  yield: z.string(),
});
type MarketTexts = z.infer<typeof marketTextsSchema>;
export type MarketTextField = keyof MarketTexts;

const sourceSchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('close'), date: z.string(), texts: marketTextsSchema }),
  z.object({ kind: z.literal('quote'), number: z.string() }),
  z.object({ kind: z.literal('typed') }),
]);

export const ticketDraftSchema = z.object({
  underlyingId: z.string().nullable(),
  direction: directionSchema,
  kind: optionKindSchema,
  exercise: exerciseSchema,
  texts: textsSchema,
  note: z.string(),
  /** Where the market data that the ticket began with came from. */
  source: sourceSchema,
});
export type TicketDraft = z.infer<typeof ticketDraftSchema>;

export const emptyTicket: TicketDraft = {
  underlyingId: null,
  direction: 'sell',
  kind: 'put',
  exercise: 'european',
  texts: {
    strike: '',
    expiry: '3m',
    spot: '',
    volatility: '',
    rate: '',
    yield: '',
    quantity: '1',
    contractSize: '',
  },
  note: '',
  source: { kind: 'typed' },
};

export type TicketAction =
  | { type: 'open'; underlyings: readonly Underlying[] }
  | { type: 'choose-underlying'; underlying: Underlying }
  | { type: 'use-close'; underlying: Underlying }
  | { type: 'use-quote'; quote: Quote }
  | { type: 'type'; field: TicketTextField; text: string }
  | { type: 'step'; field: TicketTextField; steps: number }
  | { type: 'note'; text: string }
  | { type: 'choose-direction'; direction: TicketDraft['direction'] }
  | { type: 'choose-kind'; kind: TicketDraft['kind'] }
  | { type: 'choose-exercise'; exercise: TicketDraft['exercise'] };

/** The largest of 1, 2, 5 times a power of ten that is not above the size. */
function roundStep(size: number): Decimal {
  const [digits, exponent] = size.toExponential().split('e');
  const lead = Number(digits);
  const round = lead >= 5 ? 5 : lead >= 2 ? 2 : 1;
  return new Decimal(`${round}e${exponent}`);
}

/** A strike near the money as people quote one: 212.40 → 210.00, 1.0842 → 1.08. */
export function strikeNear(spot: number, priceDecimals: number): string {
  const step = roundStep(spot / 40);
  const strike = new Decimal(spot).div(step).round().times(step);
  return strike.toFixed(Math.max(priceDecimals, strike.decimalPlaces()));
}

export const marketTexts = (market: Market, priceDecimals: number): MarketTexts => ({
  spot: numberText(market.spot, priceDecimals),
  volatility: percentText(market.volatility, 1),
  rate: percentText(market.rate, 2),
  yield: 'carry' in market ? '' : percentText(market.yield, 2),
});

const noMarketTexts: MarketTexts = { spot: '', volatility: '', rate: '', yield: '' };

function withClose(draft: TicketDraft, underlying: Underlying): TicketDraft {
  const { close, priceDecimals } = underlying;
  const market = close ? marketTexts(close.market, priceDecimals) : noMarketTexts;
  return {
    ...draft,
    texts: { ...draft.texts, ...market },
    source: close ? { kind: 'close', date: close.date, texts: market } : { kind: 'typed' },
  };
}

/** What the close says at a market field that has been changed since; null where it still stands. */
export function closeTextBeside({ source, texts }: TicketDraft, field: MarketTextField) {
  if (source.kind !== 'close' || source.texts[field] === '') return null;
  return isSameNumber(source.texts[field], texts[field]) ? null : source.texts[field];
}

function isSameNumber(a: string, b: string): boolean {
  const [one, other] = [parseDecimal(a), parseDecimal(b)];
  return one.ok && other.ok && one.value === other.value;
}

/** Whether a later close than the ticket's is approved. */
export const hasNewerClose = ({ source }: TicketDraft, { close }: Underlying): boolean =>
  close !== null &&
  (source.kind === 'typed' || (source.kind === 'close' && close.date > source.date));

/** Whether the market still reads as the close gave it, so that a later one may take its place. */
const isUntouched = ({ source, texts }: TicketDraft): boolean =>
  source.kind === 'close' &&
  marketFields.every(
    (field) =>
      source.texts[field] === texts[field] || isSameNumber(source.texts[field], texts[field]),
  );

const marketFields: readonly MarketTextField[] = ['spot', 'volatility', 'rate', 'yield'];

/**
 * A ticket as it is opened: with an underlying, and with the last approved close unless the person
 * had changed the market. The first of the list stands in for one that is no longer there.
 */
export function openTicket(draft: TicketDraft, underlyings: readonly Underlying[]): TicketDraft {
  const chosen = underlyings.find(({ id }) => id === draft.underlyingId);
  if (chosen && hasNewerClose(draft, chosen) && isUntouched(draft)) return withClose(draft, chosen);
  if (chosen) return draft;
  const first = underlyings.find(({ close }) => close !== null) ?? underlyings.at(0);
  return first ? withUnderlying(draft, first) : draft;
}

function withUnderlying(draft: TicketDraft, underlying: Underlying): TicketDraft {
  const { close, priceDecimals, contractSize } = underlying;
  const strike = close ? strikeNear(close.market.spot, priceDecimals) : '';
  const texts = { ...draft.texts, strike, contractSize: new Decimal(contractSize).toFixed() };
  return withClose({ ...draft, underlyingId: underlying.id, texts }, underlying);
}

function withQuote(draft: TicketDraft, quote: Quote): TicketDraft {
  const { underlying, market, direction, kind, exercise } = quote;
  const { priceDecimals } = underlying;
  const strike = new Decimal(quote.strike);
  return {
    ...draft,
    underlyingId: underlying.id,
    direction,
    kind,
    exercise,
    texts: {
      ...marketTexts(market, priceDecimals),
      strike: strike.toFixed(Math.max(priceDecimals, strike.decimalPlaces())),
      expiry: quote.expiryDate,
      quantity: new Decimal(quote.quantity).toFixed(),
      contractSize: new Decimal(quote.contractSize).toFixed(),
    },
    note: '',
    source: { kind: 'quote', number: quote.number },
  };
}

const fixedSteps: Partial<Record<TicketTextField, string>> = {
  volatility: '0.1',
  rate: '0.05',
  yield: '0.05',
  quantity: '1',
  contractSize: '1',
};

/** The text moved by arrow keys: a tenor by one, a price by about half a percent, the rest as quoted. */
export function stepText(field: TicketTextField, text: string, steps: number): string {
  if (field === 'expiry') return stepTenor(text, steps);
  const number = parseDecimal(text.replace('%', ''));
  if (!number.ok) return text;
  const value = new Decimal(number.value);
  const fixed = fixedSteps[field];
  if (!fixed && value.lte(0)) return text;
  const step = fixed ? new Decimal(fixed) : roundStep(value.toNumber() / 200);
  const moved = value.plus(step.times(steps));
  // Rates and yields may pass below nought; nothing else may reach it.
  if (field !== 'rate' && field !== 'yield' && moved.lte(0)) return text;
  const typedDecimals = number.value.split('.')[1]?.length ?? 0;
  const shownDecimals = /[.,](\d+)/.exec(text)?.[1].length ?? 0;
  return moved.toFixed(Math.max(typedDecimals, shownDecimals, step.decimalPlaces()));
}

function stepTenor(text: string, steps: number): string {
  const tenor = /^(\d{1,3})\s*([dwmy])$/i.exec(text.trim());
  if (!tenor) return text;
  return `${Math.max(1, Number(tenor[1]) + steps)}${tenor[2]}`;
}

export function ticketReducer(draft: TicketDraft, action: TicketAction): TicketDraft {
  const type = (field: TicketTextField, text: string): TicketDraft => ({
    ...draft,
    texts: { ...draft.texts, [field]: text },
  });
  switch (action.type) {
    case 'open':
      return openTicket(draft, action.underlyings);
    case 'choose-underlying':
      return withUnderlying(draft, action.underlying);
    case 'use-close':
      return withClose(draft, action.underlying);
    case 'use-quote':
      return withQuote(draft, action.quote);
    case 'type':
      return type(action.field, action.text);
    case 'step':
      return type(action.field, stepText(action.field, draft.texts[action.field], action.steps));
    case 'note':
      return { ...draft, note: action.text };
    case 'choose-direction':
      return { ...draft, direction: action.direction };
    case 'choose-kind':
      return { ...draft, kind: action.kind };
    case 'choose-exercise':
      return { ...draft, exercise: action.exercise };
  }
}
