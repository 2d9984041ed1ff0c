/** From a stored quote to what the wire shows of it. */
import type { Quote as QuoteOnTheWire, QuoteSummary } from '@/shared/contracts/quotes';
import { type Quote } from '../models/quote';
import { Underlying } from '../models/underlying';
import { User } from '../models/user';
import { marketOf } from './underlyings';

export const withUnderlyingAndMaker = [
  { model: Underlying, as: 'underlying', required: true },
  { model: User, as: 'createdBy', attributes: ['id', 'name'], required: true },
];

const stripOf = ({ routes }: Quote): QuoteSummary['strip'] =>
  routes.flatMap(({ name, result }) =>
    result.ok ? [{ name, value: result.value, errorEstimate: result.errorEstimate }] : [],
  );

export function summaryOf(quote: Quote): QuoteSummary {
  const { underlying, createdBy } = quote;
  if (!underlying || !createdBy) throw new Error('A quote was read without what it points to.');
  return {
    id: quote.id,
    number: quote.number,
    underlying: {
      id: underlying.id,
      symbol: underlying.symbol,
      name: underlying.name,
      currency: underlying.currency,
      unit: underlying.unit,
      priceDecimals: underlying.priceDecimals,
    },
    direction: quote.direction,
    quantity: quote.quantity,
    contractSize: quote.contractSize,
    kind: quote.kind,
    exercise: quote.exercise,
    strike: quote.strike,
    expiryDate: quote.expiryDate,
    value: quote.value,
    errorEstimate: quote.errorEstimate,
    total: quote.total,
    tolerance: quote.tolerance,
    verdict: quote.verdict,
    refuted: quote.refuted,
    strip: stripOf(quote),
    createdBy: { id: createdBy.id, name: createdBy.name },
    createdAt: quote.createdAt.toISOString(),
  };
}

export const quoteOf = (quote: Quote): QuoteOnTheWire => ({
  ...summaryOf(quote),
  market: marketOf(quote),
  pricedAt: quote.pricedAt.toISOString(),
  expiryAt: quote.expiryAt.toISOString(),
  expiryYears: quote.expiryYears,
  snapshotId: quote.snapshotId,
  primaryRoute: quote.primaryRoute,
  routes: quote.routes,
  indicativeValue: quote.indicativeValue,
  engine: quote.engine,
  note: quote.note,
});
