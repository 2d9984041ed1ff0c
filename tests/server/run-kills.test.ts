/** A worker that is killed in the middle of a chunk costs time, and nothing else. */
import { chunksInHand, isOver, killMidChunk, leftBy } from './support/killed-runs';
import { ended, startProcess } from './support/processes';
import { withOwnDatabase } from './support/server';
import { until } from './support/until';
import type { ChildProcess } from 'node:child_process';
import { chainOf } from '@/server/chain/append';
import { verifyChain } from '@/server/chain/verify';
import { makeMixedBook } from '../factories/mixed-book';
import { makeDesk } from '../factories/people';
import { startRun, workOffRun } from '../factories/runs';

let worker: ChildProcess | null = null;

// Before the database goes, which hooks do in the order that they are written in.
afterAll(async () => {
  if (!worker) return;
  worker.kill('SIGKILL');
  await ended(worker);
});

withOwnDatabase();
jest.setTimeout(240_000);

const startWorker = () => startProcess(0, '--services=worker');

test('what is left after two kills is to the bit what an undisturbed run leaves', async () => {
  const desk = await makeDesk();
  const { book, snapshot } = await makeMixedBook(desk, 300);
  const undisturbed = await startRun(desk, { books: [book], snapshot });
  await workOffRun(undisturbed.id);
  const expected = await leftBy(undisturbed.id);
  expect(expected.length).toBeGreaterThan(900);

  const { id } = await startRun(desk, { books: [book], snapshot });
  for (const kill of ['first', 'second']) {
    worker = startWorker();
    const hit = await killMidChunk(worker, id);
    expect({ kill, hit: hit.length > 0 }).toEqual({ kill, hit: true });
    // Nobody has taken over yet: what the dead worker was at is still kept by it.
    expect(await chunksInHand(id)).toEqual(hit);
  }
  worker = startWorker();
  await until(() => isOver(id));
  expect(await leftBy(id)).toEqual(expected);
  const { firstBreak } = await verifyChain(chainOf('valuations', desk.id), null, async () => {});
  expect(firstBreak).toBeNull();
});
