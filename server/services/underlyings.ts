import type { Market } from '@/pricing/contract';
import type { Underlying as UnderlyingOnTheWire } from '@/shared/contracts/underlyings';
import type { Desk } from '../models/desk';
import { MarketQuote } from '../models/market-quote';
import { MarketSnapshot } from '../models/market-snapshot';
import { Underlying } from '../models/underlying';
import { activePolicy, toleranceRuleOf } from './policies';

export type UnderlyingDraft = Omit<UnderlyingOnTheWire, 'id' | 'close' | 'moneyTolerance'>;

/** The market numbers of a row, in the shape that the engine takes. */
export function marketOf(row: {
  spot: number;
  rate: number;
  yield: number | null;
  volatility: number;
}): Market {
  const { spot, rate, volatility } = row;
  return row.yield === null
    ? { spot, rate, carry: 'future', volatility }
    : { spot, rate, yield: row.yield, volatility };
}

export const yieldOf = (market: Market): number | null => ('yield' in market ? market.yield : null);

/** The last approved close of a desk. */
export const findLastClose = (deskId: string): Promise<MarketSnapshot | null> =>
  MarketSnapshot.findOne({
    where: { deskId, status: 'approved' },
    order: [['date', 'DESC']],
  });

export async function listUnderlyings(desk: Desk): Promise<UnderlyingOnTheWire[]> {
  const underlyings = await Underlying.findAll({
    where: { deskId: desk.id, archivedAt: null },
    order: [
      ['name', 'ASC'],
      ['id', 'ASC'],
    ],
  });
  const policy = await activePolicy(desk.id);
  const snapshot = await findLastClose(desk.id);
  const closes = snapshot
    ? await MarketQuote.findAll({ where: { deskId: desk.id, snapshotId: snapshot.id } })
    : [];
  const closeOf = (underlyingId: string) => {
    const close = closes.find((row) => row.underlyingId === underlyingId);
    if (!snapshot || !close) return null;
    return { snapshotId: snapshot.id, date: snapshot.date, market: marketOf(close) };
  };
  return underlyings.map((row) => ({
    id: row.id,
    symbol: row.symbol,
    name: row.name,
    kind: row.kind,
    currency: row.currency,
    unit: row.unit,
    contractSize: row.contractSize,
    priceDecimals: row.priceDecimals,
    ...toleranceRuleOf(policy, row),
    close: closeOf(row.id),
  }));
}

export async function createUnderlying(desk: Desk, draft: UnderlyingDraft): Promise<string> {
  const { id } = await Underlying.create({ ...draft, deskId: desk.id });
  return id;
}
