/** Closes from the first draft to the restated one: four eyes, warnings, and nothing changed after. */
import { asSuperuser } from './support/environment';
import { closeActs, dayBefore, futureMarket, quotesOf } from './support/market-data';
import { call, withServer } from './support/server';
import { randomUUID } from 'node:crypto';
import { sequelize } from '@/server/database';
import { ChainEntry } from '@/server/models/chain-entry';
import type { Desk } from '@/server/models/desk';
import type { Underlying } from '@/server/models/underlying';
import { approvedSnapshot, marketIn } from '@/server/services/market-data';
import { getPreviousClose, listSnapshots, type Snapshot } from '@/shared/contracts/market-data';
import { listUnderlyings } from '@/shared/contracts/underlyings';
import { makeShare, makeUnderlying } from '../factories/market';
import { makeDesk, makeMember, type TestMember } from '../factories/people';

withServer();

let desk: Desk;
let wheat: Underlying;
let barley: Underlying;
let analyst: TestMember;
let second: TestMember;
let officer: TestMember;
let otherOfficer: TestMember;
let acts: ReturnType<typeof closeActs>;

beforeEach(async () => {
  desk = await makeDesk();
  wheat = await makeUnderlying(desk, { name: 'A wheat' });
  barley = await makeUnderlying(desk, { name: 'B barley' });
  analyst = await makeMember(desk, 'analyst');
  second = await makeMember(desk, 'analyst');
  officer = await makeMember(desk, 'risk-officer');
  otherOfficer = await makeMember(desk, 'risk-officer');
  acts = closeActs(desk);
});

const both = () => [wheat, barley];

async function entered(daysAgo = 1, changes = {}): Promise<Snapshot> {
  const date = dayBefore(desk, daysAgo);
  const answer = await acts.enter(analyst, { date, quotes: quotesOf(both(), changes) });
  expect([answer.status, answer.body.issues]).toEqual([201, undefined]);
  return answer.body;
}

async function approved(daysAgo = 1, changes = {}): Promise<Snapshot> {
  const answer = await acts.approve(officer, await entered(daysAgo, changes));
  expect([answer.status, answer.body.issues]).toEqual([200, undefined]);
  return answer.body;
}

const issuesOf = ({ body }: { body: { issues: { path: string; code: string }[] } }) =>
  body.issues.map(({ path, code }) => `${path} ${code}`);

describe('a draft', () => {
  test('is entered once, and read back as it was typed', async () => {
    const date = dayBefore(desk, 1);
    const draft = { date, quotes: quotesOf(both()) };
    const key = randomUUID();
    const first = await acts.enter(analyst, draft, key);
    const again = await acts.enter(analyst, draft, key);
    expect(again).toEqual(first);
    expect(await acts.read(second, first.body.id)).toEqual(first.body);
    expect(first.body).toMatchObject({
      date,
      status: 'draft',
      version: 0,
      source: 'typed',
      makerIds: [analyst.user.id],
      missing: [],
      warnings: [],
      previous: null,
      quotes: [
        { symbol: wheat.symbol, market: futureMarket },
        { symbol: barley.symbol, market: futureMarket },
      ],
    });
  });

  test('is saved whole by another analyst, who is a maker from then on', async () => {
    const draft = await entered();
    const quotes = quotesOf([wheat], { spot: 215 });
    const saved = await acts.save(second, draft, { date: draft.date, quotes, source: 'file' });
    expect(saved.body).toMatchObject({
      version: 1,
      source: 'file',
      makerIds: [analyst.user.id, second.user.id],
      missing: [{ symbol: barley.symbol }],
      quotes: [{ market: { spot: 215 } }],
    });
    const stale = await acts.save(analyst, draft, { date: draft.date, quotes });
    expect([stale.status, stale.body.code]).toEqual([409, 'stale-version']);
  });

  test('says everything that is wrong with it, at its place', async () => {
    const share = await makeShare(desk);
    const answer = await acts.enter(analyst, {
      date: dayBefore(desk, -1),
      quotes: [
        ...quotesOf([wheat, wheat, share]),
        { underlyingId: randomUUID(), market: futureMarket },
        {
          underlyingId: barley.id,
          market: { ...futureMarket, carry: undefined, yield: 0.01 } as never,
        },
      ],
    });
    expect(answer.status).toBe(422);
    expect(issuesOf(answer)).toEqual([
      'date future',
      'quotes.1.underlyingId duplicate',
      'quotes.2.market.yield missing',
      'quotes.3.underlyingId unknown-underlying',
      'quotes.4.market.yield unknown-field',
    ]);
  });

  test('takes no number that the engine would refuse', async () => {
    const date = dayBefore(desk, 1);
    const answer = await acts.enter(analyst, {
      date,
      quotes: quotesOf([wheat], { volatility: 24.5 }),
    });
    expect(answer.status).toBe(422);
    expect(answer.body.issues).toMatchObject([
      {
        path: 'quotes.0.market.volatility',
        message: 'The volatility must lie between 0.001\u00a0% and 1\u00a0000\u00a0%.',
      },
    ]);
  });

  test('is the only one of its day', async () => {
    const { date } = await entered();
    const other = await acts.enter(second, { date, quotes: quotesOf(both()) });
    expect(issuesOf(other)).toEqual(['date draft-already']);
  });
});

describe('approval', () => {
  test('makes the close official, and the ticket starts from it', async () => {
    await approved(2);
    const close = await approved(1, { spot: 214 });
    expect(close).toMatchObject({
      status: 'approved',
      version: 1,
      approvedBy: { id: officer.user.id },
    });
    expect(close.previous?.date).toBe(dayBefore(desk, 2));
    const { body } = await call(listUnderlyings, {
      params: { deskId: desk.id },
      token: analyst.token,
    });
    expect(body.underlyings).toMatchObject([
      { close: { snapshotId: close.id, date: close.date, market: { spot: 214 } } },
      { close: { snapshotId: close.id } },
    ]);
  });

  test('is sealed in the desk’s records with its numbers', async () => {
    const close = await approved();
    const [entry] = await ChainEntry.findAll({ where: { subjectId: close.id } });
    expect(entry.chain).toBe(`records/${desk.id}`);
    expect(JSON.parse(entry.body)).toEqual({
      kind: 'market-data',
      event: 'approved',
      subject: { type: 'market-snapshot', id: close.id, version: 1 },
      by: officer.user.id,
      details: {
        date: close.date,
        makerIds: [analyst.user.id],
        confirmedWarnings: [],
        quotes: quotesOf(both()),
      },
    });
  });

  test('is never by someone who had a hand in it', async () => {
    const draft = await entered();
    await asSuperuser('UPDATE memberships SET role = $1 WHERE user_id = $2', [
      'risk-officer',
      analyst.user.id,
    ]);
    const answer = await acts.approve(analyst, draft);
    expect([answer.status, answer.body.code]).toEqual([403, 'own-work']);
    await expect(
      sequelize.query(
        "UPDATE market_snapshots SET status = 'approved', approved_by_id = $by, approved_at = now() WHERE id = $id",
        { bind: { by: analyst.user.id, id: draft.id } },
      ),
    ).rejects.toThrow(/check constraint/);
  });

  test('waits until every underlying has a close', async () => {
    const date = dayBefore(desk, 1);
    const { body } = await acts.enter(analyst, { date, quotes: quotesOf([wheat]) });
    const answer = await acts.approve(officer, body);
    expect([answer.status, ...issuesOf(answer)]).toEqual([422, 'quotes incomplete']);
  });

  test('is asked for once: who comes second is told', async () => {
    const draft = await entered();
    const answers = await Promise.all([
      acts.approve(officer, draft),
      acts.approve(otherOfficer, draft),
    ]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
    const lost = answers.find(({ status }) => status === 409);
    expect(lost?.body.issues[0].message).toBe(
      `Someone was first: the close of ${draft.date} is approved, and can be restated only.`,
    );
    expect((await acts.read(officer, draft.id)).version).toBe(1);
  });

  test('against a change of the same draft: one wins, and nothing is half of each', async () => {
    const draft = await entered();
    const change = { date: draft.date, quotes: quotesOf(both(), { spot: 215 }) };
    const [approval, saving] = await Promise.all([
      acts.approve(officer, draft),
      acts.save(second, draft, change),
    ]);
    expect([approval.status, saving.status].sort()).toEqual([200, 409]);
    const after = await acts.read(officer, draft.id);
    const isApproved = approval.status === 200;
    expect(after.status).toBe(isApproved ? 'approved' : 'draft');
    for (const { market } of after.quotes) expect(market.spot).toBe(isApproved ? 212.4 : 215);
  });
});

describe('unlikely numbers', () => {
  test('are confirmed by who enters and by who approves', async () => {
    await approved(2);
    const draft = { date: dayBefore(desk, 1), quotes: quotesOf([wheat, barley]) };
    draft.quotes[0].market = { ...futureMarket, spot: 212.4 * 1.25 };
    draft.quotes[1].market = { ...futureMarket, volatility: 3.5 };
    const refused = await acts.enter(analyst, draft);
    expect(refused.body.issues).toMatchObject([
      {
        path: 'confirmedWarnings',
        message: `${wheat.symbol}: the price is 25.0\u00a0% above the close before.`,
      },
      {
        path: 'confirmedWarnings',
        message: `${barley.symbol}: a volatility of 350\u00a0% is outside 1\u00a0% to 300\u00a0%.`,
      },
    ]);
    const confirmedWarnings = [`${wheat.id} large-move`, `${barley.id} unusual-volatility`];
    const { body } = await acts.enter(analyst, { ...draft, confirmedWarnings });
    expect(body.warnings.map(({ code }) => code)).toEqual(['large-move', 'unusual-volatility']);
    const unseen = await acts.approve(officer, body, confirmedWarnings.slice(0, 1));
    expect(issuesOf(unseen)).toEqual(['confirmedWarnings unconfirmed']);
    expect((await acts.approve(officer, body, confirmedWarnings)).status).toBe(200);
  });

  test('are told from the last approved close of an earlier day', async () => {
    await approved(3);
    await entered(2, { spot: 213 });
    const { body } = await call(getPreviousClose, {
      params: { deskId: desk.id, date: dayBefore(desk, 1) },
      token: analyst.token,
    });
    expect(body.close.date).toBe(dayBefore(desk, 3));
  });
});

describe('a restatement', () => {
  test('supersedes the close of its day once it is approved, and not before', async () => {
    const close = await approved();
    const restated = await acts.restate(analyst, close.id);
    expect(restated.body).toMatchObject({
      status: 'draft',
      source: 'restatement',
      restatesId: close.id,
      reason: 'The exchange has corrected its settlement price',
      quotes: close.quotes,
    });
    const saved = await acts.save(analyst, restated.body, {
      date: close.date,
      quotes: quotesOf(both(), { spot: 213 }),
    });
    expect((await acts.read(officer, close.id)).status).toBe('approved');
    expect((await approvedSnapshot(desk.id))?.id).toBe(close.id);
    expect((await acts.approve(officer, saved.body)).status).toBe(200);
    expect(await acts.read(officer, close.id)).toMatchObject({
      status: 'superseded',
      supersededById: saved.body.id,
      quotes: close.quotes,
    });
    const last = await approvedSnapshot(desk.id);
    expect(last && marketIn(last, wheat.id)).toEqual({ ...futureMarket, spot: 213 });
    expect(await approvedSnapshot(desk.id, close.id)).toBeNull();
  });

  test('is the only way to change an approved day, and keeps it', async () => {
    const close = await approved();
    const again = await acts.enter(second, { date: close.date, quotes: quotesOf(both()) });
    expect(issuesOf(again)).toEqual(['date approved-already']);
    const { body } = await acts.restate(analyst, close.id);
    const moved = await acts.save(analyst, body, {
      date: dayBefore(desk, 5),
      quotes: quotesOf(both()),
    });
    expect(issuesOf(moved)).toEqual(['date restated-day']);
    expect(issuesOf(await acts.restate(second, close.id))).toEqual(['date draft-already']);
    expect((await acts.restate(analyst, body.id)).body.code).toBe('wrong-state');
  });
});

describe('the list', () => {
  test('goes from the newest day back, in pages and by state', async () => {
    for (const days of [3, 1, 2]) await approved(days);
    const { id } = await entered(0);
    const read = async (query: Record<string, string | number>) =>
      (await call(listSnapshots, { params: { deskId: desk.id }, query, token: officer.token }))
        .body;
    const first = await read({ limit: 3 });
    const next = await read({ limit: 3, cursor: first.nextCursor });
    const days = [...first.items, ...next.items].map(({ date }: Snapshot) => date);
    expect(days).toEqual([0, 1, 2, 3].map((count) => dayBefore(desk, count)));
    expect(next.nextCursor).toBeNull();
    expect((await read({ status: 'draft' })).items).toMatchObject([{ id, quoteCount: 2 }]);
  });

  test('takes no cursor of its own making', async () => {
    for (const cursor of ['page-2', randomUUID()]) {
      const answer = await call(listSnapshots, {
        params: { deskId: desk.id },
        query: { cursor },
        token: officer.token,
      });
      expect([answer.status, answer.body.issues[0].path]).toEqual([422, 'cursor']);
    }
  });
});
