/** A book’s list: every order, filter and page over more than a thousand trades. */
import { call, withServer } from './support/server';
import { sequelize } from '@/server/database';
import type { Book } from '@/server/models/book';
import type { Desk } from '@/server/models/desk';
import type { Underlying } from '@/server/models/underlying';
import { liveTradesOfBooks, recordLastValues } from '@/server/services/trades';
import {
  listTrades,
  sortDirections,
  tradeSorts,
  type TradeSort,
  type TradeSummary,
} from '@/shared/contracts/trades';
import { makeUnderlying } from '../factories/market';
import { makeDesk, makeMember, type TestMember } from '../factories/people';
import { makeBook, makeTrade } from '../factories/trades';
import { fillBook } from '../factories/many-trades';

withServer();

const count = 1_050;
let desk: Desk;
let books: Book[];
let underlyings: Underlying[];
let head: TestMember;
let analyst: TestMember;

beforeAll(async () => {
  desk = await makeDesk();
  books = [await makeBook(desk), await makeBook(desk)];
  underlyings = [
    await makeUnderlying(desk, { symbol: 'AAA_1', name: 'Oats by the sack' }),
    await makeUnderlying(desk, { symbol: 'BBB-2', name: 'Winter barley' }),
  ];
  head = await makeMember(desk, 'desk-head');
  analyst = await makeMember(desk, 'analyst');
  await fillBook({
    book: books[0],
    underlyings,
    proposer: analyst.user,
    approver: head.user,
    count,
  });
  await makeTrade(books[1], underlyings[0], analyst.user, {
    version: { counterparty: 'Hollin & Sons 100%' },
  });
});

type Query = Record<string, string | number>;

const ask = (query: Query) =>
  call(listTrades, { params: { deskId: desk.id }, query, token: analyst.token });

async function readAll(query: Query, limit = 200): Promise<TradeSummary[]> {
  const rows: TradeSummary[] = [];
  let cursor: string | null = null;
  do {
    const answer = await ask({ ...query, limit, ...(cursor === null ? {} : { cursor }) });
    expect(answer.status).toBe(200);
    rows.push(...answer.body.items);
    cursor = answer.body.nextCursor;
  } while (cursor !== null);
  return rows;
}

const keys: Record<TradeSort, (row: TradeSummary) => number | string | null> = {
  number: ({ number }) => Number(number.slice(2)),
  underlying: ({ underlying }) => underlying.symbol,
  expiry: ({ expiryAt }) => expiryAt,
  value: ({ lastValuation }) => lastValuation?.value ?? null,
  change: ({ lastValuation }) => lastValuation?.change ?? null,
  total: ({ lastValuation }) => (lastValuation ? Number(lastValuation.total) : null),
};

/** What the order should be, told by sorting here; rows without a value last. */
function isOrdered(found: readonly (number | string | null)[], descending: boolean): boolean {
  return found.slice(1).every((next, index) => {
    const before = found[index];
    if (next === null || before === null) return next === null;
    return descending ? before >= next : before <= next;
  });
}

describe.each(tradeSorts)('by %s', (sort) => {
  test.each(sortDirections)('%s: every trade once, in order', async (direction) => {
    const rows = await readAll({ bookId: books[0].id, sort, direction });
    expect(rows).toHaveLength(count);
    expect(new Set(rows.map(({ id }) => id)).size).toBe(count);
    expect(isOrdered(rows.map(keys[sort]), direction === 'descending')).toBe(true);
  });
});

test('small pages hold the same rows in the same order', async () => {
  const query = { bookId: books[0].id, sort: 'change', direction: 'descending', status: 'live' };
  const wide = await readAll(query);
  const narrow = await readAll(query, 37);
  expect(narrow.map(({ id }) => id)).toEqual(wide.map(({ id }) => id));
});

test('numbers past T-9999 keep their order', async () => {
  const book = await makeBook(desk);
  for (const ordinal of [9_999, 10_000, 10_001])
    await makeTrade(book, underlyings[0], analyst.user, { trade: { ordinal } });
  const rows = await readAll({ bookId: book.id, direction: 'ascending' });
  expect(rows.map(({ number }) => number)).toEqual(['T-9999', 'T-10000', 'T-10001']);
});

test('filters leave only what fits, and may be combined', async () => {
  const all = await readAll({ bookId: books[0].id });
  const expectOnly = async (query: Query, fits: (row: TradeSummary) => boolean) => {
    const rows = await readAll({ bookId: books[0].id, ...query });
    expect(rows.map(({ id }) => id)).toEqual(all.filter(fits).map(({ id }) => id));
    expect(rows.length).toBeGreaterThan(0);
  };
  await expectOnly({ status: 'live' }, ({ status }) => status === 'live');
  await expectOnly({ status: 'waiting' }, ({ status }) => /proposed|amended/.test(status));
  await expectOnly(
    { verdict: 'disagree' },
    ({ lastValuation }) => lastValuation?.verdict === 'disagree',
  );
  await expectOnly(
    { underlyingId: underlyings[1].id, status: 'live' },
    ({ underlying, status }) => underlying.symbol === 'BBB-2' && status === 'live',
  );
});

test('the search finds number, counterparty, symbol and name, as typed', async () => {
  const numbers = async (search: string) => (await readAll({ search })).map(({ number }) => number);
  expect(await numbers('hollin & sons')).toHaveLength(1);
  expect(await numbers('100%')).toHaveLength(1);
  expect(await numbers('t-0007')).toEqual(['T-0007']);
  expect((await numbers('aaa_')).length).toBeGreaterThan(400);
  expect(await numbers('aaa%1')).toEqual([]);
  expect((await numbers('BARLEY')).length).toBeGreaterThan(400);
});

test('a cursor is good for its own order only, and a forged one for none', async () => {
  const { nextCursor } = (await ask({ sort: 'value', limit: 5 })).body;
  const forge = (parts: unknown[]) => Buffer.from(JSON.stringify(parts)).toString('base64url');
  const { id } = analyst.user;
  const wrong: Query[] = [
    { sort: 'expiry', cursor: nextCursor },
    { sort: 'value', direction: 'ascending', cursor: nextCursor },
    { sort: 'value', cursor: forge(['value', 'descending', 'NaN; DROP', id]) },
    { sort: 'number', cursor: forge(['number', 'descending', null, id]) },
    { sort: 'number', cursor: 'page-2' },
  ];
  for (const query of wrong) {
    const answer = await ask(query);
    expect([answer.status, answer.body.issues[0].path]).toEqual([422, 'cursor']);
  }
});

describe('what runs leave on trades', () => {
  const found = (value: number) => ({
    value,
    errorEstimate: 1e-9,
    verdict: 'agree' as const,
    refuted: false,
    total: '-6750',
    strip: [{ name: 'closed-form' as const, value, errorEstimate: 1e-9 }],
    tolerance: 0.01,
  });
  const runs = ['1', '2', '3'].map((digit) => `00000000-0000-4000-8000-00000000000${digit}`);

  test('value and change, by close; an earlier close changes nothing', async () => {
    const book = await makeBook(desk);
    const { id } = await makeTrade(book, underlyings[0], analyst.user, { approver: head.user });
    const store = (runId: string, snapshotDate: string, value: number | null) =>
      sequelize.transaction((transaction) =>
        recordLastValues(transaction, [
          { tradeId: id, runId, snapshotDate, found: value === null ? null : found(value) },
        ]),
      );
    const last = async () => (await readAll({ bookId: book.id }))[0].lastValuation;
    await store(runs[0], '2026-11-26', 13);
    expect(await last()).toMatchObject({ value: 13, change: null, snapshotDate: '2026-11-26' });
    await store(runs[1], '2026-11-27', 13.5);
    expect(await last()).toMatchObject({ value: 13.5, change: 0.5, runId: runs[1] });
    await store(runs[2], '2026-11-27', 13.25);
    expect(await last()).toMatchObject({ value: 13.25, change: 0.25, runId: runs[2] });
    await store(runs[0], '2026-11-26', 99);
    expect(await last()).toMatchObject({ value: 13.25, change: 0.25 });
    await store(runs[0], '2026-11-30', null);
    expect(await last()).toBeNull();
  });

  test('live trades of the chosen books, with everyone who had a hand in them', async () => {
    const book = await makeBook(desk);
    const { id } = await makeTrade(book, underlyings[0], analyst.user, { approver: head.user });
    await makeTrade(book, underlyings[0], analyst.user);
    const rows = await sequelize.transaction((transaction) =>
      liveTradesOfBooks(desk.id, [book.id], transaction),
    );
    expect(rows).toMatchObject([
      {
        tradeId: id,
        bookCode: book.code,
        underlyingId: underlyings[0].id,
        currency: 'EUR',
        quantity: '10',
        strike: '210',
        expiryDate: '2030-06-03',
        expiryAt: new Date('2030-06-03T15:30:00Z'),
      },
    ]);
    expect(rows[0].touchedByIds.sort()).toEqual([analyst.user.id, head.user.id].sort());
  });
});
