/** The history as people search it: filters, pages, and everything that one value rests on. */
import { call, withServer } from './support/server';
import { randomUUID } from 'node:crypto';
import { price } from '@/pricing/index';
import type { Desk } from '@/server/models/desk';
import type { Underlying } from '@/server/models/underlying';
import type { ValuationBody } from '@/shared/contracts/chain-bodies';
import {
  getHistoryValue,
  listHistory,
  type HistoryRow,
  type HistoryValue,
} from '@/shared/contracts/history';
import { makeUnderlying } from '../factories/market';
import { makeDesk, makeMember, type TestMember } from '../factories/people';
import { recordBody, storeRecord, storeValuations, valuationPair } from '../factories/valuations';

withServer();

let desk: Desk;
let auditor: TestMember;
let wheat: Underlying;
let barley: Underlying;
const bookId = randomUUID();

const store = (fields: Partial<ValuationBody>, underlying = wheat) =>
  storeValuations(desk, [...valuationPair(underlying, fields)]);

beforeAll(async () => {
  desk = await makeDesk({ timeZone: 'Europe/Berlin' });
  auditor = await makeMember(desk, 'auditor');
  wheat = await makeUnderlying(desk);
  barley = await makeUnderlying(desk);
  await store({ tradeNumber: 'T-0001', valuedAt: '2026-11-27T16:30:00.000Z', bookId });
  await store({ tradeNumber: 'T-0002', valuedAt: '2026-11-27T16:30:00.000Z' }, barley);
  await store({
    tradeNumber: 'T-0001',
    valuedAt: '2026-11-30T16:30:00.000Z',
    runNumber: 'R-0002',
    verdict: 'disagree',
  });
  // Half past midnight in Berlin: the day after, by the desk's clock.
  await store({ tradeNumber: 'T-0003', valuedAt: '2026-11-30T23:30:00.000Z' });
});

type Page = { items: HistoryRow[]; nextCursor: string | null };

async function list(query: Record<string, string | number> = {}): Promise<Page> {
  const answer = await call(listHistory, {
    params: { deskId: desk.id },
    query,
    token: auditor.token,
  });
  expect({ status: answer.status, issues: answer.body.issues }).toEqual({ status: 200 });
  return answer.body;
}

const found = ({ items }: Page) =>
  items.map(({ body }) => `${body.tradeNumber} ${body.valuedAt.slice(0, 16)}`);

test('newest valuation first, each with its check', async () => {
  const page = await list();
  expect(found(page)).toEqual([
    'T-0003 2026-11-30T23:30',
    'T-0001 2026-11-30T16:30',
    'T-0002 2026-11-27T16:30',
    'T-0001 2026-11-27T16:30',
  ]);
  for (const { body, check } of page.items)
    expect(check).toMatchObject({ role: 'check', tradeVersionId: body.tradeVersionId });
});

test.each([
  ['trade', () => ({ trade: 'T-0001' }), ['T-0001 2026-11-30T16:30', 'T-0001 2026-11-27T16:30']],
  ['run', () => ({ run: 'R-0002' }), ['T-0001 2026-11-30T16:30']],
  ['book', () => ({ bookId }), ['T-0001 2026-11-27T16:30']],
  ['underlying', () => ({ underlyingId: barley.id }), ['T-0002 2026-11-27T16:30']],
  ['verdict', () => ({ verdict: 'disagree' }), ['T-0001 2026-11-30T16:30']],
  ['first day', () => ({ from: '2026-12-01' }), ['T-0003 2026-11-30T23:30']],
  ['both days', () => ({ from: '2026-11-28', to: '2026-11-30' }), ['T-0001 2026-11-30T16:30']],
  ['several at once', () => ({ trade: 'T-0001', verdict: 'agree' }), ['T-0001 2026-11-27T16:30']],
  ['what nothing has', () => ({ trade: 'T-9999' }), []],
] satisfies [string, () => Record<string, string>, string[]][])(
  'filtered by %s',
  async (_filter, query, expected) => {
    expect(found(await list(query()))).toEqual(expected);
  },
);

test('pages join without a gap, whatever is added meanwhile', async () => {
  const first = await list({ limit: 2 });
  await store({ tradeNumber: 'T-0004', valuedAt: '2026-12-01T16:30:00.000Z' });
  const second = await list({ limit: 2, cursor: String(first.nextCursor) });
  expect([...found(first), ...found(second)]).toEqual([
    'T-0003 2026-11-30T23:30',
    'T-0001 2026-11-30T16:30',
    'T-0002 2026-11-27T16:30',
    'T-0001 2026-11-27T16:30',
  ]);
  expect(second.nextCursor).toBeNull();
});

test('a cursor of one’s own making is refused', async () => {
  const answer = await call(listHistory, {
    params: { deskId: desk.id },
    query: { cursor: 'here' },
    token: auditor.token,
  });
  expect(answer.status).toBe(422);
  expect(answer.body.issues).toMatchObject([{ path: 'cursor', code: 'not-a-cursor' }]);
});

test('another desk’s values are not seen', async () => {
  const other = await makeDesk();
  const { token } = await makeMember(other, 'auditor');
  const answer = await call(listHistory, { params: { deskId: other.id }, token });
  expect(answer.body).toEqual({ items: [], nextCursor: null });
});

async function read(position: number): Promise<HistoryValue> {
  const answer = await call(getHistoryValue, {
    params: { deskId: desk.id, position: String(position) },
    token: auditor.token,
  });
  expect({ status: answer.status, issues: answer.body.issues }).toEqual({ status: 200 });
  return answer.body;
}

describe('one value', () => {
  test('brings the request that gives the same bits again', async () => {
    const [{ position }] = (await list()).items;
    const { valuations } = await read(position);
    expect(valuations.map(({ body }) => body.role)).toEqual(['primary', 'check']);
    for (const { body } of valuations) expect(price(body.request)).toEqual(body.result);
  });

  test('brings the value before it, and none before the first', async () => {
    const { items } = await list({ trade: 'T-0001' });
    const [newer, older] = items;
    expect((await read(newer.position)).before).toMatchObject({
      position: older.position,
      valuedAt: older.body.valuedAt,
    });
    expect((await read(older.position)).before).toBeNull();
  });

  test('brings what is on record about its trade, run, market data and policy', async () => {
    const { items } = await list({ trade: 'T-0002' });
    const { body, position } = items[0];
    const by = auditor.user.id;
    const about = (type: string, id: string) => recordBody({ subject: { type, id }, by });
    await storeRecord(desk, about('trade', body.tradeId));
    await storeRecord(desk, about('run', body.runId));
    await storeRecord(desk, about('market-snapshot', body.snapshotId));
    await storeRecord(desk, about('policy', body.policyId));
    await storeRecord(desk, about('trade', randomUUID()));
    const { records } = await read(position);
    expect(records.map((record) => record.body.subject.type)).toEqual([
      'trade',
      'run',
      'market-snapshot',
      'policy',
    ]);
    expect(records[0].by).toEqual({ id: by, name: auditor.user.name });
  });

  test('is found by its check’s position too, and nothing is found beyond the head', async () => {
    const [{ position }] = (await list()).items;
    expect(await read(position + 1)).toEqual(await read(position));
    const answer = await call(getHistoryValue, {
      params: { deskId: desk.id, position: '100000' },
      token: auditor.token,
    });
    expect({ status: answer.status, code: answer.body.code }).toEqual({
      status: 404,
      code: 'not-found',
    });
  });
});
