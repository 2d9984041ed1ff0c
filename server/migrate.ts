/** Brings the database's schema up to this version. Any number of processes may do so at once. */
import { Client } from 'pg';
import { Umzug } from 'umzug';
import { log } from './log';
import { migrations } from './migrations';
import type { MigrationContext } from './migrations/migration';
import { prepareQueue } from './queue/prepare';

/** Any number will do, as long as every version of the migrator takes the same lock. */
const migrationLock = 4_600_001;

async function executedNames(client: Client): Promise<string[]> {
  const { rows: tables } = await client.query<{ present: boolean }>(
    "SELECT to_regclass('public.schema_migrations') IS NOT NULL AS present",
  );
  if (!tables[0].present) return [];
  const { rows } = await client.query<{ name: string }>('SELECT name FROM schema_migrations');
  return rows.map(({ name }) => name);
}

const umzugFor = (context: MigrationContext) =>
  new Umzug({
    context,
    logger: undefined,
    migrations: migrations.map(({ name, up }) => ({ name, up: () => up(context) })),
    storage: {
      executed: () => executedNames(context.client),
      async logMigration({ name }) {
        await context.client.query('INSERT INTO schema_migrations (name) VALUES ($1)', [name]);
      },
      async unlogMigration() {
        throw new Error('Migrations go forward only.');
      },
    },
  });

/**
 * All pending steps in one transaction, under a lock that a second migrator waits for; it then
 * finds nothing to do. Returns the names of the steps that were taken.
 */
export async function migrate(ownerUrl: string, appUrl: string): Promise<string[]> {
  const client = new Client({ connectionString: ownerUrl, application_name: 'driftless-migrate' });
  await client.connect();
  try {
    await client.query('BEGIN');
    await client.query('SELECT pg_advisory_xact_lock($1)', [migrationLock]);
    if ((await executedNames(client)).length > 0) await client.query('SET LOCAL ROLE owner');
    const appPassword = decodeURIComponent(new URL(appUrl).password);
    const taken = await umzugFor({ client, appPassword }).up();
    await client.query('COMMIT');
    const names = taken.map(({ name }) => name);
    if (names.length > 0) log.info({ migrations: names }, 'schema migrated');
    await prepareQueue(appUrl);
    return names;
  } finally {
    await client.end();
  }
}
