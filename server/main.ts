/** Starts what `--services=` names: `web`, `worker`, or both, which is the default. */
import { parseArgs } from 'node:util';
import type { Server } from 'node:http';
import { setTimeout as delay } from 'node:timers/promises';
import { sequelize } from './database';
import { env } from './env';
import { log } from './log';
import { migrate } from './migrate';
import { closeExportThreads } from './services/export-file';
import { closePasswordThreads, hashOfNobody } from './services/passwords';
import { closePricingThreads } from './services/pricing';
import { closeValuationThreads } from './services/run-threads';
import { closeStudyThreads } from './services/study-threads';
import { close, listen } from './web';
import { startWorker, type Worker } from './worker';

const serviceNames = ['web', 'worker'] as const;
type ServiceName = (typeof serviceNames)[number];

const stopLimitMs = 5000;
const retryMs = 500;

function chosenServices(): ServiceName[] {
  const { values } = parseArgs({ options: { services: { type: 'string' } } });
  const chosen = (values.services ?? serviceNames.join(',')).split(',');
  const unknown = chosen.filter((name) => !serviceNames.some((known) => known === name));
  if (unknown.length > 0)
    throw new Error(`--services takes ${serviceNames.join(' and ')}, not “${unknown.join(',')}”.`);
  return serviceNames.filter((name) => chosen.includes(name));
}

const isRefused = (error: unknown) =>
  error instanceof Error &&
  'code' in error &&
  (error.code === 'ECONNREFUSED' || error.code === '57P03');

/** The database may be starting as well. */
async function migrateWhenThere() {
  for (;;) {
    try {
      return await migrate(env.databaseOwnerUrl, env.databaseUrl);
    } catch (error) {
      if (!isRefused(error)) throw error;
      log.info('waiting for the database');
      await delay(retryMs);
    }
  }
}

let server: Server | null = null;
let worker: Worker | null = null;
let isStopping = false;

/** Takes no more requests, finishes the work in hand, then lets go of threads and database. */
async function stop(cause: string) {
  if (isStopping) return;
  isStopping = true;
  log.info({ cause }, 'stopping');
  setTimeout(() => process.exit(1), stopLimitMs).unref();
  if (server) await close(server);
  if (worker) await worker.stop();
  await Promise.all([
    closePasswordThreads(),
    closePricingThreads(),
    closeExportThreads(),
    closeStudyThreads(),
    closeValuationThreads(),
  ]);
  await sequelize.close();
  process.exit(0);
}

function fail(error: unknown) {
  log.fatal({ err: error }, 'the server ends');
  process.exit(1);
}

async function start() {
  const services = chosenServices();
  for (const signal of ['SIGTERM', 'SIGINT'] as const)
    process.once(signal, () => void stop(signal).catch(fail));
  // A launcher that is killed cannot say goodbye; its end closes the channel.
  process.once('disconnect', () => void stop('the launcher ended').catch(fail));
  if (services.includes('web')) {
    server = await listen();
    void hashOfNobody().catch(fail);
  }
  await migrateWhenThere();
  if (services.includes('worker') && !isStopping) worker = await startWorker();
}

start().catch(fail);
