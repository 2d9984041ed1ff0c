import { planLadder, runStudyRow, studyReference, theoreticalOrder } from '@/pricing/study';
import type { Contract, Market } from '@/pricing/contract';
import { engineVersion } from '@/pricing/index';
import type { Desk } from '@/server/models/desk';
import { Study } from '@/server/models/study';
import { StudyRow } from '@/server/models/study-row';
import type { Underlying } from '@/server/models/underlying';
import type { User } from '@/server/models/user';
import type { StudyDraft } from '@/shared/contracts/studies';
import { daysFromNow } from './quotes';

const contract: Contract = {
  payoff: 'vanilla',
  exercise: 'european',
  kind: 'put',
  strike: 210,
  expiry: 0.5,
};
const market: Market = { spot: 212.4, rate: 0.03, carry: 'future', volatility: 0.245 };

/** A draft of free terms on a future, of one short ladder unless told otherwise. */
export const studyDraft = (
  underlying: Underlying,
  ladders: StudyDraft['ladders'] = [{ name: 'heat-crank-nicolson', rows: 3 }],
): StudyDraft => ({
  source: {
    kind: 'free',
    terms: {
      underlyingId: underlying.id,
      kind: 'put',
      exercise: 'european',
      strike: '210',
      expiryDate: daysFromNow(182),
      market,
      pricedAt: new Date().toISOString(),
    },
  },
  ladders,
});

/** Far above what the desk itself counts to in a test. */
let count = 100_000;

/** A study with the rows that the engine really gives; queued and empty unless it is finished. */
export async function makeStudy(
  desk: Desk,
  underlying: Underlying,
  startedBy: User,
  status: 'queued' | 'finished' = 'finished',
) {
  const name = 'heat-crank-nicolson';
  const order = theoreticalOrder(name, contract.exercise);
  const reference = studyReference(contract, market);
  if (order === null || 'ok' in reference) throw new Error('the terms cannot be studied');
  const steps = planLadder(name, contract, market, { rows: 3 });
  const finished = status === 'finished';
  const study = await Study.create({
    deskId: desk.id,
    ordinal: (count += 1),
    source: 'free',
    quoteId: null,
    underlyingId: underlying.id,
    terms: {
      underlyingId: underlying.id,
      kind: 'put',
      exercise: 'european',
      strike: '210',
      expiryDate: '2030-06-03',
      market,
      pricedAt: '2029-12-03T16:30:00.000Z',
    },
    request: { contract, market },
    reference,
    ladders: [{ name, theoreticalOrder: order, steps }],
    engine: engineVersion,
    status,
    total: steps.length,
    startedById: startedBy.id,
    ...(finished ? { done: steps.length, orders: [], finishedAt: new Date() } : {}),
  });
  if (finished) {
    await StudyRow.bulkCreate(
      steps.map((step) => ({
        studyId: study.id,
        route: name,
        ordinal: step.ordinal,
        result: runStudyRow(contract, market, step).result,
        milliseconds: 1,
      })),
    );
  }
  return study;
}
