/** A book as a desk has it: calls and puts, European and American, on shares and futures. */
import { asSuperuser } from '../server/support/environment';
import { MarketQuote } from '@/server/models/market-quote';
import { MarketSnapshot } from '@/server/models/market-snapshot';
import type { Desk } from '@/server/models/desk';
import { fillBook } from './many-trades';
import { makeShare, makeUnderlying } from './market';
import { makeUser } from './people';
import { policyInForce } from './runs';
import { makeBook } from './trades';

/** Of twenty trades that `fillBook` makes, seventeen are live. */
const toMake = (live: number) => Math.ceil((live * 20) / 17);

/** An approved close with the markets of its underlyings, and a book of so many live trades. */
export async function makeMixedBook(desk: Desk, live: number) {
  const underlyings = [
    await makeUnderlying(desk),
    await makeUnderlying(desk),
    await makeShare(desk),
    await makeShare(desk),
  ];
  await policyInForce(desk);
  const snapshot = await MarketSnapshot.create({
    deskId: desk.id,
    date: '2026-11-30',
    enteredById: (await makeUser()).id,
  });
  await MarketQuote.bulkCreate(
    underlyings.map(({ id, kind }, index) => ({
      snapshotId: snapshot.id,
      underlyingId: id,
      deskId: desk.id,
      spot: 205 + 4 * index,
      rate: 0.026,
      yield: kind === 'future' ? null : 0.01,
      volatility: 0.2 + 0.02 * index,
    })),
  );
  const approver = await makeUser();
  await snapshot.update({ status: 'approved', approvedById: approver.id, approvedAt: new Date() });
  const book = await makeBook(desk);
  const people = { proposer: await makeUser(), approver };
  await fillBook({ book, underlyings, ...people, count: toMake(live) });
  await asSuperuser(
    `UPDATE trade_versions version SET
      exercise = CASE trade.ordinal % 3 WHEN 0 THEN 'american' ELSE 'european' END,
      kind = CASE trade.ordinal % 2 WHEN 0 THEN 'call' ELSE 'put' END
    FROM trades trade WHERE trade.id = version.trade_id AND trade.book_id = $1`,
    [book.id],
  );
  await asSuperuser('ANALYZE');
  return { book, snapshot };
}
