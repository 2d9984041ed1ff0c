/**
 * A valuation run from the request to the chain: what it takes up, what it seals, what it leaves on
 * the trades, and work that is done twice or stopped half-way.
 */
import { withServer } from './support/server';
import { workOff } from './support/queue';
import { runActs, sentenceOf, told } from './support/runs';
import { randomUUID } from 'node:crypto';
import Decimal from 'decimal.js';
import { price } from '@/pricing/index';
import { ChainEntry } from '@/server/models/chain-entry';
import type { Desk } from '@/server/models/desk';
import type { MarketSnapshot } from '@/server/models/market-snapshot';
import { RunChunk } from '@/server/models/run-chunk';
import { Trade } from '@/server/models/trade';
import type { Underlying } from '@/server/models/underlying';
import { runChunk } from '@/server/services/run-work';
import { valuationBodySchema } from '@/shared/contracts/chain-bodies';
import type { Run } from '@/shared/contracts/runs';
import { makeApprovedClose, makeUnderlying } from '../factories/market';
import { makeDraftPolicy, nextPolicyNumber } from '../factories/market-drafts';
import { makeDesk, makeMember, makeUser, type TestMember } from '../factories/people';
import { makeFilledBook, makeLiveTrade, policyInForce, workOffRun } from '../factories/runs';
import { makeBook } from '../factories/trades';

withServer();

let desk: Desk;
let underlying: Underlying;
let snapshot: MarketSnapshot;
let analyst: TestMember;
let acts: ReturnType<typeof runActs>;

beforeAll(async () => {
  desk = await makeDesk();
  underlying = await makeUnderlying(desk);
  snapshot = await makeApprovedClose(desk, underlying, '2026-11-27');
  analyst = await makeMember(desk, 'analyst');
  acts = runActs(desk);
  await policyInForce(desk);
});

const bodiesOf = async (runId: string) => {
  const entries = await ChainEntry.findAll({ where: { kind: 'valuation', runId } });
  return entries.map(({ body }) => valuationBodySchema.parse(JSON.parse(body)));
};

async function start(books: { id: string }[], on = snapshot): Promise<Run> {
  const draft = { bookIds: books.map(({ id }) => id), snapshotId: on.id };
  const answer = await acts.start(analyst, draft);
  expect([answer.status, answer.body.issues]).toEqual([201, undefined]);
  return answer.body;
}

describe('a run of two books', () => {
  let run: Run;
  let bookIds: string[];

  beforeAll(async () => {
    const european = await makeFilledBook(desk, underlying, 60);
    const american = await makeFilledBook(desk, underlying, 2, { exercise: 'american' });
    const gone = { expiryDate: '2026-11-27', expiryAt: new Date('2026-11-27T16:30:00Z') };
    await makeLiveTrade({ book: american, underlying }, gone);
    const later = { tradedAt: new Date('2026-11-28T09:00:00Z') };
    await makeLiveTrade({ book: american, underlying }, later);
    bookIds = [european.id, american.id];
    run = await start([european, american]);
  });

  it('waits until a worker takes it up, and says what it will do', () => {
    expect(run).toMatchObject({
      status: 'queued',
      total: 62,
      done: 0,
      leftOut: 2,
      valuedAt: '2026-11-27T16:30:00.000Z',
      snapshot: { id: snapshot.id, date: '2026-11-27' },
      startedBy: { id: analyst.user.id },
      totals: [],
      openExceptions: 0,
    });
    expect(run.number).toMatch(/^R-\d{4,}$/);
    expect(run.books.map(({ id }) => id).sort()).toEqual([...bookIds].sort());
  });

  it('is worked off chunk by chunk, and ends with every trade valued by two routes', async () => {
    const [first] = await RunChunk.findAll({ where: { runId: run.id }, order: ['number'] });
    await runChunk(run.id, first.number);
    expect(await acts.read(analyst, run.id)).toMatchObject({
      status: 'running',
      done: first.tradeVersionIds.length,
    });
    await workOff();
    run = await acts.read(analyst, run.id);
    expect(run).toMatchObject({ status: 'finished', done: 62, counts: { agree: 62, failed: 0 } });
    const bodies = await bodiesOf(run.id);
    expect(bodies).toHaveLength(124);
    expect(new Set(bodies.map(({ tradeId }) => tradeId)).size).toBe(62);
  });

  it('holds the very bits that the engine gives for what it says it was asked', async () => {
    for (const { request, result, role, route } of await bodiesOf(run.id)) {
      expect(price(request)).toEqual(result);
      expect(request.method.name).toBe(route);
      const european = role === 'primary' ? 'closed-form' : 'heat-crank-nicolson';
      const american = role === 'primary' ? 'heat-crank-nicolson' : 'lattice-symmetric';
      expect(route).toBe(request.contract.exercise === 'european' ? european : american);
    }
  });

  it('leaves its values on the trades, and their sum on itself', async () => {
    const trades = await Trade.findAll({ where: { lastRunId: run.id } });
    expect(trades).toHaveLength(62);
    const sum = trades.reduce((total, { lastTotal }) => total.plus(lastTotal ?? 0), new Decimal(0));
    expect(run.totals).toEqual([
      { currency: 'EUR', total: sum.toFixed(), before: null, change: null },
    ]);
    const bodies = await bodiesOf(run.id);
    for (const { id, lastValue, lastVerdict, lastSnapshotDate, lastTotal } of trades) {
      const body = bodies.find(({ tradeId, role }) => tradeId === id && role === 'primary');
      if (!body?.result.ok) throw new Error('every trade has a value here');
      expect(lastValue).toBe(body.result.value);
      expect([lastVerdict, lastSnapshotDate]).toEqual(['agree', '2026-11-27']);
      // Sold, ten lots of fifty units.
      expect(Number(lastTotal)).toBeCloseTo(-500 * body.result.value, 8);
    }
  });

  it('lists its values in pages, each once', async () => {
    const numbers: string[] = [];
    let cursor: string | null = null;
    do {
      const query: Record<string, string> = { limit: '25', ...(cursor === null ? {} : { cursor }) };
      const page = await acts.valuations(analyst, run.id, query);
      numbers.push(...page.items.map(({ trade }) => trade.number));
      cursor = page.nextCursor;
    } while (cursor !== null);
    expect(numbers).toHaveLength(62);
    expect(new Set(numbers).size).toBe(62);
    const ofBook = await acts.valuations(analyst, run.id, { bookId: bookIds[1] });
    expect(ofBook.items.map(({ terms }) => terms.exercise)).toEqual(['american', 'american']);
    expect((await acts.valuations(analyst, run.id, { verdict: 'wide' })).items).toEqual([]);
  });

  it('is compared with the run of the same books on the close before', async () => {
    const next = await makeApprovedClose(desk, underlying, '2026-11-30');
    const { id } = await start(
      bookIds.map((bookId) => ({ id: bookId })),
      next,
    );
    await workOffRun(id);
    const after = await acts.read(analyst, id);
    // The trade that was agreed on the day after the close before is new in it.
    expect(after).toMatchObject({ total: 63, before: { id: run.id, date: '2026-11-27' } });
    const [{ total, before, change }] = after.totals;
    expect(before).toBe(run.totals[0].total);
    expect(new Decimal(total).minus(before ?? 0).toFixed()).toBe(change);
    const { items } = await acts.valuations(analyst, id, { limit: '200' });
    const known = items.filter((row) => row.before !== null);
    expect(known).toHaveLength(62);
    for (const row of known) {
      if (!row.primary.result.ok || row.before === null) throw new Error('these have values');
      expect(row.change).toBe(row.primary.result.value - row.before.value);
      expect(row.before.run.id).toBe(run.id);
    }
  });

  it('is found by book and by status, newest first', async () => {
    const found = await acts.list(analyst, { bookId: bookIds[0], status: 'finished' });
    expect(found.items.map(({ snapshot: { date } }) => date)).toEqual(['2026-11-30', '2026-11-27']);
    const one = await acts.list(analyst, { bookId: bookIds[0], limit: '1' });
    const two = await acts.list(analyst, { limit: '1', cursor: one.nextCursor ?? '' });
    expect(two.items[0].id).toBe(run.id);
  });
});

describe('a policy that refines to a share of the tolerance', () => {
  it('has each route as fine as that asks for, and on record as it was', async () => {
    const elsewhere = await makeDesk();
    const theirs = await makeUnderlying(elsewhere, { tolerance: 0.02 });
    const member = await makeMember(elsewhere, 'analyst');
    await makeDraftPolicy(elsewhere, await makeUser(), { sizes: null, toleranceShare: 0.25 });
    await nextPolicyNumber(elsewhere);
    const book = await makeFilledBook(elsewhere, theirs, 2, { exercise: 'american' });
    const close = await makeApprovedClose(elsewhere, theirs, '2026-11-27');
    const draft = { bookIds: [book.id], snapshotId: close.id };
    const { body } = await runActs(elsewhere).start(member, draft);
    await workOffRun(body.id);
    const bodies = await bodiesOf(body.id);
    expect(bodies).toHaveLength(4);
    for (const { request, result } of bodies) {
      if (!result.ok) throw new Error('these are priced');
      expect(result.errorEstimate).toBeLessThanOrEqual(0.005);
      expect(price(request)).toEqual(result);
    }
  });
});

describe('a run that cannot be started', () => {
  it.each([
    ['on a book of nobody', () => ({ bookIds: [randomUUID()], snapshotId: snapshot.id })],
    ['on no book', () => ({ bookIds: [], snapshotId: snapshot.id })],
  ])('%s', async (_case, draft) => {
    expect(told(await acts.start(analyst, draft()))).toEqual([422, 'validation-failed']);
  });

  it('on a close that nobody approved', async () => {
    const book = await makeFilledBook(desk, underlying);
    const answer = await acts.start(analyst, { bookIds: [book.id], snapshotId: randomUUID() });
    expect(answer.body.issues[0]).toMatchObject({ path: 'snapshotId', code: 'not-approved' });
  });

  it('on a book without live trades', async () => {
    const book = await makeBook(desk);
    const answer = await acts.start(analyst, { bookIds: [book.id], snapshotId: snapshot.id });
    expect(sentenceOf(answer)).toBe('These books have no live trades on 2026-11-27.');
  });

  it('on a close that lacks what its trades need, which is named', async () => {
    const other = await makeUnderlying(desk);
    const book = await makeFilledBook(desk, other);
    const answer = await acts.start(analyst, { bookIds: [book.id], snapshotId: snapshot.id });
    expect(answer.body.issues[0]).toMatchObject({ path: 'snapshotId', code: 'incomplete-close' });
    expect(sentenceOf(answer)).toContain(other.symbol);
  });

  it('on a desk without a policy', async () => {
    const elsewhere = await makeDesk();
    const theirs = await makeUnderlying(elsewhere);
    const member = await makeMember(elsewhere, 'analyst');
    const book = await makeFilledBook(elsewhere, theirs);
    const close = await makeApprovedClose(elsewhere, theirs, '2026-11-27');
    const draft = { bookIds: [book.id], snapshotId: close.id };
    const answer = await runActs(elsewhere).start(member, draft);
    expect(answer.body.issues[0].code).toBe('no-policy');
  });

  it('twice by one request: the second copy finds the first one’s answer', async () => {
    const book = await makeFilledBook(desk, underlying);
    const draft = { bookIds: [book.id], snapshotId: snapshot.id };
    const key = randomUUID();
    const [one, two] = await Promise.all([
      acts.start(analyst, draft, key),
      acts.start(analyst, draft, key),
    ]);
    expect([one.status, two.status]).toEqual([201, 201]);
    expect(two.body.id).toBe(one.body.id);
  });
});

describe('work that does not go straight', () => {
  it('doubles nothing when a chunk is done twice, even at the same moment', async () => {
    const { id } = await start([await makeFilledBook(desk, underlying, 3)]);
    await Promise.all([runChunk(id, 1), runChunk(id, 1), runChunk(id, 1)]);
    await runChunk(id, 1);
    expect(await acts.read(analyst, id)).toMatchObject({ status: 'finished', done: 3 });
    expect(await bodiesOf(id)).toHaveLength(6);
  });

  it('stops when it is cancelled, keeps what it has, and leaves the trades as they were', async () => {
    const book = await makeFilledBook(desk, underlying, 51);
    const { id } = await start([book]);
    await runChunk(id, 1);
    const cancelled = await acts.cancel(analyst, id);
    expect(cancelled.body).toMatchObject({
      status: 'cancelled',
      done: 50,
      totals: [],
      cancellation: { by: { id: analyst.user.id } },
    });
    await workOff();
    expect(await acts.read(analyst, id)).toMatchObject({ status: 'cancelled', done: 50 });
    expect(await bodiesOf(id)).toHaveLength(100);
    expect(await Trade.count({ where: { bookId: book.id, lastRunId: id } })).toBe(0);
    expect(sentenceOf(await acts.cancel(analyst, id))).toMatch(/R-\d+ was cancelled\.$/);
    // The book is free again.
    expect((await start([book])).status).toBe('queued');
  });

  it('drops the chunk that was being computed while it was cancelled', async () => {
    const { id } = await start([await makeFilledBook(desk, underlying, 3)]);
    const computing = runChunk(id, 1);
    await acts.cancel(analyst, id);
    await computing;
    const { status, done } = await acts.read(analyst, id);
    expect([status === 'cancelled' ? 0 : 3, (await bodiesOf(id)).length]).toEqual([done, 2 * done]);
  });
});
