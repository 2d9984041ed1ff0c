/**
 * Reads a ticket: from the texts that stand there to terms that can be priced, or to one sentence
 * at each field that stops it. Pure; the engine's own check has the last word on ranges.
 */
import {
  checkRequest,
  numberLimits,
  type Market,
  type PricingIssue,
  type PricingRequest,
} from '@/pricing/contract';
import { decimalSchema } from '@/shared/contracts/common';
import type { QuoteTerms } from '@/shared/contracts/quotes';
import type { Underlying } from '@/shared/contracts/underlyings';
import { addDays, dateInZone, dateOfTenor, isCalendarDate } from '@/shared/dates';
import { formatPercent, formatQuantity } from '@/shared/format/numbers';
import { parseDecimal, parseNumber, parsePercent, type Parsed } from '@/shared/format/parse';
import { expiryInstantMs, pricingRequestOf, type DeskClock } from '@/shared/quote-terms';
import { ticketText } from '@/constants/texts/ticket';
import type { TicketDraft, TicketTextField } from './ticket-draft';

export type TicketField = TicketTextField | 'underlying' | 'note';
export type FieldErrors = Partial<Record<TicketField, string>>;

export type TicketReading = {
  /** What the expiry field resolves to, even where other fields are wrong. */
  expiryDate: string | null;
  errors: FieldErrors;
  /** The quantities, each where it can be read. */
  position: { quantity?: string; contractSize?: string };
  /** Null while any field stops the price. */
  priced: { terms: QuoteTerms; request: PricingRequest } | null;
  /** The request with stand-ins where a field cannot be read; only `requestFor` looks at it. */
  provisional: PricingRequest;
};

/** Fields in the order of the ticket, so that the first error is the one named beside the price. */
export const ticketFieldOrder: readonly TicketField[] = [
  'underlying',
  'spot',
  'strike',
  'expiry',
  'volatility',
  'rate',
  'yield',
  'quantity',
  'contractSize',
  'note',
];

export const firstErrorField = (errors: FieldErrors): TicketField | null =>
  ticketFieldOrder.find((field) => errors[field] !== undefined) ?? null;

const refused = (message: string): { ok: false; message: string } => ({ ok: false, message });

function filled<T>(field: TicketTextField, text: string, read: (text: string) => Parsed<T>) {
  return text.trim() === '' ? refused(ticketText.missing[field]) : read(text);
}

/** A booked decimal: more than nought, and no longer than the books keep it. */
function readBooked(field: 'strike' | 'quantity' | 'contractSize', text: string): Parsed<string> {
  const decimal = filled(field, text, parseDecimal);
  if (!decimal.ok) return decimal;
  if (Number(decimal.value) <= 0) return refused(ticketText.notPositive[field]);
  if (!decimalSchema.safeParse(decimal.value).success) return refused(ticketText.tooLong[field]);
  return decimal;
}

function readExpiry(text: string, desk: DeskClock, nowMs: number): Parsed<string> {
  const today = dateInZone(nowMs, desk.timeZone);
  const typed = text.trim();
  if (typed === '') return refused(ticketText.missing.expiry);
  const date = dateOfTenor(typed, today) ?? typed;
  if (!isCalendarDate(date))
    return refused(
      /^\d{4}-\d{2}-\d{2}$/.test(typed)
        ? ticketText.noSuchDay(typed)
        : ticketText.notAnExpiry(typed),
    );
  if (expiryInstantMs(date, desk) <= nowMs)
    return refused(ticketText.expiryPassed(date, desk.expiryCutoff));
  return { ok: true, value: date };
}

type Take = <T>(field: TicketField, parsed: Parsed<T>) => T | null;

/** The texts as numbers; null where a text is not one, with its sentence left at the field. */
function readTexts({ texts }: TicketDraft, isFuture: boolean, take: Take) {
  const percent = (field: 'volatility' | 'rate' | 'yield') =>
    take(field, filled(field, texts[field], parsePercent));
  return {
    spot: take('spot', filled('spot', texts.spot, parseNumber)),
    volatility: percent('volatility'),
    rate: percent('rate'),
    carryYield: isFuture ? null : percent('yield'),
    strike: take('strike', readBooked('strike', texts.strike)),
    quantity: take('quantity', readBooked('quantity', texts.quantity)),
    contractSize: take('contractSize', readBooked('contractSize', texts.contractSize)),
  };
}

type TicketNumbers = ReturnType<typeof readTexts>;

function marketOf(numbers: TicketNumbers, isFuture: boolean): Market {
  const { spot, volatility, rate, carryYield } = numbers;
  const common = {
    spot: spot ?? standIns.spot,
    rate: rate ?? standIns.rate,
    volatility: volatility ?? standIns.volatility,
  };
  return isFuture
    ? { ...common, carry: 'future' }
    : { ...common, yield: carryYield ?? standIns.yield };
}

/**
 * Stand in for fields that cannot be read, so that the engine can check the ranges of the others
 * at the same time. Terms that hold one are never priced: their field has an error.
 */
const standIns = { spot: 1, rate: 0, volatility: 0.2, yield: 0, amount: '1', expiryDays: 90 };

const fieldOfPath: Record<string, TicketField> = {
  underlyingId: 'underlying',
  strike: 'strike',
  'contract.strike': 'strike',
  expiryDate: 'expiry',
  'contract.expiry': 'expiry',
  quantity: 'quantity',
  contractSize: 'contractSize',
  'market.spot': 'spot',
  'market.rate': 'rate',
  'market.yield': 'yield',
  'market.volatility': 'volatility',
  note: 'note',
};

/** The field of the ticket that a complaint of the engine or of the server is about. */
export const ticketFieldOf = (path: string): TicketField | null => fieldOfPath[path] ?? null;

/** Sorts complaints to their fields; those about no field come back as plain sentences. */
export function placeIssues(issues: readonly { path: string; message: string }[]) {
  const errors: FieldErrors = {};
  const elsewhere: string[] = [];
  for (const { path, message } of issues) {
    const field = ticketFieldOf(path);
    if (field === null) elsewhere.push(message);
    else errors[field] ??= message;
  }
  return { errors, elsewhere };
}

/**
 * The engine speaks of decimals and years, a ticket of percent and dates: what lies outside the
 * limits is said in the ticket's own units.
 */
function limitMessage(field: TicketField, { code, message }: PricingIssue, value: number): string {
  if (code !== 'out-of-range' && code !== 'not-positive') return message;
  switch (field) {
    case 'expiry':
      return value > numberLimits.expiry.max
        ? ticketText.tooFar(numberLimits.expiry.max)
        : ticketText.tooNear;
    case 'rate':
    case 'yield':
      return ticketText.outside(
        formatPercent(numberLimits[field].min, 0),
        formatPercent(numberLimits[field].max, 0),
      );
    case 'strike':
    case 'spot':
    case 'volatility': {
      if (value <= 0) return ticketText.notPositive[field];
      const spell =
        field === 'volatility' ? (limit: number) => formatPercent(limit, 0) : formatQuantity;
      const { min, max } = numberLimits[field];
      return value > max ? ticketText.tooLarge(spell(max)) : ticketText.tooSmall(spell(min));
    }
    default:
      return message;
  }
}

const valueAt = ({ contract, market }: PricingRequest, field: TicketField): number => {
  if (field === 'strike' || field === 'expiry') return contract[field];
  if (field === 'yield') return 'carry' in market ? NaN : market.yield;
  return field === 'spot' || field === 'rate' || field === 'volatility' ? market[field] : NaN;
};

/** The engine's complaints at the fields of the ticket. */
function engineErrors(request: PricingRequest, issues: readonly PricingIssue[]) {
  const worded = issues.map((issue) => {
    const field = ticketFieldOf(issue.path);
    const message = field ? limitMessage(field, issue, valueAt(request, field)) : issue.message;
    return { path: issue.path, message };
  });
  return placeIssues(worded);
}

export function readTicket(
  draft: TicketDraft,
  underlying: Underlying | null,
  desk: DeskClock,
  nowMs: number,
): TicketReading {
  const errors: FieldErrors = {};
  const take: Take = (field, parsed) => {
    if (parsed.ok) return parsed.value;
    errors[field] = parsed.message;
    return null;
  };
  const { texts, direction, kind, exercise } = draft;
  if (underlying === null) errors.underlying = ticketText.missing.underlying;
  const isFuture = underlying?.kind === 'future';
  const numbers = readTexts(draft, isFuture, take);
  const expiryDate = take('expiry', readExpiry(texts.expiry, desk, nowMs));
  const today = dateInZone(nowMs, desk.timeZone);
  const terms: QuoteTerms = {
    underlyingId: underlying?.id ?? '',
    direction,
    quantity: numbers.quantity ?? standIns.amount,
    contractSize: numbers.contractSize ?? standIns.amount,
    kind,
    exercise,
    strike: numbers.strike ?? standIns.amount,
    expiryDate: expiryDate ?? addDays(today, standIns.expiryDays),
    market: marketOf(numbers, isFuture),
    pricedAt: new Date(nowMs).toISOString(),
  };
  const provisional = pricingRequestOf(terms, desk);
  const checked = checkRequest(provisional);
  const placed = engineErrors(provisional, checked.ok ? [] : checked.issues);
  const all: FieldErrors = { ...placed.errors, ...errors };
  // A complaint about no field of the ticket would stop the price without saying why.
  const [unplaced] = placed.elsewhere;
  if (unplaced !== undefined) all.underlying ??= unplaced;
  const stopped = !checked.ok || firstErrorField(all) !== null;
  return {
    expiryDate,
    position: {
      quantity: numbers.quantity ?? undefined,
      contractSize: numbers.contractSize ?? undefined,
    },
    errors: all,
    priced: stopped ? null : { terms, request: checked.request },
    provisional,
  };
}

/** Fields that the price of one unit does not depend on. */
const besideThePrice: readonly TicketField[] = ['quantity', 'contractSize', 'note'];

/** The request for a question whose answer goes into `field`, or the field that stops it. */
export function requestFor(
  field: 'strike' | 'volatility',
  { errors, provisional }: TicketReading,
): { ok: true; request: PricingRequest } | { ok: false; stoppedBy: TicketField } {
  const relevant = Object.entries(errors).filter(
    ([name]) => name !== field && !besideThePrice.some((beside) => beside === name),
  );
  const stoppedBy = firstErrorField(Object.fromEntries(relevant));
  if (stoppedBy !== null) return { ok: false, stoppedBy };
  const { contract, market } = provisional;
  // What stands in the field itself is what is being asked for, and may be wrong or empty.
  const request =
    field === 'strike'
      ? { contract: { ...contract, strike: market.spot }, market }
      : { contract, market: { ...market, volatility: standIns.volatility } };
  return { ok: true, request };
}
