/** Jobs of workers that have died are done by those that live, who keep their own. */
import { asSuperuser, testEnvironment } from './support/environment';
import { withOwnDatabase } from './support/server';
import { until } from './support/until';
import { Pool } from 'pg';
import { QueryTypes } from 'sequelize';
import { sequelize } from '@/server/database';
import { addJob } from '@/server/queue/add-job';
import { workerName } from '@/server/queue/name';
import { openPresence, releaseJobsOfTheDead, type Presence } from '@/server/queue/presence';
import { startWorker, type Worker } from '@/server/worker';

withOwnDatabase();

const queue = () => sequelize.transaction((transaction) => addJob(transaction, 'housekeeping', {}));

/** A job that somebody of that name took and has not finished. */
async function takenBy(name: string) {
  await queue();
  await sequelize.query(
    `UPDATE graphile_worker._private_jobs SET locked_by = $name, locked_at = now()
      WHERE locked_by IS NULL`,
    { bind: { name } },
  );
}

async function keepers(): Promise<(string | null)[]> {
  const rows = await sequelize.query<{ name: string | null }>(
    'SELECT locked_by AS name FROM graphile_worker.jobs ORDER BY id',
    { type: QueryTypes.SELECT },
  );
  return rows.map(({ name }) => name);
}

describe('looking after the dead', () => {
  let pool: Pool;
  beforeAll(() => {
    pool = new Pool({ connectionString: testEnvironment.DATABASE_URL, max: 1 });
  });
  afterAll(async () => {
    await pool.end();
  });

  let living: Presence;

  beforeAll(async () => {
    living = await openPresence();
    await living.hold('pool-living');
  });

  it('releases the jobs of whoever holds no lock, and robs nobody who does', async () => {
    await takenBy('pool-living');
    await takenBy('pool-dead');
    expect(await keepers()).toEqual(['pool-living', 'pool-dead']);
    expect(await releaseJobsOfTheDead(pool)).toEqual(['pool-dead']);
    expect(await keepers()).toEqual(['pool-living', null]);
    expect(await releaseJobsOfTheDead(pool)).toEqual([]);
  });

  it('counts a worker among the dead as soon as its session is gone', async () => {
    await living.end();
    await living.lost;
    await until(async () => (await releaseJobsOfTheDead(pool)).length > 0);
    expect(await keepers()).toEqual([null, null]);
  });
});

describe('a worker', () => {
  let worker: Worker;
  beforeAll(async () => {
    worker = await startWorker();
  });
  afterAll(async () => {
    await worker.stop();
  });

  const isEmpty = async () => (await keepers()).length === 0;

  it('does what others left behind when they died', async () => {
    await takenBy('pool-dead-too');
    await until(isEmpty);
  });

  it('begins anew under another name when its sessions are cut, and goes on', async () => {
    const cut = await asSuperuser(
      `SELECT pg_terminate_backend(pid) FROM pg_stat_activity
        WHERE datname = current_database() AND application_name = $1`,
      [workerName],
    );
    expect(cut.length).toBeGreaterThan(0);
    await queue();
    await until(isEmpty);
  });
});
