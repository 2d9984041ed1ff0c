/** Appending: no gap and no double whoever appends at once, and one hash in SQL and TypeScript. */
import { asSuperuser, testEnvironment } from '../support/environment';
import { withOwnDatabase } from '../support/server';
import { randomUUID } from 'node:crypto';
import fc from 'fast-check';
import { Client } from 'pg';
import { chainOf } from '@/server/chain/append';
import { entryHash, noHash } from '@/server/chain/hash';
import { verifyChain } from '@/server/chain/verify';
import { ChainEntry } from '@/server/models/chain-entry';
import type { Desk } from '@/server/models/desk';
import type { Underlying } from '@/server/models/underlying';
import { makeUnderlying } from '../../factories/market';
import { makeDesk } from '../../factories/people';
import {
  recordBody,
  storeRecord,
  storeValuations,
  valuationPair,
} from '../../factories/valuations';

withOwnDatabase();

const nothing = async () => undefined;

let desk: Desk;
let underlying: Underlying;

beforeEach(async () => {
  desk = await makeDesk();
  underlying = await makeUnderlying(desk);
});

const entriesOf = (chain: string) =>
  ChainEntry.findAll({ where: { chain }, order: [['position', 'ASC']] });

async function withClients(count: number, work: (client: Client) => Promise<unknown>) {
  const clients = Array.from(
    { length: count },
    () => new Client({ connectionString: testEnvironment.DATABASE_URL }),
  );
  try {
    await Promise.all(clients.map((client) => client.connect()));
    await Promise.all(clients.map(work));
  } finally {
    await Promise.all(clients.map((client) => client.end()));
  }
}

test('an entry carries the hash that its text gives, and the hash before it', async () => {
  await storeValuations(desk, [...valuationPair(underlying)]);
  const [first, second] = await entriesOf(chainOf('valuations', desk.id));
  for (const { chain, previousHash: previous, position, at, body, hash } of [first, second])
    expect(entryHash({ previous, chain, position: Number(position), at, body })).toBe(hash);
  expect(first.previousHash).toBe(noHash);
  expect(second.previousHash).toBe(first.hash);
});

test('SQL and TypeScript hash any text alike', async () => {
  const textOfAnyKind = fc
    .string({ unit: 'grapheme', maxLength: 60 })
    .filter((text) => !text.includes('\u0000'));
  const client = new Client({ connectionString: testEnvironment.DATABASE_OWNER_URL });
  await client.connect();
  try {
    await fc.assert(
      fc.asyncProperty(
        fc.string({ unit: fc.constantFrom(...'0123456789abcdef'), minLength: 64, maxLength: 64 }),
        textOfAnyKind,
        fc.integer({ min: 1, max: Number.MAX_SAFE_INTEGER }),
        textOfAnyKind,
        textOfAnyKind,
        async (previous, chain, position, at, body) => {
          const { rows } = await client.query<{ hash: string }>(
            'SELECT chain_hash($1, $2, $3, $4, $5) AS hash',
            [previous, chain, position, at, body],
          );
          expect(rows[0].hash).toBe(entryHash({ previous, chain, position, at, body }));
        },
      ),
      { numRuns: 200 },
    );
  } finally {
    await client.end();
  }
});

test('text cannot move from one field to the next without changing the hash', () => {
  const one = { previous: noHash, chain: 'ab', position: 1, at: 'c', body: 'd' };
  const other = { previous: noHash, chain: 'a', position: 1, at: 'bc', body: 'd' };
  expect(entryHash(one)).not.toBe(entryHash(other));
});

test('many connections that append at once leave no gap and lose nothing', async () => {
  const chain = chainOf('records', desk.id);
  const [connections, times] = [16, 12];
  await withClients(connections, async (client) => {
    for (let time = 0; time < times; time += 1)
      await client.query('SELECT append($1, $2)', [
        chain,
        [JSON.stringify(recordBody()), JSON.stringify(recordBody())],
      ]);
  });
  const entries = await entriesOf(chain);
  const expected = connections * times * 2;
  expect(entries.map(({ position }) => Number(position))).toEqual(
    Array.from({ length: expected }, (_, index) => index + 1),
  );
  expect(await verifyChain(chain, null, nothing)).toMatchObject({
    checked: expected,
    total: expected,
    firstBreak: null,
  });
});

test('an append that is rolled back leaves its place to the next one', async () => {
  const chain = chainOf('records', desk.id);
  await withClients(1, async (client) => {
    await client.query('BEGIN');
    await client.query('SELECT append($1, $2)', [chain, [JSON.stringify(recordBody())]]);
    await client.query('ROLLBACK');
  });
  const [sealed] = await storeRecord(desk, recordBody());
  expect(sealed.position).toBe(1);
});

test('a chunk that is stored again, or by two workers at once, doubles nothing', async () => {
  const bodies = Array.from({ length: 5 }, () => valuationPair(underlying)).flat();
  await Promise.all([storeValuations(desk, bodies), storeValuations(desk, bodies)]);
  expect(await storeValuations(desk, bodies.slice(0, 4))).toEqual([]);
  expect(await entriesOf(chainOf('valuations', desk.id))).toHaveLength(bodies.length);
});

test('more bodies than one call takes are sealed in their order', async () => {
  const bodies = Array.from({ length: 1003 }, (_, index) => recordBody({ details: { index } }));
  await storeValuations(desk, []);
  const { appendToChain } = await import('@/server/chain/append');
  const { sequelize } = await import('@/server/database');
  const chain = chainOf('records', desk.id);
  const sealed = await sequelize.transaction((transaction) =>
    appendToChain(transaction, chain, bodies),
  );
  expect(sealed.map(({ position }) => position)).toEqual(bodies.map((_, index) => index + 1));
  const entries = await entriesOf(chain);
  expect(entries.map(({ body }) => JSON.parse(body).details.index)).toEqual(
    bodies.map((_, index) => index),
  );
});

test.each([
  ['a body that is no JSON', ['{']],
  ['a body without a kind', ['{"subject":{"id":"00000000-0000-4000-8000-000000000000"}}']],
  ['a record of nothing', ['{"kind":"approval"}']],
  ['a missing body', [null]],
  ['no body at all', []],
  ['a valuation among records', [JSON.stringify({ kind: 'valuation', runId: randomUUID() })]],
])('%s is refused', async (_case, bodies) => {
  const chain = chainOf('records', desk.id);
  await withClients(1, async (client) => {
    await expect(client.query('SELECT append($1, $2)', [chain, bodies])).rejects.toThrow();
  });
  expect(await entriesOf(chain)).toEqual([]);
});

test('a chain that no desk has is refused', async () => {
  await withClients(1, async (client) => {
    const body = JSON.stringify(recordBody());
    for (const chain of [`records/${randomUUID()}`, 'records/x', `other/${desk.id}`])
      await expect(client.query('SELECT append($1, $2)', [chain, [body]])).rejects.toThrow();
  });
});

test('a head from a clock that ran ahead does not turn the order of time round', async () => {
  const chain = chainOf('records', desk.id);
  await storeRecord(desk, recordBody());
  await asSuperuser(
    `SET session_replication_role = replica;
     ALTER TABLE chain_heads DISABLE TRIGGER USER;
     UPDATE chain_heads SET at = '2999-01-01T00:00:00.000000Z' WHERE chain = '${chain}';
     ALTER TABLE chain_heads ENABLE ALWAYS TRIGGER refuse_step_back;
     ALTER TABLE chain_heads ENABLE ALWAYS TRIGGER refuse_row;
     ALTER TABLE chain_heads ENABLE ALWAYS TRIGGER refuse_truncate`,
  );
  const [sealed] = await storeRecord(desk, recordBody());
  expect(sealed.at).toBe('2999-01-01T00:00:00.000000Z');
});
