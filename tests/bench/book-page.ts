/**
 * How long a page of a book of 10,000 trades takes, in every order and with every filter, through
 * the service; and what the database does for it. Set DATABASE_URL and DATABASE_OWNER_URL to a
 * cluster for tests, then: npx tsx tests/bench/book-page.ts
 */
import {
  asSuperuser,
  createEmptyDatabase,
  dropDatabase,
  removeFolder,
  testEnvironment,
} from '../server/support/environment';
import { QueryTypes } from 'sequelize';
import { sequelize } from '@/server/database';
import { migrate } from '@/server/migrate';
import { listTrades, pageStatement, type TradeQuery } from '@/server/services/trade-list';
import { sortDirections, tradeSorts } from '@/shared/contracts/trades';
import { fillBook } from '../factories/many-trades';
import { makeUnderlying } from '../factories/market';
import { makeDesk, makeUser } from '../factories/people';
import { makeBook } from '../factories/trades';

const say = (line: string) => process.stdout.write(`${line}\n`);
const tradeCount = 10_000;
const rounds = 20;

async function prepare() {
  await createEmptyDatabase();
  await migrate(testEnvironment.DATABASE_OWNER_URL, testEnvironment.DATABASE_URL);
  const desk = await makeDesk();
  const book = await makeBook(desk);
  const underlyings = [];
  for (let index = 0; index < 7; index += 1) underlyings.push(await makeUnderlying(desk));
  const people = { proposer: await makeUser(), approver: await makeUser() };
  await fillBook({ book, underlyings, ...people, count: tradeCount });
  // As the database does by itself after a while.
  await asSuperuser('ANALYZE');
  return { desk, book, underlyings };
}

const percentile = (sorted: readonly number[], share: number) =>
  sorted[Math.min(sorted.length - 1, Math.ceil(share * sorted.length) - 1)];

async function measure() {
  const { desk, book, underlyings } = await prepare();
  const plain: TradeQuery = {
    bookId: book.id,
    limit: 50,
    sort: 'number',
    direction: 'descending',
  };
  const cases: [string, TradeQuery][] = [
    ...tradeSorts.flatMap((sort) =>
      sortDirections.map((direction): [string, TradeQuery] => [
        `by ${sort}, ${direction}`,
        { ...plain, sort, direction },
      ]),
    ),
    ['waiting', { ...plain, status: 'waiting' }],
    ['disagree, by change', { ...plain, verdict: 'disagree', sort: 'change' }],
    ['one underlying, by expiry', { ...plain, underlyingId: underlyings[3].id, sort: 'expiry' }],
    ['search for a counterparty', { ...plain, search: 'mill 17' }],
    ['search that finds nothing', { ...plain, search: 'no such words' }],
    ['whole desk, by total', { ...plain, bookId: undefined, sort: 'total' }],
  ];
  const all: number[] = [];
  for (const [name, query] of cases) {
    const times: number[] = [];
    let cursor: string | undefined;
    for (let round = 0; round < rounds; round += 1) {
      const started = performance.now();
      const page = await listTrades(desk, { ...query, cursor });
      times.push(performance.now() - started);
      cursor = page.nextCursor ?? undefined;
    }
    all.push(...times);
    times.sort((a, b) => a - b);
    const [median, p95] = [percentile(times, 0.5), percentile(times, 0.95)];
    say(`${name}: median ${median.toFixed(1)} ms, p95 ${p95.toFixed(1)} ms`);
  }
  all.sort((a, b) => a - b);
  say(
    `all ${all.length} pages of 50 out of ${tradeCount}: p95 ${percentile(all, 0.95).toFixed(1)} ms`,
  );
  if (!process.argv.includes('--plans')) return;
  for (const [name, query] of cases) {
    const { sql, bind } = pageStatement(desk, query);
    const plan = await sequelize.query<{ 'QUERY PLAN': string }>(`EXPLAIN ANALYZE ${sql}`, {
      bind,
      type: QueryTypes.SELECT,
    });
    say(`\n${name}\n${plan.map((row) => row['QUERY PLAN']).join('\n')}`);
  }
}

async function run() {
  try {
    await measure();
  } finally {
    await sequelize.close();
    await dropDatabase();
    removeFolder();
  }
}

run().catch((error: unknown) => {
  process.stderr.write(`${error instanceof Error ? error.stack : String(error)}\n`);
  process.exitCode = 1;
});
