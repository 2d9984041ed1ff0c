/** The worker: takes jobs from the queue in the database. Any number may run, on any machine. */
import { parseCronItems, run, type Runner } from 'graphile-worker';
import { Pool } from 'pg';
import { env } from './env';
import { log } from './log';
import { logger } from './queue/logger';
import { workerName } from './queue/name';
import { taskList } from './queue/task-list';

const cronItems = parseCronItems([
  { task: 'housekeeping', match: '17 * * * *', options: { backfillPeriod: 0 } },
]);

const concurrency = 2;

export type Worker = { stop: () => Promise<void> };

export async function startWorker(): Promise<Worker> {
  // One connection listens for jobs all the time; its name tells health that a worker lives.
  const pgPool = new Pool({
    connectionString: env.databaseUrl,
    application_name: workerName,
    max: concurrency + 2,
  });
  // A lost connection is made anew by the pool; unheard, it would end the process.
  const onLost = (error: Error) => log.warn({ err: error }, 'the queue lost a connection');
  pgPool.on('error', onLost);
  pgPool.on('connect', (client) => client.on('error', onLost));
  const runner: Runner = await run({
    pgPool,
    taskList,
    parsedCronItems: cronItems,
    concurrency,
    noHandleSignals: true,
    logger,
  });
  return {
    async stop() {
      await runner.stop();
      await pgPool.end();
    },
  };
}
