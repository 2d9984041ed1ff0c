/** Whoever holds the service's own database password can add to the history, and nothing else. */
import { testEnvironment } from '../support/environment';
import { tableState } from '../support/table-state';
import { withOwnDatabase } from '../support/server';
import { randomUUID } from 'node:crypto';
import { Client } from 'pg';
import { chainOf } from '@/server/chain/append';
import type { Desk } from '@/server/models/desk';
import { makeUnderlying } from '../../factories/market';
import { makeDesk } from '../../factories/people';
import {
  recordBody,
  storeRecord,
  storeValuations,
  valuationPair,
} from '../../factories/valuations';

withOwnDatabase();

let desk: Desk;
let before: Record<string, string>;

beforeAll(async () => {
  desk = await makeDesk();
  await storeValuations(desk, [...valuationPair(await makeUnderlying(desk))]);
  await storeRecord(desk, recordBody());
  before = await tableState();
});

async function asApp(sql: string) {
  const client = new Client({ connectionString: testEnvironment.DATABASE_URL });
  await client.connect();
  try {
    await client.query(sql);
  } finally {
    await client.end();
  }
}

const forged = () => `INSERT INTO chain_entries (chain, position, at, previous, hash, body) VALUES (
  '${chainOf('records', desk.id)}', 2, '2026-12-01T00:00:00.000000Z', '${'0'.repeat(64)}',
  '${'1'.repeat(64)}', '${JSON.stringify(recordBody())}')`;

const attacks: readonly [string, () => string][] = [
  ['changes a body', () => "UPDATE chain_entries SET body = replace(body, '210', '211')"],
  ['changes nothing, as a start', () => 'UPDATE chain_entries SET hash = hash'],
  ['removes a row', () => 'DELETE FROM chain_entries'],
  ['empties the table', () => 'TRUNCATE chain_entries'],
  ['empties everything that hangs on it', () => 'TRUNCATE chain_heads CASCADE'],
  ['inserts a row past the function', forged],
  ['moves the head', () => 'UPDATE chain_heads SET position = 0'],
  ['removes the head', () => 'DELETE FROM chain_heads'],
  ['makes a head', () => `INSERT INTO chain_heads VALUES ('records/${randomUUID()}', 0, '', '')`],
  ['locks the head by hand', () => 'SELECT * FROM chain_heads FOR UPDATE'],
  ['changes a signed head', () => 'UPDATE chain_anchors SET position = 1'],
  ['removes a signed head', () => 'DELETE FROM chain_anchors'],
  ['empties the signed heads', () => 'TRUNCATE chain_anchors'],
  ['disables a trigger', () => 'ALTER TABLE chain_entries DISABLE TRIGGER refuse_row'],
  ['disables all triggers', () => 'ALTER TABLE chain_entries DISABLE TRIGGER ALL'],
  ['drops a trigger', () => 'DROP TRIGGER refuse_row ON chain_entries'],
  [
    'adds a trigger',
    () =>
      'CREATE TRIGGER mine BEFORE INSERT ON chain_entries FOR EACH ROW EXECUTE FUNCTION refuse_change()',
  ],
  ['drops the table', () => 'DROP TABLE chain_entries'],
  ['changes the table', () => 'ALTER TABLE chain_entries DROP COLUMN hash'],
  [
    'replaces the function',
    () =>
      "CREATE OR REPLACE FUNCTION append(chain_name text, bodies text[]) RETURNS void LANGUAGE sql AS ''",
  ],
  ['makes a function of its own', () => "CREATE FUNCTION mine() RETURNS void LANGUAGE sql AS ''"],
  ['makes a table of its own', () => 'CREATE TABLE mine (id integer)'],
  ['makes a schema of its own', () => 'CREATE SCHEMA mine'],
  ['becomes the owner', () => 'SET ROLE owner'],
  ['becomes the superuser', () => 'SET ROLE postgres'],
  ['gives itself the owner’s role', () => 'GRANT owner TO app'],
  ['switches triggers off for its session', () => 'SET session_replication_role = replica'],
  ['calls the guard’s function', () => "SELECT chain_hash('', '', 1, '', '')"],
  ['runs a program', () => "COPY chain_entries TO PROGRAM 'true'"],
];

test.each(attacks)('%s: refused', async (_attack, sql) => {
  await expect(asApp(sql())).rejects.toThrow();
});

test('after all of that not one row has changed', async () => {
  expect(await tableState()).toEqual(before);
});

test('a table of its own in the session does not take the place of the real one', async () => {
  const chain = chainOf('records', desk.id);
  const client = new Client({ connectionString: testEnvironment.DATABASE_URL });
  await client.connect();
  try {
    await client.query('CREATE TEMPORARY TABLE chain_entries (LIKE public.chain_entries)');
    await client.query('CREATE TEMPORARY TABLE chain_heads (LIKE public.chain_heads)');
    await client.query('SET search_path = pg_temp, public');
    const { rows } = await client.query<{ entry_position: string }>(
      'SELECT entry_position FROM public.append($1, $2)',
      [chain, [JSON.stringify(recordBody())]],
    );
    const found = await client.query(
      'SELECT 1 FROM public.chain_entries WHERE chain = $1 AND position = $2',
      [chain, rows[0].entry_position],
    );
    expect(found.rowCount).toBe(1);
  } finally {
    await client.end();
  }
});

test('the owner of the tables is refused too', async () => {
  const client = new Client({ connectionString: testEnvironment.DATABASE_OWNER_URL });
  await client.connect();
  try {
    await client.query('SET ROLE owner');
    for (const sql of [
      'UPDATE chain_entries SET hash = hash',
      'DELETE FROM chain_entries',
      'TRUNCATE chain_entries',
      'UPDATE chain_heads SET position = position',
      'DELETE FROM chain_heads',
    ])
      await expect(client.query(sql)).rejects.toThrow(/refused|only goes forward/);
    await client.query('RESET ROLE; SET session_replication_role = replica');
    await expect(client.query('DELETE FROM chain_entries')).rejects.toThrow(/refused/);
  } finally {
    await client.end();
  }
});
