/**
 * Writing the demonstration takes some seconds and many transactions. A mark in the database says
 * that it is under way, so that one that was killed half-way is taken back and begun anew instead
 * of being mistaken for the whole.
 */
import { Client } from 'pg';
import { env } from '../env';
import { migrate } from '../migrate';
import { hasUsers } from '../services/firm';

/** Two that seed at once: the second waits, and then finds everything there. */
const seedLock = 4_600_002;
const mark = 'Demonstration data are being written.';

async function isMarked(client: Client): Promise<boolean> {
  const { rows } = await client.query<{ comment: string | null }>(
    "SELECT obj_description('public.schema_migrations'::regclass) AS comment",
  );
  return rows[0].comment === mark;
}

const setMark = (client: Client, text: string | null) =>
  client.query(`
    SET ROLE owner;
    COMMENT ON TABLE schema_migrations IS ${text === null ? 'NULL' : client.escapeLiteral(text)};
    RESET ROLE`);

const migrateHere = () => migrate(env.databaseOwnerUrl, env.databaseUrl);

/** Runs `write` on a migrated database without users; whether it was needed. */
export async function writeDemonstration(write: () => Promise<void>): Promise<boolean> {
  const client = new Client({ connectionString: env.databaseOwnerUrl });
  await client.connect();
  try {
    await client.query('SELECT pg_advisory_lock($1)', [seedLock]);
    await migrateHere();
    if (await isMarked(client)) {
      await client.query('DROP OWNED BY owner, app CASCADE');
      await migrateHere();
    }
    if (await hasUsers()) return false;
    await setMark(client, mark);
    await write();
    await setMark(client, null);
    return true;
  } finally {
    await client.end();
  }
}
