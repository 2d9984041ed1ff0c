/** One run a kill, on one book and one close, so that all of them must leave the same. */
import {
  asSuperuser,
  createEmptyDatabase,
  dropDatabase,
  removeFolder,
  testEnvironment,
} from '../server/support/environment';
import {
  chunksInHand,
  isCaughtInChunk,
  isOver,
  killMidChunk,
  leftBy,
  stateOf,
} from '../server/support/killed-runs';
import { ended, freePort, isReady, startProcess } from '../server/support/processes';
import { until } from '../server/support/until';
import assert from 'node:assert/strict';
import type { ChildProcess } from 'node:child_process';
import path from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import { findServer } from '@/scripts/lib/cluster';
import { descendants } from '@/scripts/lib/processes';
import { chainOf } from '@/server/chain/append';
import { verifyChain } from '@/server/chain/verify';
import { sequelize } from '@/server/database';
import { migrate } from '@/server/migrate';
import { closeValuationThreads } from '@/server/services/run-threads';
import { createRun } from '@/shared/contracts/runs';
import { apiBase } from '@/shared/endpoint';
import { makeMixedBook } from '../factories/mixed-book';
import { makeDesk, makeMember } from '../factories/people';
import { startRun, workOffRun } from '../factories/runs';

const victims = ['worker', 'server', 'database'] as const;
type Victim = (typeof victims)[number];

export type Scenario = {
  kills: number;
  trades: number;
  folder: string;
  startDatabase: () => Promise<unknown>;
};

const say = (line: string) => process.stdout.write(`${line}\n`);

type Stage = {
  scenario: Scenario;
  port: number;
  server: ChildProcess;
  worker: ChildProcess;
  post: () => Promise<string>;
};

const startServer = (port: number) => startProcess(port, '--services=web');
const startWorker = () => startProcess(0, '--services=worker');

/** Asked while the database may be away. */
const whenThere = async <Answer>(ask: () => Promise<Answer>): Promise<Answer> => {
  for (;;) {
    try {
      return await ask();
    } catch (error) {
      const isAway =
        error instanceof Error && /ECONN|terminat|starting|recovery/.test(String(error));
      if (!isAway) throw error;
      await pause(50);
    }
  }
};

async function killDatabase({ folder, startDatabase }: Scenario) {
  const server = findServer(path.join(folder, 'postgres'));
  assert(server, 'the database runs');
  for (const pid of [server.pid, ...descendants(server.pid)]) process.kill(pid, 'SIGKILL');
  await startDatabase();
}

/**
 * Kills in the middle of a chunk; what was killed is started again at once. Gives the chunks that
 * were in hand; none, and nothing killed, when the moment was missed.
 */
async function kill(stage: Stage, victim: Victim, runId: string): Promise<number[]> {
  if (victim === 'worker') {
    const hit = await killMidChunk(stage.worker, runId);
    if (hit.length > 0) stage.worker = startWorker();
    return hit;
  }
  if (!(await isCaughtInChunk(runId))) return [];
  const hit = await chunksInHand(runId);
  if (hit.length === 0) return [];
  if (victim === 'server') {
    stage.server.kill('SIGKILL');
    await ended(stage.server);
    stage.server = startServer(stage.port);
  } else await killDatabase(stage.scenario);
  return hit;
}

/** The run's progress at which it is hit, and a little later. */
async function untilRandomMoment(runId: string, trades: number) {
  const from = Math.floor(Math.random() * 0.8 * trades);
  await until(async () => (await stateOf(runId)).done >= from);
  await pause(Math.random() * 200);
}

async function killOnce(stage: Stage, victim: Victim, expected: readonly string[], desk: string) {
  let runId = '';
  let hit: number[] = [];
  // A chunk may end between the look and the kill, and the run with it: then another one is taken.
  while (hit.length === 0) {
    await until(() => isReady(stage.port));
    if (runId === '' || (await isOver(runId))) runId = await stage.post();
    await untilRandomMoment(runId, stage.scenario.trades);
    hit = await kill(stage, victim, runId);
  }
  const killed = performance.now();
  const { done } = await whenThere(() => stateOf(runId));
  await until(() => whenThere(async () => (await stateOf(runId)).done > done));
  const idle = (performance.now() - killed) / 1000;
  await until(() => whenThere(() => isOver(runId)));
  const rest = (performance.now() - killed) / 1000;
  assert.deepEqual(await leftBy(runId), expected);
  const { firstBreak, total } = await verifyChain(
    chainOf('valuations', desk),
    null,
    async () => {},
  );
  assert.equal(firstBreak, null);
  say(
    `${victim} killed at ${done} of ${stage.scenario.trades} trades, within chunk ${hit.join(', ')}: ` +
      `went on after ${idle.toFixed(1)} s, finished after ${rest.toFixed(1)} s; ` +
      `same ${expected.length} rows, chain of ${total} whole`,
  );
  return idle;
}

async function prepare(scenario: Scenario) {
  await createEmptyDatabase();
  await migrate(testEnvironment.DATABASE_OWNER_URL, testEnvironment.DATABASE_URL);
  const desk = await makeDesk();
  const { book, snapshot } = await makeMixedBook(desk, scenario.trades);
  const undisturbed = await startRun(desk, { books: [book], snapshot });
  await workOffRun(undisturbed.id);
  const { token } = await makeMember(desk, 'analyst');
  const port = await freePort();
  const post = async () => {
    const url = `http://127.0.0.1:${port}${apiBase}${createRun.path.replace(':deskId', desk.id)}`;
    const answer = await fetch(url, {
      method: 'POST',
      headers: {
        Authorization: `Bearer ${token}`,
        Origin: `http://127.0.0.1:${port}`,
        'Content-Type': 'application/json',
        'Idempotency-Key': crypto.randomUUID(),
      },
      body: JSON.stringify({ bookIds: [book.id], snapshotId: snapshot.id }),
    });
    const body: unknown = await answer.json();
    assert.equal(answer.status, 201, JSON.stringify(body));
    return (body as { id: string }).id;
  };
  return { desk, port, post, expected: await leftBy(undisturbed.id) };
}

export async function killRuns(scenario: Scenario): Promise<number> {
  const { desk, port, post, expected } = await prepare(scenario);
  const stage = { scenario, port, post, server: startServer(port), worker: startWorker() };
  const idle: number[] = [];
  try {
    for (let count = 0; count < scenario.kills; count += 1)
      idle.push(await killOnce(stage, victims[count % victims.length], expected, desk.id));
    const [{ doubled }] = await asSuperuser<{ doubled: number }>(
      `SELECT count(*)::integer AS doubled FROM (SELECT FROM chain_entries WHERE kind = 'valuation'
        GROUP BY run_id, trade_version_id, route HAVING count(*) > 1) AS twice`,
    );
    assert.equal(doubled, 0);
    say(
      `${idle.length} kills, all within a chunk; work went on after ${Math.max(...idle).toFixed(1)} s at most`,
    );
    return 0;
  } finally {
    for (const child of [stage.worker, stage.server]) child.kill('SIGKILL');
    await closeValuationThreads();
    await sequelize.close();
    await dropDatabase();
    removeFolder();
  }
}
