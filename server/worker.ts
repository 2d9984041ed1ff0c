/** The worker: takes jobs from the queue in the database. Any number may run, on any machine. */
import { setTimeout as delay } from 'node:timers/promises';
import { parseCronItems, run } from 'graphile-worker';
import { Pool } from 'pg';
import { env } from './env';
import { log } from './log';
import { logger } from './queue/logger';
import { workerName } from './queue/name';
import { openPresence, releaseJobsOfTheDead, type Presence } from './queue/presence';
import { taskList } from './queue/task-list';

const cronItems = parseCronItems([
  { task: 'housekeeping', match: '17 * * * *', options: { backfillPeriod: 0 } },
]);

const concurrency = 2;
const reapEveryMs = 5000;
const retryMs = 500;

export type Worker = { stop: () => Promise<void> };

/** One life of a worker: it ends with the session that its name is held by. */
type Life = { ended: Promise<void>; stop: () => Promise<void> };

/** Holds the name under which jobs are kept, before the first one is taken. */
const presencePlugin = (presence: Presence): GraphileConfig.Plugin => ({
  name: 'presence',
  version: '1.0.0',
  worker: { hooks: { startWorker: (_context, { worker }) => presence.hold(worker.workerPool.id) } },
});

function openPool(): Pool {
  // One connection listens for jobs all the time; its name tells health that a worker lives.
  const pool = new Pool({
    connectionString: env.databaseUrl,
    application_name: workerName,
    max: concurrency + 3,
  });
  // A lost connection is made anew by the pool; unheard, it would end the process.
  const onLost = (error: Error) => log.warn({ err: error }, 'the queue lost a connection');
  pool.on('error', onLost);
  pool.on('connect', (client) => client.on('error', onLost));
  return pool;
}

function startReaping(pool: Pool) {
  const reap = async () => {
    try {
      const dead = await releaseJobsOfTheDead(pool);
      if (dead.length > 0) log.warn({ dead }, 'jobs of workers that have died are done anew');
    } catch (error) {
      log.warn({ err: error }, 'nobody could look after the dead this time');
    }
  };
  void reap();
  return setInterval(() => void reap(), reapEveryMs);
}

async function startLife(): Promise<Life> {
  const presence = await openPresence();
  const pgPool = openPool();
  const close = () => Promise.allSettled([pgPool.end(), presence.end()]);
  try {
    const runner = await run({
      pgPool,
      taskList,
      parsedCronItems: cronItems,
      concurrency,
      noHandleSignals: true,
      logger,
      preset: {
        plugins: [presencePlugin(presence)],
        // Batches are written with patience; without them, a lost database ends the process.
        worker: { completeJobBatchDelay: 0, failJobBatchDelay: 0 },
      },
    });
    const onEnd = (error: unknown) => log.warn({ err: error }, 'the queue could not go on');
    const runnerEnded = runner.promise.catch(onEnd);
    const reaping = startReaping(pgPool);
    return {
      ended: Promise.race([presence.lost, runnerEnded]),
      async stop() {
        clearInterval(reaping);
        // It may have stopped by itself; jobs in hand are finished first.
        await runner.stop().catch(onEnd);
        await close();
      },
    };
  } catch (error) {
    await close();
    throw error;
  }
}

async function startLifeWhenThere(isStopping: () => boolean): Promise<Life | null> {
  while (!isStopping()) {
    try {
      return await startLife();
    } catch (error) {
      log.warn({ err: error }, 'the queue cannot be reached yet');
      await delay(retryMs);
    }
  }
  return null;
}

export async function startWorker(): Promise<Worker> {
  let isStopping = false;
  let life: Life | null = await startLife();
  const live = async () => {
    while (life) {
      await life.ended;
      if (isStopping) return;
      log.warn('the worker begins anew under another name');
      await life.stop();
      life = await startLifeWhenThere(() => isStopping);
      // A stop that came meanwhile found only the life before.
      if (isStopping) await life?.stop();
    }
  };
  const lived = live();
  return {
    async stop() {
      isStopping = true;
      await life?.stop();
      await lived;
    },
  };
}
