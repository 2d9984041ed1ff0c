/**
 * How long a run over 2,000 mixed trades takes, with one and with two worker processes and with the
 * worker inside the server's own process, and how fast the API answers reads meanwhile. Set
 * DATABASE_URL and DATABASE_OWNER_URL to a cluster for tests, then: npx tsx tests/bench/runs.ts
 */
import {
  createEmptyDatabase,
  dropDatabase,
  removeFolder,
  testEnvironment,
} from '../server/support/environment';
import { ended, freePort, isReady, startProcess } from '../server/support/processes';
import { until } from '../server/support/until';
import type { ChildProcess } from 'node:child_process';
import { randomUUID } from 'node:crypto';
import os from 'node:os';
import { setTimeout as pause } from 'node:timers/promises';
import { sequelize } from '@/server/database';
import { migrate } from '@/server/migrate';
import { closeValuationThreads } from '@/server/services/run-threads';
import type { Run } from '@/shared/contracts/runs';
import { makeDesk, makeMember } from '../factories/people';
import { makeMixedBook } from '../factories/mixed-book';

const tradeCount = 2000;
const readEveryMs = 20;

const say = (line: string) => process.stdout.write(`${line}\n`);

type Client = {
  post: (path: string, body: object) => Promise<Run>;
  get: (path: string) => Promise<unknown>;
};

const clientOf = (port: number, token: string): Client => {
  const send = async (path: string, init: RequestInit) => {
    const answer = await fetch(`http://127.0.0.1:${port}/api/v1${path}`, {
      ...init,
      headers: {
        Authorization: `Bearer ${token}`,
        Origin: `http://127.0.0.1:${port}`,
        'Content-Type': 'application/json',
        'Idempotency-Key': randomUUID(),
      },
    });
    const body = await answer.json();
    if (!answer.ok) throw new Error(`${path}: ${answer.status} ${JSON.stringify(body)}`);
    return body;
  };
  return {
    post: (path, body) => send(path, { method: 'POST', body: JSON.stringify(body) }),
    get: (path) => send(path, { method: 'GET' }),
  };
};

const percentile = (times: readonly number[], share: number) => {
  const sorted = [...times].sort((a, b) => a - b);
  return sorted[Math.min(sorted.length - 1, Math.ceil(share * sorted.length) - 1)];
};

type Setting = { name: string; services: string[][] };

const settings: Setting[] = [
  { name: 'server and one worker process', services: [['--services=web'], ['--services=worker']] },
  {
    name: 'server and two worker processes',
    services: [['--services=web'], ['--services=worker'], ['--services=worker']],
  },
  { name: 'server and worker in one process', services: [[]] },
];

type Prepared = { deskId: string; token: string; bookId: string; snapshotId: string };

const readsOf = (desk: string, runId: string, bookId: string) => [
  `${desk}/runs/${runId}`,
  `${desk}/trades?bookId=${bookId}&limit=50`,
  `${desk}/runs/${runId}/valuations?limit=50`,
  `${desk}/runs`,
  `${desk}/books`,
  `${desk}/runs/${runId}/exceptions?limit=50`,
];

/** The same reads while nothing is run: what the machine allows at this moment. */
async function timeQuietReads(client: Client, reads: readonly string[]) {
  const times: number[] = [];
  for (let turn = 0; turn < 20 * reads.length; turn += 1) {
    const before = performance.now();
    await client.get(reads[turn % reads.length]);
    times.push(performance.now() - before);
    await pause(readEveryMs);
  }
  return times;
}

const summaryOf = (times: readonly number[]) =>
  `median ${percentile(times, 0.5).toFixed(1)} ms, p95 ${percentile(times, 0.95).toFixed(1)} ms, ` +
  `slowest ${Math.max(...times).toFixed(1)} ms`;

/** One run from the request to its end, with reads all the while. */
async function timeRun(client: Client, { deskId, bookId, snapshotId }: Prepared) {
  const desk = `/desks/${deskId}`;
  const started = performance.now();
  const { id } = await client.post(`${desk}/runs`, { bookIds: [bookId], snapshotId });
  const startMs = performance.now() - started;
  const reads = readsOf(desk, id, bookId);
  const times = new Map(reads.map((path) => [path, [] as number[]]));
  for (let turn = 0; ; turn += 1) {
    const path = reads[turn % reads.length];
    const before = performance.now();
    const body = await client.get(path);
    times.get(path)?.push(performance.now() - before);
    if (turn % reads.length === 0 && (body as Run).status === 'finished') {
      const { counts, exceptions } = body as Run;
      return { seconds: (performance.now() - started) / 1000, startMs, times, counts, exceptions };
    }
    await pause(readEveryMs);
  }
}

async function measure({ name, services }: Setting, prepared: Prepared) {
  const port = await freePort();
  const children: ChildProcess[] = [];
  try {
    for (const [index, service] of services.entries())
      children.push(startProcess(index === 0 ? port : 0, ...service));
    await until(() => isReady(port));
    const client = clientOf(port, prepared.token);
    say(`\n${name}`);
    // The first run starts and compiles the threads; the second is how the service usually is.
    for (const round of ['first run', 'second run']) {
      const found = await timeRun(client, prepared);
      const all = [...found.times.values()].flat();
      say(
        `  ${round}: ${tradeCount} trades in ${found.seconds.toFixed(1)} s (request ${found.startMs.toFixed(0)} ms), ` +
          `${all.length} reads meanwhile: ${summaryOf(all)}`,
      );
      for (const [path, times] of found.times)
        say(
          `    p95 ${percentile(times, 0.95).toFixed(1)} ms  ${path.replace(/[0-9a-f-]{36}/g, '…')}`,
        );
      say(`    ${JSON.stringify(found.counts)}, ${found.exceptions} exceptions`);
      const quiet = await timeQuietReads(client, [...found.times.keys()]);
      say(
        `    the same reads after it: ${summaryOf(quiet)}; load of the machine ${os.loadavg()[0].toFixed(1)}`,
      );
    }
  } finally {
    for (const child of children) child.kill('SIGTERM');
    await Promise.all(children.map(ended));
  }
}

async function run() {
  try {
    await createEmptyDatabase();
    await migrate(testEnvironment.DATABASE_OWNER_URL, testEnvironment.DATABASE_URL);
    const desk = await makeDesk();
    const { token } = await makeMember(desk, 'analyst');
    const { book, snapshot } = await makeMixedBook(desk, tradeCount);
    const prepared = { deskId: desk.id, token, bookId: book.id, snapshotId: snapshot.id };
    for (const setting of settings) await measure(setting, prepared);
  } finally {
    await closeValuationThreads();
    await sequelize.close();
    await dropDatabase();
    removeFolder();
  }
}

run().catch((error: unknown) => {
  process.stderr.write(`${error instanceof Error ? error.stack : String(error)}\n`);
  process.exitCode = 1;
});
