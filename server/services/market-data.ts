import type { Market } from '@/pricing/contract';
import { sequelize } from '../database';
import type { Desk } from '../models/desk';
import { MarketQuote } from '../models/market-quote';
import { MarketSnapshot } from '../models/market-snapshot';
import { yieldOf } from './underlyings';

export type CloseDraft = { underlyingId: string; market: Market };

/** The close of a day as its maker enters it: a draft, until someone else has approved it. */
export const enterClose = (
  desk: Desk,
  draft: { date: string; enteredById: string; closes: readonly CloseDraft[] },
): Promise<string> =>
  sequelize.transaction(async (transaction) => {
    const { date, enteredById, closes } = draft;
    const snapshot = await MarketSnapshot.create(
      { deskId: desk.id, date, enteredById },
      { transaction },
    );
    await MarketQuote.bulkCreate(
      closes.map(({ underlyingId, market }) => ({
        snapshotId: snapshot.id,
        underlyingId,
        deskId: desk.id,
        spot: market.spot,
        rate: market.rate,
        yield: yieldOf(market),
        volatility: market.volatility,
      })),
      { transaction },
    );
    return snapshot.id;
  });

/** That the approver is not the maker is also a rule of the table itself. */
export async function approveClose(desk: Desk, snapshotId: string, approvedById: string) {
  const snapshot = await MarketSnapshot.findOne({
    where: { deskId: desk.id, id: snapshotId, status: 'draft' },
    rejectOnEmpty: true,
  });
  await snapshot.update({ status: 'approved', approvedById, approvedAt: new Date() });
}
