/** Quotes: priced again by the server, numbered without gaps, refused field by field. */
import { call, withServer } from './support/server';
import { tableState } from './support/table-state';
import { randomUUID } from 'node:crypto';
import type { Response } from 'supertest';
import { price } from '@/pricing/index';
import type { Desk } from '@/server/models/desk';
import { Quote } from '@/server/models/quote';
import type { Underlying } from '@/server/models/underlying';
import * as quotes from '@/shared/contracts/quotes';
import { listUnderlyings } from '@/shared/contracts/underlyings';
import type { Issue } from '@/shared/errors';
import { makeApprovedClose, makeShare, makeUnderlying } from '../factories/market';
import { makeDesk, makeMember, type TestMember } from '../factories/people';
import { quoteDraft } from '../factories/quotes';

withServer();

let desk: Desk;
let analyst: TestMember;
let future: Underlying;
let share: Underlying;

beforeEach(async () => {
  desk = await makeDesk();
  analyst = await makeMember(desk, 'analyst');
  future = await makeUnderlying(desk);
  share = await makeShare(desk);
});

const save = (body: unknown, idempotencyKey?: string) =>
  call(quotes.createQuote, {
    params: { deskId: desk.id },
    body,
    token: analyst.token,
    idempotencyKey,
  });

const list = (query: Record<string, string | number> = {}) =>
  call(quotes.listQuotes, { params: { deskId: desk.id }, query, token: analyst.token });

const read = (quoteId: string) =>
  call(quotes.getQuote, { params: { deskId: desk.id, quoteId }, token: analyst.token });

const numbersOf = ({ body }: Response): string[] =>
  body.items.map(({ number }: { number: string }) => number);

const shareDraft = (fields: Partial<quotes.QuoteDraft> = {}) => quoteDraft(share, fields);

test.each(['european', 'american'] as const)(
  'every route of a stored %s quote gives the same 64 bits again',
  async (exercise) => {
    const saved = await save(shareDraft({ exercise, kind: 'call' }));
    expect(saved.status).toBe(201);
    const stored: quotes.Quote = (await read(saved.body.id)).body;
    expect(stored.routes.length).toBeGreaterThan(1);
    for (const { result } of stored.routes) {
      if (!result.ok) throw new Error(result.message);
      const { expiryYears, strike, kind, market } = stored;
      const contract = {
        payoff: 'vanilla',
        exercise,
        kind,
        strike: Number(strike),
        expiry: expiryYears,
      };
      expect(price({ contract, market, method: result.method })).toEqual(result);
    }
    const primary = stored.routes.find(({ name }) => name === stored.primaryRoute);
    expect(primary?.result).toMatchObject({ value: stored.value });
    expect(stored.primaryRoute).toBe(
      exercise === 'european' ? 'closed-form' : 'heat-crank-nicolson',
    );
  },
);

test('a quote keeps what it rests on, and says the same wherever it is read', async () => {
  const close = await makeApprovedClose(desk, future, '2026-11-27');
  const draft = quoteDraft(future, { note: 'By phone', quantity: '12.5' });
  const saved = await save(draft);
  expect(saved.body).toMatchObject({
    number: 'Q-0001',
    quantity: '12.5',
    contractSize: '50',
    strike: '210',
    market: draft.market,
    pricedAt: draft.pricedAt,
    expiryDate: draft.expiryDate,
    snapshotId: close.id,
    verdict: 'agree',
    refuted: false,
    tolerance: 0.01,
    indicativeValue: 13.2343,
    note: 'By phone',
    underlying: { id: future.id, symbol: future.symbol },
    createdBy: { id: analyst.user.id, name: analyst.user.name },
  });
  expect((await read(saved.body.id)).body).toEqual(saved.body);
  const [row] = (await list()).body.items;
  expect(saved.body).toMatchObject(row);
});

test('the total is exact in decimals: negative when the desk sells, positive when it buys', async () => {
  const sold = await save(shareDraft({ quantity: '3', contractSize: '0.1', direction: 'sell' }));
  const bought = await save(shareDraft({ quantity: '3', contractSize: '0.1', direction: 'buy' }));
  const { value } = bought.body;
  // By hand: the value's decimal text times 0.3, as a whole number of its last digit.
  const [whole, fraction] = String(value).split('.');
  const units = BigInt(whole + fraction) * 3n;
  const exact = `${units}`.padStart(fraction.length + 2, '0');
  const text = `${exact.slice(0, -fraction.length - 1)}.${exact.slice(-fraction.length - 1)}`;
  expect(Number(bought.body.total)).toBeCloseTo(Number(text), 9);
  expect(bought.body.total).toMatch(/^\d+\.\d{1,10}$/);
  expect(sold.body.total).toMatch(/^-/);
});

test('expiry is the desk’s cut-off of that day, in its zone, by ACT/365', async () => {
  // Berlin is one hour ahead of UTC in January: 17:30 there is 16:30 UTC.
  const year = new Date().getUTCFullYear() + 1;
  const saved = await save(shareDraft({ expiryDate: `${year}-01-15` }));
  const { expiryAt, expiryYears, pricedAt } = saved.body;
  expect(expiryAt).toBe(`${year}-01-15T16:30:00.000Z`);
  const days = (Date.parse(expiryAt) - Date.parse(pricedAt)) / 86_400_000;
  expect(expiryYears).toBeCloseTo(days / 365, 14);
});

describe('what cannot be is refused at its field', () => {
  const soon = (seconds: number) => new Date(Date.now() + seconds * 1000).toISOString();
  const market = (changes: object) => ({
    spot: 100,
    rate: 0.03,
    yield: 0.01,
    volatility: 0.2,
    ...changes,
  });
  const cases: [string, object, string][] = [
    ['an empty strike', { strike: '' }, 'strike'],
    ['a negative strike', { strike: '-210' }, 'strike'],
    ['a strike of zero', { strike: '0' }, 'strike'],
    ['a strike in words', { strike: 'two hundred' }, 'strike'],
    ['a strike with a comma', { strike: '210,5' }, 'strike'],
    ['a strike as a number', { strike: 210 }, 'strike'],
    ['an absurd strike', { strike: '1e300' }, 'strike'],
    ['no quantity', { quantity: undefined }, 'quantity'],
    ['a quantity of zero', { quantity: '0.0' }, 'quantity'],
    ['a negative contract size', { contractSize: '-1' }, 'contractSize'],
    ['no such day', { expiryDate: '2027-02-30' }, 'expiryDate'],
    ['a past expiry', { expiryDate: '2020-01-31' }, 'expiryDate'],
    ['a tenor in place of a day', { expiryDate: '3m' }, 'expiryDate'],
    ['an instant of yesterday', { pricedAt: soon(-86_400 - 60) }, 'pricedAt'],
    ['an instant to come', { pricedAt: soon(180) }, 'pricedAt'],
    ['an instant without offset', { pricedAt: '2026-12-01T10:00:00' }, 'pricedAt'],
    ['a third kind', { kind: 'straddle' }, 'kind'],
    ['an exercise that is not priced', { exercise: 'bermudan' }, 'exercise'],
    ['a negative spot', { market: market({ spot: -1 }) }, 'market.spot'],
    ['a spot of zero', { market: market({ spot: 0 }) }, 'market.spot'],
    ['a spot in words', { market: market({ spot: 'high' }) }, 'market.spot'],
    ['an absurd spot', { market: market({ spot: 1e300 }) }, 'market.spot'],
    ['an absurd rate', { market: market({ rate: 1e300 }) }, 'market.rate'],
    ['a volatility of zero', { market: market({ volatility: 0 }) }, 'market.volatility'],
    ['no volatility', { market: market({ volatility: undefined }) }, 'market.volatility'],
    ['no yield', { market: market({ yield: undefined }) }, 'market.yield'],
    ['a field too many', { market: market({ drift: 0.1 }) }, 'market.drift'],
    ['an unknown field', { colour: 'red' }, 'colour'],
    ['no indicative value', { indicativeValue: null }, 'indicativeValue'],
    ['a note without end', { note: 'x'.repeat(501) }, 'note'],
    ['an underlying of nowhere', { underlyingId: randomUUID() }, 'underlyingId'],
    ['an underlying that is no id', { underlyingId: 'wheat' }, 'underlyingId'],
    ['a position beyond all books', { quantity: '9'.repeat(15), contractSize: '1000' }, 'quantity'],
  ];
  test.each(cases)('%s', async (_case, changes, path) => {
    const before = await tableState();
    const answer = await save({ ...shareDraft(), ...changes });
    expect(answer.status).toBe(422);
    const issues: Issue[] = answer.body.issues;
    expect(issues.map((issue) => issue.path)).toEqual([path]);
    expect(issues[0].message).toMatch(/^[A-Z].*\.$/);
    expect(await tableState()).toEqual(before);
  });

  test('a future’s market on a share, and a share’s on a future', async () => {
    const onShare = await save({ ...shareDraft(), market: quoteDraft(future).market });
    const onFuture = await save({ ...quoteDraft(future), market: shareDraft().market });
    for (const answer of [onShare, onFuture])
      expect([answer.status, answer.body.issues[0].path]).toEqual([422, 'market.yield']);
  });

  test('an underlying of another desk', async () => {
    const foreign = await makeShare(await makeDesk());
    const answer = await save(quoteDraft(foreign));
    expect([answer.status, answer.body.issues[0].path]).toEqual([422, 'underlyingId']);
  });

  test('everything at once, not only the first', async () => {
    const answer = await save({
      ...shareDraft(),
      quantity: '',
      strike: '-1',
      expiryDate: 'soon',
      market: market({ spot: '1', volatility: null }),
    });
    const paths = answer.body.issues.map(({ path }: Issue) => path);
    expect(paths.sort()).toEqual([
      'expiryDate',
      'market.spot',
      'market.volatility',
      'quantity',
      'strike',
    ]);
  });

  test('a body that is no JSON, or too large', async () => {
    const huge = await save({ ...shareDraft(), note: 'x'.repeat(200_000) });
    expect([huge.status, huge.body.code]).toEqual([413, 'request-too-large']);
    const sent = save({}).type('json');
    const broken = await sent.send('{"strike": ');
    expect(broken.status).toBe(400);
  });
});

describe('the same request sent twice', () => {
  test('gives the same answer and one quote', async () => {
    const key = randomUUID();
    const draft = shareDraft();
    const first = await save(draft, key);
    const { note, ...rest } = draft;
    const second = await save({ note, ...rest }, key);
    expect([first.status, second.status]).toEqual([201, 201]);
    expect(second.body).toEqual(first.body);
    expect(await Quote.count({ where: { deskId: desk.id } })).toBe(1);
  });

  test('at once, too', async () => {
    const key = randomUUID();
    const draft = shareDraft();
    const answers = await Promise.all([save(draft, key), save(draft, key), save(draft, key)]);
    expect(new Set(answers.map(({ body }) => body.id)).size).toBe(1);
    expect(answers.map(({ status }) => status)).toEqual([201, 201, 201]);
    expect(await Quote.count({ where: { deskId: desk.id } })).toBe(1);
  });

  test('with other content is refused, and so is one without a key', async () => {
    const key = randomUUID();
    await save(shareDraft(), key);
    const other = await save(shareDraft({ strike: '211' }), key);
    expect([other.status, other.body.code]).toEqual([409, 'idempotency-key-reused']);
    const none = await save(shareDraft(), '');
    expect([none.status, none.body.code]).toEqual([400, 'idempotency-key-missing']);
    const garbled = await save(shareDraft(), 'once');
    expect(garbled.body.code).toBe('idempotency-key-missing');
  });

  test('a refused one may be mended under its key', async () => {
    const key = randomUUID();
    expect((await save(shareDraft({ strike: '0' }), key)).status).toBe(422);
    expect((await save(shareDraft(), key)).status).toBe(201);
  });
});

test('quotes made at once are numbered without gap or double, each desk for itself', async () => {
  const answers = await Promise.all(Array.from({ length: 8 }, () => save(shareDraft())));
  const numbers = answers.map(({ body }) => body.number).sort();
  expect(numbers).toEqual(Array.from({ length: 8 }, (_, index) => `Q-000${index + 1}`));
});

test('the list is searched by number, symbol or name, as typed, and by verdict', async () => {
  const odd = await makeUnderlying(desk, { symbol: 'ODD_100%', name: 'Oats by the sack' });
  await save(shareDraft());
  await save(quoteDraft(odd));
  expect(numbersOf(await list())).toEqual(['Q-0002', 'Q-0001']);
  expect(numbersOf(await list({ search: 'q-0001' }))).toEqual(['Q-0001']);
  expect(numbersOf(await list({ search: 'by the SACK' }))).toEqual(['Q-0002']);
  expect(numbersOf(await list({ search: '_100%' }))).toEqual(['Q-0002']);
  expect(numbersOf(await list({ search: '%' }))).toEqual(['Q-0002']);
  expect(numbersOf(await list({ search: '\\' }))).toEqual([]);
  expect(numbersOf(await list({ verdict: 'agree' }))).toEqual(['Q-0002', 'Q-0001']);
  expect(numbersOf(await list({ verdict: 'disagree' }))).toEqual([]);
});

test('a quote of another desk is not found, even by one who is on both', async () => {
  const other = await makeMember(await makeDesk(), 'analyst');
  const saved = await save(shareDraft());
  const answer = await call(quotes.getQuote, {
    params: { deskId: other.membership.deskId, quoteId: saved.body.id },
    token: other.token,
  });
  expect([answer.status, answer.body.code]).toEqual([404, 'not-found']);
});

test('underlyings come with the last approved close, of their own desk', async () => {
  await makeApprovedClose(desk, future, '2026-11-26');
  const last = await makeApprovedClose(desk, future, '2026-11-27');
  const answer = await call(listUnderlyings, {
    params: { deskId: desk.id },
    token: analyst.token,
  });
  const shown: { id: string; close: unknown; contractSize: string }[] = answer.body.underlyings;
  expect(shown.map(({ id }) => id).sort()).toEqual([future.id, share.id].sort());
  expect(shown.find(({ id }) => id === share.id)?.close).toBeNull();
  expect(shown.find(({ id }) => id === future.id)).toMatchObject({
    contractSize: '50',
    close: {
      snapshotId: last.id,
      date: '2026-11-27',
      market: { spot: 212.4, rate: 0.03, carry: 'future', volatility: 0.245 },
    },
  });
});
