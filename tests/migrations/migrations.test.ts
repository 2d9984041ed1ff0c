/** The schema: made by many at once, equal to the one on record, and closed to the role that serves. */
import {
  asSuperuser,
  createEmptyDatabase,
  databaseName,
  dropDatabase,
  removeFolder,
  testEnvironment,
  withDatabase,
} from '../server/support/environment';
import { execFileSync } from 'node:child_process';
import { existsSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { Client } from 'pg';
import { migrate } from '@/server/migrate';
import { migrations } from '@/server/migrations';

jest.setTimeout(120_000);

const { DATABASE_URL: appUrl, DATABASE_OWNER_URL: ownerUrl } = testEnvironment;
const names = migrations.map(({ name }) => name);

beforeAll(async () => {
  await createEmptyDatabase();
});
afterAll(async () => {
  await dropDatabase();
  removeFolder();
});

test('of twenty that migrate at once, one does it and all find it done', async () => {
  const taken = await Promise.all(Array.from({ length: 20 }, () => migrate(ownerUrl, appUrl)));
  expect(taken.filter((steps) => steps.length > 0)).toEqual([names]);
  const rows = await asSuperuser<{ name: string }>('SELECT name FROM schema_migrations ORDER BY 1');
  expect(rows.map(({ name }) => name)).toEqual([...names].sort());
});

test('two databases of one cluster are migrated at once', async () => {
  const others = ['a', 'b', 'c'].map((suffix) => `${databaseName}_${suffix}`);
  try {
    await Promise.all(others.map((name) => createEmptyDatabase(name)));
    const taken = await Promise.all(
      others.map((name) => migrate(withDatabase(ownerUrl, name), withDatabase(appUrl, name))),
    );
    expect(taken).toEqual(others.map(() => names));
  } finally {
    await Promise.all(others.map((name) => dropDatabase(name)));
  }
});

test('a step is named by its number and comes in order', () => {
  const files = readdirSync(path.join(__dirname, '..', '..', 'server', 'migrations'))
    .filter((file) => /^\d/.test(file))
    .map((file) => path.basename(file, '.ts'));
  expect([...names].sort()).toEqual(names);
  expect(files.filter((file) => names.includes(file)).sort()).toEqual(names);
});

const serverFolder = '/usr/lib/postgresql';

function pgDump(): string {
  const versions = existsSync(serverFolder) ? readdirSync(serverFolder) : [];
  const newest = versions.sort((a, b) => Number(b) - Number(a))[0];
  return newest ? path.join(serverFolder, newest, 'bin', 'pg_dump') : 'pg_dump';
}

/** The schema as statements only: no versions, settings or comments of the program that wrote it. */
function dumpSchema(): string {
  const args = ['--schema-only', '--no-owner', '--schema=public', `--dbname=${ownerUrl}`];
  return execFileSync(pgDump(), args, { encoding: 'utf8' })
    .split('\n')
    .filter((line) => !/^(--|SET |SELECT pg_catalog\.set_config|\\(un)?restrict|$)/.test(line))
    .join('\n')
    .concat('\n');
}

/** After a new migration: WRITE_SCHEMA=1 npx jest tests/migrations, then read the difference. */
test('the schema is the one on record', () => {
  const golden = path.join(__dirname, 'schema.sql');
  const schema = dumpSchema();
  if (process.env.WRITE_SCHEMA) writeFileSync(golden, schema);
  expect(schema).toBe(readFileSync(golden, 'utf8'));
});

describe('every table', () => {
  const tablesWithout = (condition: string) =>
    asSuperuser<{ name: string }>(
      `SELECT c.relname AS name FROM pg_class c JOIN pg_namespace n ON n.oid = c.relnamespace
       WHERE n.nspname = 'public' AND c.relkind = 'r' AND NOT (${condition}) ORDER BY 1`,
    );
  const constraint = (type: string) =>
    `EXISTS (SELECT FROM pg_constraint k WHERE k.conrelid = c.oid AND k.contype = '${type}')`;

  test('has a primary key and checks', async () => {
    expect(await tablesWithout(constraint('p'))).toEqual([]);
    expect(await tablesWithout(`${constraint('c')} OR c.relname = 'schema_migrations'`)).toEqual(
      [],
    );
  });

  test('belongs to owner', async () => {
    expect(await tablesWithout("pg_get_userbyid(c.relowner) = 'owner'")).toEqual([]);
  });

  test('keeps text as text and times with their zone', async () => {
    const odd = await asSuperuser(
      `SELECT table_name, column_name, data_type FROM information_schema.columns
       WHERE table_schema = 'public' AND data_type IN
         ('character varying', 'character', 'timestamp without time zone', 'real', 'money')`,
    );
    expect(odd).toEqual([]);
  });
});

describe('the role that serves', () => {
  async function asApp(sql: string) {
    const client = new Client({ connectionString: appUrl });
    await client.connect();
    try {
      return await client.query(sql);
    } finally {
      await client.end();
    }
  }

  test.each([
    'CREATE TABLE mine (id integer)',
    'CREATE SCHEMA mine',
    'CREATE FUNCTION mine() RETURNS integer LANGUAGE sql AS $$ SELECT 1 $$',
    'CREATE ROLE mine',
    'ALTER ROLE app SUPERUSER',
    'ALTER TABLE users ADD COLUMN mine text',
    'ALTER TABLE grants DISABLE TRIGGER ALL',
    'DROP TABLE users',
    'TRUNCATE grants',
    'DELETE FROM grants',
    'UPDATE grants SET reason = reason',
    'DELETE FROM quotes',
    'UPDATE quotes SET value = 0',
    'DELETE FROM users',
    'UPDATE users SET email = email',
    'DELETE FROM memberships',
    'UPDATE memberships SET desk_id = desk_id',
    'UPDATE desks SET time_zone = time_zone',
    'UPDATE market_quotes SET spot = 1',
    'UPDATE market_snapshots SET entered_by_id = entered_by_id',
    "INSERT INTO schema_migrations (name) VALUES ('mine')",
    'SET SESSION AUTHORIZATION postgres',
  ])('may not: %s', async (sql) => {
    await expect(asApp(sql)).rejects.toMatchObject({ code: '42501' });
  });

  test('is not, and cannot become, the owner', async () => {
    await expect(asApp('SET ROLE owner')).rejects.toMatchObject({ code: '42501' });
    const { rows } = await asApp(
      `SELECT rolsuper, rolcreaterole, rolcreatedb, pg_has_role('app', 'owner', 'MEMBER') AS member
       FROM pg_roles WHERE rolname = 'app'`,
    );
    expect(rows).toEqual([
      { rolsuper: false, rolcreaterole: false, rolcreatedb: false, member: false },
    ]);
    const owners = await asApp("SELECT rolcanlogin FROM pg_roles WHERE rolname = 'owner'");
    expect(owners.rows).toEqual([{ rolcanlogin: false }]);
  });

  test('owns the queue’s schema only', async () => {
    const { rows } = await asApp(
      "SELECT nspname FROM pg_namespace WHERE pg_get_userbyid(nspowner) = 'app'",
    );
    expect(rows).toEqual([{ nspname: 'graphile_worker' }]);
  });
});
