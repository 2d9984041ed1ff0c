/** From a stored trade to what the wire shows of it. */
import type { Includeable } from 'sequelize';
import type {
  Deal,
  LastValuation,
  TradedTerms,
  TradeEnd,
  TradeSummary,
  TradeVersion as TradeVersionOnTheWire,
} from '@/shared/contracts/trades';
import { Book } from '../models/book';
import type { Trade } from '../models/trade';
import { TradeVersion } from '../models/trade-version';
import { Underlying } from '../models/underlying';
import { User } from '../models/user';

export const withBookUnderlyingAndMaker: Includeable[] = [
  { model: Book, as: 'book', required: true },
  { model: Underlying, as: 'underlying', required: true },
  { model: User, as: 'proposedBy', attributes: ['id', 'name'], required: true },
];

export const withShownVersions: Includeable[] = [
  { model: TradeVersion, as: 'liveVersion' },
  { model: TradeVersion, as: 'latestVersion', required: true },
];

export const withPeople: Includeable[] = [
  { model: User, as: 'proposedBy', attributes: ['id', 'name'], required: true },
  { model: User, as: 'decidedBy', attributes: ['id', 'name'] },
];

const personOf = ({ id, name }: User) => ({ id, name });

/** The option itself, out of a version, a quote or an amendment. */
export const termsOf = (from: TradedTerms): TradedTerms => ({
  direction: from.direction,
  quantity: from.quantity,
  contractSize: from.contractSize,
  kind: from.kind,
  exercise: from.exercise,
  strike: from.strike,
  expiryDate: from.expiryDate,
});

export const dealOf = (version: TradeVersion): Deal => ({
  counterparty: version.counterparty,
  premiumAmount: version.premiumAmount,
  premiumCurrency: version.premiumCurrency,
  premiumDate: version.premiumDate,
  tradedAt: version.tradedAt.toISOString(),
  note: version.note,
});

export function versionOf(version: TradeVersion): TradeVersionOnTheWire {
  const { proposedBy, decidedBy } = version;
  if (!proposedBy) throw new Error('A version was read without its proposer.');
  return {
    ...termsOf(version),
    ...dealOf(version),
    id: version.id,
    number: version.number,
    state: version.state,
    expiryAt: version.expiryAt.toISOString(),
    quoteId: version.quoteId,
    amendmentReason: version.amendmentReason,
    proposedBy: personOf(proposedBy),
    proposedAt: version.proposedAt.toISOString(),
    decidedBy: decidedBy ? personOf(decidedBy) : null,
    decidedAt: version.decidedAt?.toISOString() ?? null,
    decisionReason: version.decisionReason,
  };
}

/** The table sees to it that the parts of a value are there together or not at all. */
export function lastValuationOf(trade: Trade): LastValuation | null {
  const { lastRunId, lastSnapshotDate, lastValue, lastVerdict, lastRefuted } = trade;
  const { lastTotal, lastStrip, lastTolerance } = trade;
  if (lastRunId === null || lastSnapshotDate === null || lastValue === null) return null;
  if (lastVerdict === null || lastRefuted === null || lastTotal === null) return null;
  if (lastStrip === null || lastTolerance === null) return null;
  return {
    runId: lastRunId,
    snapshotDate: lastSnapshotDate,
    value: lastValue,
    errorEstimate: trade.lastError,
    total: lastTotal,
    change: trade.valueChange,
    tolerance: lastTolerance,
    verdict: lastVerdict,
    refuted: lastRefuted,
    strip: lastStrip,
  };
}

/** A row on the terms in force, or on those proposed while none are. */
export function summaryOf(trade: Trade, shown: TradeVersion): TradeSummary {
  const { book, underlying, proposedBy } = trade;
  if (!book || !underlying || !proposedBy)
    throw new Error('A trade was read without what it points to.');
  return {
    id: trade.id,
    number: trade.number,
    status: trade.status,
    book: { id: book.id, code: book.code, name: book.name },
    underlying: {
      id: underlying.id,
      symbol: underlying.symbol,
      name: underlying.name,
      currency: underlying.currency,
      unit: underlying.unit,
      priceDecimals: underlying.priceDecimals,
    },
    ...termsOf(shown),
    expiryAt: shown.expiryAt.toISOString(),
    counterparty: shown.counterparty,
    proposedBy: personOf(proposedBy),
    proposedAt: trade.proposedAt.toISOString(),
    lastValuation: lastValuationOf(trade),
  };
}

export function endOf(trade: Trade): TradeEnd | null {
  const { endOutcome, endDate, endAmount, endCurrency } = trade;
  if (endOutcome === null || endDate === null) return null;
  return { outcome: endOutcome, date: endDate, amount: endAmount, currency: endCurrency };
}
