/** Lists by keyset: every row once, in order, whatever is added meanwhile. */
import { call, withServer } from './support/server';
import type { Desk } from '@/server/models/desk';
import type { Underlying } from '@/server/models/underlying';
import { listAccessEvents } from '@/shared/contracts/people';
import { listQuotes } from '@/shared/contracts/quotes';
import { makeUnderlying } from '../factories/market';
import { makeDesk, makeGrant, makeMember, type TestMember } from '../factories/people';
import { makeQuote } from '../factories/quotes';

withServer();

const rowCount = 330;
let desk: Desk;
let head: TestMember;
let underlying: Underlying;

/** Seven rows share each instant, so that order and cursor have to look at the id as well. */
const instantOf = (index: number) => new Date(Date.UTC(2026, 10, 2) + Math.floor(index / 7) * 1000);

beforeAll(async () => {
  desk = await makeDesk();
  head = await makeMember(desk, 'desk-head');
  underlying = await makeUnderlying(desk);
  for (let index = 0; index < rowCount; index += 1)
    await makeQuote(desk, underlying, head.user, instantOf(index));
});

type Row = { id: string; createdAt: string };

async function readAll(limit: number, between: (page: number) => Promise<void>): Promise<Row[]> {
  const rows: Row[] = [];
  let cursor: string | null = null;
  let page = 0;
  do {
    const answer = await call(listQuotes, {
      params: { deskId: desk.id },
      query: { limit, ...(cursor === null ? {} : { cursor }) },
      token: head.token,
    });
    expect(answer.status).toBe(200);
    expect(answer.body.items.length).toBeLessThanOrEqual(limit);
    rows.push(...answer.body.items);
    cursor = answer.body.nextCursor;
    page += 1;
    await between(page);
  } while (cursor !== null);
  return rows;
}

const keyOf = ({ createdAt, id }: Row) => `${createdAt} ${id}`;

test.each([200, 50, 13])('pages of %i hold every row once, newest first', async (limit) => {
  const rows = await readAll(limit, async () => {});
  expect(rows).toHaveLength(rowCount);
  const keys = rows.map(keyOf);
  expect(keys).toEqual([...new Set(keys)].sort().reverse());
});

test('rows that are added while someone leafs through shift nothing', async () => {
  const before = (await readAll(200, async () => {})).map(keyOf);
  const during = await readAll(50, async () => {
    await makeQuote(desk, underlying, head.user);
  });
  expect(during.map(keyOf)).toEqual(before);
});

test('events are paged in the same way', async () => {
  for (let index = 0; index < 5; index += 1)
    await makeGrant(desk, head.user, 'price', { madeAt: instantOf(0) });
  const seen: string[] = [];
  let cursor: string | undefined;
  do {
    const query: Record<string, string | number> = { limit: 2, ...(cursor ? { cursor } : {}) };
    const params = { deskId: desk.id };
    const { body } = await call(listAccessEvents, { params, query, token: head.token });
    seen.push(...body.items.map(({ id }: Row) => id));
    cursor = body.nextCursor ?? undefined;
  } while (cursor);
  expect(new Set(seen).size).toBe(5);
  expect(seen).toHaveLength(5);
});

test.each([
  ['cursor', { cursor: 'page-2' }],
  ['cursor', { cursor: Buffer.from('["2026-12-01T00:00:00Z","x"]').toString('base64url') }],
  ['limit', { limit: 0 }],
  ['limit', { limit: 201 }],
  ['limit', { limit: 'many' }],
  ['page', { page: 2 }],
])('a %s that is none is refused: %j', async (path, query) => {
  const answer = await call(listQuotes, { params: { deskId: desk.id }, query, token: head.token });
  expect([answer.status, answer.body.issues[0].path]).toEqual([422, path]);
});
