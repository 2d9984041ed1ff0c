import type { Desk } from '@/server/models/desk';
import { MarketQuote } from '@/server/models/market-quote';
import { MarketSnapshot } from '@/server/models/market-snapshot';
import { Underlying } from '@/server/models/underlying';
import { makeUser } from './people';

let count = 0;

export const makeUnderlying = (desk: Desk, fields: Partial<Underlying> = {}) =>
  Underlying.create({
    deskId: desk.id,
    symbol: `WHT-${(count += 1)}`,
    name: 'Winter wheat future, December',
    kind: 'future',
    currency: 'EUR',
    unit: 't',
    contractSize: '50',
    priceDecimals: 2,
    tolerance: 0.01,
    ...fields,
  });

export const makeShare = (desk: Desk) =>
  makeUnderlying(desk, { kind: 'share', name: 'Tarnfield Mill, share', unit: 'share' });

export async function makeApprovedClose(desk: Desk, underlying: Underlying, date: string) {
  const [maker, checker] = [await makeUser(), await makeUser()];
  const snapshot = await MarketSnapshot.create({
    deskId: desk.id,
    date,
    enteredById: maker.id,
  });
  await MarketQuote.create({
    snapshotId: snapshot.id,
    underlyingId: underlying.id,
    deskId: desk.id,
    spot: 212.4,
    rate: 0.03,
    yield: underlying.kind === 'future' ? null : 0.01,
    volatility: 0.245,
  });
  await snapshot.update({ status: 'approved', approvedById: checker.id, approvedAt: new Date() });
  return snapshot;
}
