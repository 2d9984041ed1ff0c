/** What is typed into the forms of a trade, and how it is read: the shared schema with typing before it. */
import { z } from 'zod';
import { tradeFormText } from '@/constants/texts/trades';
import { tradeAmendmentSchema, tradeProposalSchema } from '@/shared/contracts/trade-acts';
import {
  dealSchema,
  tradedTermsSchema,
  type Deal,
  type TradeVersion,
} from '@/shared/contracts/trades';
import type { Quote } from '@/shared/contracts/quotes';
import { dateInZone, dateOfTenor, instantInZone, isCalendarDate } from '@/shared/dates';
import { formatInstant } from '@/shared/format/dates';
import { minorUnitDecimals } from '@/shared/format/money';
import { parseDecimal, roundedNumberText } from '@/shared/format/parse';
import type { DeskClock } from '@/shared/quote-terms';

/** A number as people type it, such as `1.5k`, as the decimal text that is booked. */
export const typedDecimal = z.string().transform((text, context) => {
  const parsed = parseDecimal(text);
  if (parsed.ok) return parsed.value;
  context.addIssue({ code: 'custom', message: parsed.message });
  return z.NEVER;
});

/** A day, or a tenor from today. */
const typedDate = (today: string) =>
  z.string().transform((text, context) => {
    const date = dateOfTenor(text, today) ?? text.trim();
    if (isCalendarDate(date)) return date;
    context.addIssue({ code: 'custom', message: tradeFormText.badDate });
    return z.NEVER;
  });

const localInstant = /^(\d{4}-\d{2}-\d{2})[ T](([01]\d|2[0-3]):[0-5]\d)$/;

/** A day and time of the desk's own clock, as an instant. */
const typedInstant = (timeZone: string) =>
  z.string().transform((text, context) => {
    const match = localInstant.exec(text.trim());
    if (match && isCalendarDate(match[1]))
      return new Date(instantInZone(match[1], match[2], timeZone)).toISOString();
    context.addIssue({ code: 'custom', message: tradeFormText.badInstant });
    return z.NEVER;
  });

const today = ({ timeZone }: DeskClock) => dateInZone(Date.now(), timeZone);

const dealFields = (desk: DeskClock) => ({
  ...dealSchema.shape,
  premiumAmount: typedDecimal.pipe(dealSchema.shape.premiumAmount),
  premiumCurrency: z.string().trim().toUpperCase().pipe(dealSchema.shape.premiumCurrency),
  premiumDate: typedDate(today(desk)).pipe(dealSchema.shape.premiumDate),
  tradedAt: typedInstant(desk.timeZone).pipe(dealSchema.shape.tradedAt),
});

export const proposalForm = (desk: DeskClock) =>
  z.object({
    ...dealFields(desk),
    bookId: z.string().min(1, tradeFormText.noBook).pipe(tradeProposalSchema.shape.bookId),
  });

export const amendmentForm = (desk: DeskClock) => {
  const terms = tradedTermsSchema.shape;
  return z.object({
    ...dealFields(desk),
    ...terms,
    quantity: typedDecimal.pipe(terms.quantity),
    contractSize: typedDecimal.pipe(terms.contractSize),
    strike: typedDecimal.pipe(terms.strike),
    expiryDate: typedDate(today(desk)).pipe(terms.expiryDate),
    reason: tradeAmendmentSchema.shape.reason,
  });
};

/** As long as a premium usually takes. */
const premiumTenor = '2d';

/** A proposal begins with what the quote says. */
export const proposalDefaults = (quote: Quote, desk: DeskClock, bookId: string) => ({
  bookId,
  counterparty: '',
  premiumAmount: roundedNumberText(
    Math.abs(Number(quote.total)),
    minorUnitDecimals(quote.underlying.currency),
  ),
  premiumCurrency: quote.underlying.currency,
  premiumDate: dateOfTenor(premiumTenor, today(desk)) ?? today(desk),
  tradedAt: formatInstant(quote.createdAt, desk.timeZone),
  note: quote.note,
});

/** An amendment begins with what was proposed last. */
export const amendmentDefaults = (version: TradeVersion, desk: DeskClock) => ({
  direction: version.direction,
  quantity: version.quantity,
  contractSize: version.contractSize,
  kind: version.kind,
  exercise: version.exercise,
  strike: version.strike,
  expiryDate: version.expiryDate,
  counterparty: version.counterparty,
  premiumAmount: version.premiumAmount,
  premiumCurrency: version.premiumCurrency,
  premiumDate: version.premiumDate,
  tradedAt: formatInstant(version.tradedAt, desk.timeZone),
  note: version.note,
  reason: '',
});

/** The field shows minutes: an instant that was left alone keeps its seconds. */
export const keptInstant = (deal: Deal, before: TradeVersion, desk: DeskClock): string =>
  formatInstant(deal.tradedAt, desk.timeZone) === formatInstant(before.tradedAt, desk.timeZone)
    ? before.tradedAt
    : deal.tradedAt;
