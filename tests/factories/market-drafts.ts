import type { Desk } from '@/server/models/desk';
import { MarketQuote } from '@/server/models/market-quote';
import { MarketSnapshot } from '@/server/models/market-snapshot';
import { PricingPolicy } from '@/server/models/pricing-policy';
import type { Underlying } from '@/server/models/underlying';
import type { User } from '@/server/models/user';
import { makeUser } from './people';

/** A draft that waits, with the close of every underlying given. */
export async function makeDraftClose(
  desk: Desk,
  underlyings: readonly Underlying[],
  maker: User,
  date: string,
) {
  const snapshot = await MarketSnapshot.create({ deskId: desk.id, date, enteredById: maker.id });
  await MarketQuote.bulkCreate(
    underlyings.map(({ id, kind }) => ({
      snapshotId: snapshot.id,
      underlyingId: id,
      deskId: desk.id,
      spot: 212.4,
      rate: 0.026,
      yield: kind === 'future' ? null : 0.01,
      volatility: 0.245,
    })),
  );
  return snapshot;
}

/** Puts the draft that waits in force, so that there is room for another one. */
async function settleDraft(desk: Desk) {
  const find = (status: PricingPolicy['status']) =>
    PricingPolicy.findOne({ where: { deskId: desk.id, status } });
  const [draft, before] = [await find('draft'), await find('approved')];
  if (!draft) return;
  await before?.update({ status: 'superseded', supersededById: draft.id });
  const { id } = await makeUser();
  await draft.update({ status: 'approved', approvedById: id, approvedAt: new Date() });
}

/** The number that the desk's next policy gets, with no draft in its way. */
export async function nextPolicyNumber(desk: Desk): Promise<number> {
  await settleDraft(desk);
  return (await PricingPolicy.count({ where: { deskId: desk.id } })) + 1;
}

export const makeDraftPolicy = async (
  desk: Desk,
  author: User,
  fields: Partial<Pick<PricingPolicy, 'sizes' | 'toleranceShare'>> = {},
) =>
  PricingPolicy.create({
    deskId: desk.id,
    number: await nextPolicyNumber(desk),
    primaryEuropean: 'closed-form',
    checkEuropean: 'heat-crank-nicolson',
    primaryAmerican: 'heat-crank-nicolson',
    checkAmerican: 'lattice-symmetric',
    sizes: {},
    toleranceShare: null,
    unitTolerance: {},
    moneyTolerance: {},
    reason: 'First policy of the desk',
    authorId: author.id,
    ...fields,
  });
