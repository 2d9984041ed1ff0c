/**
 * Who lives and who has died. A worker holds an advisory lock named after it for as long as its
 * session lasts; PostgreSQL lets go of it when the process dies, the machine is lost, or the server
 * itself ends. Jobs that are kept by someone whose lock is free are released for others to do; a
 * worker that lives, however slow it is, keeps its own.
 */
import { Client, type Pool } from 'pg';
import { env } from '../env';
import { log } from '../log';
import { workerName } from './name';

/** A machine that is gone says nothing: the server asks after ten silent seconds, and twice more. */
const keepAlive =
  '-c tcp_keepalives_idle=10 -c tcp_keepalives_interval=3 -c tcp_keepalives_count=2';

const lockOf = (name: string) => `hashtextextended('worker ' || ${name}, 0)`;

export type Presence = {
  /** From here on, the jobs that this name keeps are nobody else's. */
  hold: (name: string) => Promise<void>;
  /** Comes when the session has ended, and with it every lock that it held. */
  lost: Promise<void>;
  end: () => Promise<void>;
};

export async function openPresence(): Promise<Presence> {
  const client = new Client({
    connectionString: env.databaseUrl,
    application_name: workerName,
    options: keepAlive,
  });
  client.on('error', (error) => log.warn({ err: error }, 'a worker lost its session'));
  const lost = new Promise<void>((resolve) => client.once('end', resolve));
  await client.connect();
  return {
    async hold(name) {
      await client.query(`SELECT pg_advisory_lock(${lockOf('$1::text')})`, [name]);
    },
    lost,
    end: () => client.end(),
  };
}

/** Tried by other sessions than the one that holds: to its own session a lock is always free. */
const release = `
  WITH keepers AS MATERIALIZED (
    SELECT DISTINCT locked_by AS name FROM graphile_worker.jobs WHERE locked_by IS NOT NULL
  ), dead AS MATERIALIZED (
    SELECT array_agg(name) AS names FROM keepers
    WHERE pg_try_advisory_xact_lock(${lockOf('name')})
  )
  SELECT names, graphile_worker.force_unlock_workers(names) FROM dead WHERE names IS NOT NULL`;

/** Gives the jobs of the dead back to the queue; names the dead. */
export async function releaseJobsOfTheDead(pool: Pool): Promise<string[]> {
  const { rows } = await pool.query<{ names: string[] }>(release);
  return rows.at(0)?.names ?? [];
}
