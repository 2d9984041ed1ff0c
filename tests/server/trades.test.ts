/** Trades from the proposal to their end, as the people of a desk move them. */
import { call, withServer } from './support/server';
import { tableState } from './support/table-state';
import { amendmentOf, tradeActs } from './support/trades';
import { randomUUID } from 'node:crypto';
import type { Book } from '@/server/models/book';
import { ChainEntry } from '@/server/models/chain-entry';
import type { Desk } from '@/server/models/desk';
import type { Quote } from '@/server/models/quote';
import { Trade } from '@/server/models/trade';
import type { Underlying } from '@/server/models/underlying';
import { createBook, listBooks } from '@/shared/contracts/books';
import { recordBodySchema } from '@/shared/contracts/chain-bodies';
import type { Trade as TradeOnTheWire } from '@/shared/contracts/trades';
import { makeUnderlying } from '../factories/market';
import { makeDesk, makeMember, type TestMember } from '../factories/people';
import { daysFromNow, makeQuote } from '../factories/quotes';
import { makeBook, makeTrade, proposal } from '../factories/trades';

withServer();

let desk: Desk;
let underlying: Underlying;
let book: Book;
let quote: Quote;
let analyst: TestMember;
let second: TestMember;
let head: TestMember;
let otherHead: TestMember;
let acts: ReturnType<typeof tradeActs>;

beforeEach(async () => {
  desk = await makeDesk();
  underlying = await makeUnderlying(desk);
  book = await makeBook(desk);
  [analyst, second] = [await makeMember(desk, 'analyst'), await makeMember(desk, 'analyst')];
  [head, otherHead] = [await makeMember(desk, 'desk-head'), await makeMember(desk, 'desk-head')];
  quote = await makeQuote(desk, underlying, analyst.user);
  acts = tradeActs(desk);
});

const proposed = async (who = analyst, fields: object = {}): Promise<TradeOnTheWire> => {
  const answer = await acts.propose(who, proposal(quote.id, book.id, fields));
  expect(answer.status).toBe(201);
  return answer.body;
};
const live = async () => (await acts.approve(head, await proposed())).body;

const eventsOf = ({ events }: TradeOnTheWire) =>
  events.map(({ event, by, versionNumber }) => `${event} ${versionNumber} ${by.name}`);

test('a proposal takes the quote’s terms, gets a number and waits', async () => {
  const trade = await proposed(analyst, { note: 'By phone' });
  expect(trade).toMatchObject({
    number: 'T-0001',
    status: 'proposed',
    version: 0,
    book: { id: book.id, code: book.code },
    underlying: { id: underlying.id, symbol: underlying.symbol },
    direction: 'sell',
    quantity: '10',
    contractSize: '50',
    kind: 'put',
    exercise: 'european',
    strike: '210',
    expiryDate: '2030-06-03',
    // Berlin is two hours ahead of UTC in June.
    expiryAt: '2030-06-03T15:30:00.000Z',
    counterparty: 'Grenmoor Mills',
    liveVersionId: null,
    lastValuation: null,
    end: null,
    proposedBy: { id: analyst.user.id, name: analyst.user.name },
  });
  expect(trade.versions).toMatchObject([
    { number: 1, state: 'proposed', quoteId: quote.id, premiumAmount: '6750.00', note: 'By phone' },
  ]);
  expect(eventsOf(trade)).toEqual([`proposed 1 ${analyst.user.name}`]);
  expect(await acts.read(second, trade.id)).toEqual(trade);
});

test('approval puts the terms in force', async () => {
  const trade = await live();
  expect(trade).toMatchObject({ status: 'live', version: 1 });
  expect(trade.liveVersionId).toBe(trade.latestVersionId);
  expect(trade.versions).toMatchObject([{ state: 'approved', decidedBy: { id: head.user.id } }]);
  expect(eventsOf(trade)).toEqual([
    `proposed 1 ${analyst.user.name}`,
    `approved 1 ${head.user.name}`,
  ]);
});

test('a returned trade is amended, and approved by someone who did neither', async () => {
  const returned = (await acts.return(head, await proposed())).body;
  expect(returned).toMatchObject({ status: 'returned', liveVersionId: null });
  expect(returned.versions[0]).toMatchObject({
    state: 'returned',
    decisionReason: 'The premium does not match the quote',
  });
  const amended = (await acts.amend(otherHead, returned)).body;
  expect(amended).toMatchObject({ status: 'proposed', quantity: '11' });
  const own = await acts.approve(otherHead, amended);
  expect([own.status, own.body.code]).toEqual([403, 'own-trade']);
  const approved = (await acts.approve(head, amended)).body;
  expect(approved.status).toBe('live');
  expect(approved.versions.map(({ number, state }) => [number, state])).toEqual([
    [2, 'approved'],
    [1, 'returned'],
  ]);
});

test('a live trade keeps its terms until the amendment is approved', async () => {
  const amended = (await acts.amend(second, await live())).body;
  expect(amended).toMatchObject({ status: 'amended', quantity: '10' });
  expect(amended.versions.map(({ state }) => state)).toEqual(['proposed', 'approved']);
  const again = (await acts.amend(second, amended, { quantity: '15' })).body;
  expect(again.versions.map(({ state }) => state)).toEqual(['proposed', 'superseded', 'approved']);
  const approved = (await acts.approve(otherHead, again)).body;
  expect(approved).toMatchObject({ status: 'live', quantity: '15' });
  expect(approved.versions.map(({ state }) => state)).toEqual([
    'approved',
    'superseded',
    'superseded',
  ]);
});

test('an amendment that is returned leaves the live terms as they were', async () => {
  const amended = (await acts.amend(second, await live())).body;
  const kept = (await acts.return(head, amended)).body;
  expect(kept).toMatchObject({ status: 'live', quantity: '10' });
  expect(kept.liveVersionId).toBe(kept.versions[1].id);
});

test.each(['approve', 'return'] as const)('nobody may %s what they proposed', async (act) => {
  const answer = await acts[act](head, await proposed(head));
  expect([answer.status, answer.body.code]).toEqual([403, 'own-trade']);
});

test('a live trade is closed by someone else, for an amount', async () => {
  const trade = await live();
  const closed = (await acts.close(otherHead, trade)).body;
  expect(closed).toMatchObject({
    status: 'closed',
    end: { outcome: 'closed', date: '2026-11-20', amount: '-1250.00', currency: 'EUR' },
  });
  expect(eventsOf(closed).at(-1)).toBe(`closed 1 ${otherHead.user.name}`);
  for (const act of ['approve', 'return', 'close'] as const) {
    const answer = await acts[act](head, closed);
    expect([answer.status, answer.body.code]).toEqual([409, 'move-not-allowed']);
  }
});

describe('the end of an option', () => {
  const past = () => {
    const expiryDate = daysFromNow(-5);
    return { expiryDate, expiryAt: new Date(`${expiryDate}T15:30:00Z`) };
  };
  const stored = async (version: object) => {
    const fields = { version, approver: head.user };
    const { id } = await makeTrade(book, underlying, analyst.user, fields);
    return acts.read(analyst, id);
  };

  test.each(['lapsed', 'exercised'])('%s on its day', async (outcome) => {
    const expiry = past();
    const trade = await stored({ exercise: 'european', ...expiry });
    const early = await acts.expire(analyst, trade, outcome, daysFromNow(-6));
    expect([early.status, early.body.issues[0].path]).toEqual([422, 'date']);
    const ended = (await acts.expire(analyst, trade, outcome, expiry.expiryDate)).body;
    expect(ended).toMatchObject({
      status: 'expired',
      end: { outcome, date: expiry.expiryDate, amount: null, currency: null },
    });
  });

  test('an American option is exercised before; nothing else ends early', async () => {
    const american = await stored({ exercise: 'american' });
    const lapse = await acts.expire(analyst, american, 'lapsed', daysFromNow(-1));
    expect([lapse.status, lapse.body.issues[0].path]).toEqual([422, 'outcome']);
    const exercised = await acts.expire(analyst, american, 'exercised', daysFromNow(-1));
    expect(exercised.body.status).toBe('expired');
    const european = await stored({ exercise: 'european' });
    const refused = await acts.expire(analyst, european, 'exercised', daysFromNow(-1));
    expect([refused.status, refused.body.issues[0].path]).toEqual([422, 'outcome']);
  });

  test('takes an amendment that still waits with it', async () => {
    const trade = await stored({ exercise: 'american' });
    const amended = (await acts.amend(second, trade)).body;
    const ended = (await acts.expire(analyst, amended, 'exercised', daysFromNow(0))).body;
    expect(ended.versions.map(({ state }) => state)).toEqual(['superseded', 'approved']);
  });
});

describe('what cannot be is refused at its field, and changes nothing', () => {
  const cases: [string, object, string][] = [
    ['no counterparty', { counterparty: '  ' }, 'counterparty'],
    ['a negative premium', { premiumAmount: '-1' }, 'premiumAmount'],
    ['a premium in words', { premiumAmount: 'much' }, 'premiumAmount'],
    ['no currency', { premiumCurrency: 'Euro' }, 'premiumCurrency'],
    ['no such day', { premiumDate: '2026-02-30' }, 'premiumDate'],
    ['a premium before the trade', { premiumDate: '2026-10-31' }, 'premiumDate'],
    [
      'a trade to come',
      { tradedAt: '2999-01-01T00:00:00Z', premiumDate: '2999-01-02' },
      'tradedAt',
    ],
    ['a trade without offset', { tradedAt: '2026-11-01T10:05:00' }, 'tradedAt'],
    ['a quote of nowhere', { quoteId: randomUUID() }, 'quoteId'],
    ['a book of nowhere', { bookId: randomUUID() }, 'bookId'],
    ['a note without end', { note: 'x'.repeat(501) }, 'note'],
    ['an unknown field', { colour: 'red' }, 'colour'],
  ];
  test.each(cases)('%s', async (_case, changes, path) => {
    const before = await tableState();
    const answer = await acts.propose(analyst, {
      ...proposal(quote.id, book.id),
      ...changes,
    });
    expect([answer.status, answer.body.issues.map((issue) => issue.path)]).toEqual([422, [path]]);
    expect(await tableState()).toEqual(before);
  });

  test('quotes and books of another desk, both named at once', async () => {
    const other = await makeDesk();
    const foreignQuote = await makeQuote(other, await makeUnderlying(other), analyst.user);
    const answer = await acts.propose(
      analyst,
      proposal(foreignQuote.id, (await makeBook(other)).id),
    );
    expect(answer.body.issues.map(({ path }) => path)).toEqual(['quoteId', 'bookId']);
  });

  test('an amendment that changes nothing, or whose expiry has passed', async () => {
    const trade = await proposed();
    const same = await acts.amend(second, trade, { quantity: '10.0' });
    expect([same.status, same.body.issues]).toMatchObject([422, [{ path: '' }]]);
    const past = await acts.amend(second, trade, { expiryDate: daysFromNow(-2) });
    expect(past.body.issues.map(({ path }) => path)).toEqual(['expiryDate']);
  });

  test('a closing in the future, or before the trade', async () => {
    const trade = await live();
    for (const date of [daysFromNow(2), '2026-10-30']) {
      const answer = await acts.close(head, trade, { date });
      expect([answer.status, answer.body.issues[0].path]).toEqual([422, 'date']);
    }
  });
});

test('the same proposal sent twice makes one trade, and so does the same amendment', async () => {
  const key = randomUUID();
  const body = proposal(quote.id, book.id);
  const answers = await Promise.all([1, 2, 3].map(() => acts.propose(analyst, body, key)));
  expect(new Set(answers.map(({ body: { id } }) => id)).size).toBe(1);
  expect(await Trade.count({ where: { deskId: desk.id } })).toBe(1);
  const [{ body: trade }] = answers;
  const again = await Promise.all([1, 2].map(() => acts.amend(second, trade, {}, key)));
  expect(again.map(({ status }) => status)).toEqual([201, 201]);
  expect((await acts.read(analyst, trade.id)).versions).toHaveLength(2);
});

test('proposals made at once are numbered without gap or double', async () => {
  const answers = await Promise.all(
    Array.from({ length: 6 }, () => acts.propose(analyst, proposal(quote.id, book.id))),
  );
  expect(answers.map(({ body }) => body.number).sort()).toEqual(
    Array.from({ length: 6 }, (_, index) => `T-000${index + 1}`),
  );
});

test('every event is sealed in the desk’s records, with figures and ids but no client’s name', async () => {
  const counterparty = 'Secret Client Limited';
  const trade = await proposed(analyst, { counterparty, note: 'Asked for by Mrs Moor' });
  await acts.amend(second, trade, { ...amendmentOf(trade), counterparty });
  const entries = await ChainEntry.findAll({
    where: { chain: `records/${desk.id}`, subjectId: trade.id },
    order: [['position', 'ASC']],
  });
  expect(entries).toHaveLength(2);
  for (const { body } of entries) expect(body).not.toMatch(/Secret|Moor|@/);
  expect(recordBodySchema.parse(JSON.parse(entries[1].body))).toMatchObject({
    kind: 'trade-event',
    event: 'amended',
    subject: { type: 'trade', id: trade.id, version: 2 },
    by: second.user.id,
    details: { number: 'T-0001', bookId: book.id, terms: { quantity: '11', strike: '210' } },
  });
});

test('a trade of another desk is not found', async () => {
  const trade = await proposed();
  const elsewhere = await makeDesk();
  const stranger = await makeMember(elsewhere, 'desk-head');
  const answer = await tradeActs(elsewhere).approve(stranger, trade);
  expect([answer.status, answer.body.code]).toEqual([404, 'not-found']);
});

test('books are counted by what their trades wait for, and a code is used once', async () => {
  await live();
  await proposed();
  await acts.return(head, await proposed());
  const params = { deskId: desk.id };
  const body = { code: ' freight ', name: 'Freight' };
  const made = await call(createBook, { params, token: head.token, body });
  expect([made.status, made.body.code, made.body.live]).toEqual([201, 'FREIGHT', 0]);
  const twice = await call(createBook, { params, token: otherHead.token, body });
  expect([twice.status, twice.body.issues[0].path]).toEqual([422, 'code']);
  const { books } = (await call(listBooks, { params, token: analyst.token })).body;
  expect(books).toMatchObject([
    { code: book.code, live: 1, waiting: 1, returned: 1, ended: 0, doubtful: 0, unvalued: 1 },
    { code: 'FREIGHT', live: 0, waiting: 0 },
  ]);
});
