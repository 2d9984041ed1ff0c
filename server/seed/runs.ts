/**
 * A valuation run on each close of the last two months, worked off as the worker does it: exceptions
 * answered and runs signed off by people who had no hand in them. The last evening is still open.
 */
import { runOnce } from 'graphile-worker';
import type { ExceptionalValuation, Run } from '@/shared/contracts/runs';
import { addDays } from '@/shared/dates';
import { sequelize } from '../database';
import { env } from '../env';
import { logger } from '../queue/logger';
import { taskList } from '../queue/task-list';
import { today, type DeskActor } from '../services/access';
import { listBooks } from '../services/books';
import { listSnapshots } from '../services/market-data';
import { answerByOverride, answerByStudy } from '../services/run-answers';
import { signOffRun } from '../services/run-sign-off';
import { listRunExceptions } from '../services/run-lists';
import { createRun, getRun } from '../services/runs';
import { createStudy, getStudy, signOffStudy } from '../services/studies';
import type { WriteOnce } from '../services/write-once';

export type RunHands = {
  starter: DeskActor;
  /** Answers exceptions, and so signs off no run of these. */
  answerer: DeskActor;
  signer: DeskActor;
};

const once: WriteOnce = (write) => sequelize.transaction(write);

const workOff = () =>
  runOnce({
    connectionString: env.databaseUrl,
    taskList,
    logger,
    concurrency: 2,
    noHandleSignals: true,
  });

/** By then the first trades had been agreed. */
const oldestRunDays = 55;

/** The closes in force, oldest first. */
async function closesToValue({ desk }: DeskActor) {
  const { items } = await listSnapshots(desk, { status: 'approved', limit: 200 });
  const first = addDays(today(desk), -oldestRunDays);
  return items.filter(({ date }) => date >= first).reverse();
}

const openExceptions = async ({ desk }: DeskActor, run: Run): Promise<ExceptionalValuation[]> =>
  (await listRunExceptions(desk, run.id, { state: 'open', limit: 200 })).items;

type Answer = (run: Run, valuation: ExceptionalValuation, hands: RunHands) => Promise<void>;

const byNote: Answer = async (run, { exception }, { answerer }) => {
  const key = { runId: run.id, exceptionId: exception.id };
  const reason = 'Looked into: finer grids move towards the model value; the distance is small';
  await answerByOverride(answerer, key, { value: null, reason });
};

/** The dealer's own mark is kept beside the model value, which stays. */
const byOverride: Answer = async (run, { exception, primary }, { answerer }) => {
  if (!primary.result.ok) return;
  const key = { runId: run.id, exceptionId: exception.id };
  const value = (primary.result.value * 1.01).toFixed(4);
  const reason = 'Marked one per cent above the model, as two counterparties quoted it';
  await answerByOverride(answerer, key, { value, reason });
};

async function studyOf(run: Run, { trade, terms }: ExceptionalValuation, actor: DeskActor) {
  const names =
    terms.exercise === 'american'
      ? (['heat-crank-nicolson', 'lattice-symmetric'] as const)
      : (['heat-crank-nicolson'] as const);
  const source = { kind: 'trade' as const, tradeId: trade.id, snapshotId: run.snapshot.id };
  const ladders = names.map((name) => ({ name, rows: 4 }));
  const { id } = await createStudy(actor, { source, ladders }, once);
  await workOff();
  return getStudy(actor.desk, id);
}

const byStudy: Answer = async (run, valuation, { answerer, signer }) => {
  const study = await studyOf(run, valuation, answerer);
  await signOffStudy(signer, study.id, {
    version: study.version,
    comment: 'The orders are those of the schemes; both go to one value',
  });
  const key = { runId: run.id, exceptionId: valuation.exception.id };
  const reason = 'Both routes converge on one value as they are refined';
  await answerByStudy(answerer, key, { studyId: study.id, reason });
};

async function signOff({ id }: Run, { signer }: RunHands) {
  const { version } = await getRun(signer.desk, id);
  await signOffRun(signer, id, { version, comment: 'Exceptions looked into; nothing is open' });
}

/** The first exception of a run is answered in the way that is to be shown, the others by a note. */
async function answerAll(run: Run, hands: RunHands, first: Answer) {
  const [shown, ...others] = await openExceptions(hands.signer, run);
  if (!shown) return;
  await first(run, shown, hands);
  for (const other of others) await byNote(run, other, hands);
}

/** So many runs before the last one, the first exception is answered like this. */
const firstAnswers = new Map<number, Answer>([
  [1, byStudy],
  [2, byOverride],
]);

export async function seedRuns(hands: RunHands) {
  const { starter } = hands;
  const bookIds = (await listBooks(starter.desk)).map(({ id }) => id);
  const closes = await closesToValue(starter);
  for (const [index, { id: snapshotId }] of closes.entries()) {
    const { id } = await createRun(starter, { bookIds, snapshotId }, once);
    await workOff();
    const run = await getRun(starter.desk, id);
    const left = closes.length - 1 - index;
    if (left > 0) {
      await answerAll(run, hands, firstAnswers.get(left) ?? byNote);
      await signOff(run, hands);
      continue;
    }
    // Begun and not decided yet: it waits for a risk officer, as the exception does.
    const [open] = await openExceptions(starter, run);
    if (open) await studyOf(run, open, starter);
  }
}
