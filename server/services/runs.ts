/** Valuation runs: started here, worked off in the background, chunk by chunk. */
import { Op, Transaction, type WhereOptions } from 'sequelize';
import { engineVersion } from '@/pricing/index';
import type { Run as RunOnTheWire, RunDraft, RunStatus } from '@/shared/contracts/runs';
import { AppError } from '@/shared/errors';
import { sequelize } from '../database';
import { Book } from '../models/book';
import { Desk } from '../models/desk';
import { RunBook } from '../models/run-book';
import { RunChunk } from '../models/run-chunk';
import { ValuationRun } from '../models/valuation-run';
import { addJobs } from '../queue/add-job';
import type { DeskActor } from './access';
import { after, pageOf } from './page';
import { planRun } from './run-plan';
import { factsOfRuns, isActive, runOf, summaryOf, withNames } from './run-views';
import type { WriteOnce } from './write-once';

export async function readRun(desk: Desk, id: string, transaction?: Transaction) {
  const run = await ValuationRun.findOne({
    where: { deskId: desk.id, id },
    include: withNames,
    transaction,
  });
  if (!run) throw new AppError('not-found');
  return runOf(run, transaction);
}

export const getRun = (desk: Desk, id: string): Promise<RunOnTheWire> => readRun(desk, id);

type RunQuery = { cursor?: string; limit: number; status?: RunStatus; bookId?: string };

export async function listRuns(desk: Desk, { cursor, limit, status, bookId }: RunQuery) {
  const ofBook: WhereOptions = {};
  if (bookId !== undefined) {
    const rows = await RunBook.findAll({ attributes: ['runId'], where: { bookId } });
    Object.assign(ofBook, { id: { [Op.in]: rows.map(({ runId }) => runId) } });
  }
  const rows = await ValuationRun.findAll({
    where: {
      [Op.and]: [
        { deskId: desk.id, ...(status === undefined ? {} : { status }) },
        ofBook,
        after('startedAt', cursor),
      ],
    },
    include: withNames,
    order: [
      ['startedAt', 'DESC'],
      ['id', 'DESC'],
    ],
    limit: limit + 1,
    subQuery: false,
  });
  const factsOf = await factsOfRuns(rows.map(({ id }) => id));
  return pageOf(
    rows,
    limit,
    (run) => summaryOf(run, factsOf(run.id)),
    ({ startedAt, id }) => ({ at: startedAt, id }),
  );
}

/** Runs of one desk are started one after the other, so that none takes a book of another's. */
const lockDesk = (deskId: string, transaction: Transaction) =>
  Desk.findByPk(deskId, { transaction, lock: Transaction.LOCK.NO_KEY_UPDATE, rejectOnEmpty: true });

async function refuseBusyBooks(bookIds: readonly string[], transaction: Transaction) {
  const taken = await RunBook.findAll({
    where: { bookId: [...bookIds], isActive: true },
    transaction,
  });
  if (taken.length === 0) return;
  const [{ bookId, runId }] = taken;
  const book = await Book.findByPk(bookId, { transaction, rejectOnEmpty: true });
  const run = await ValuationRun.findByPk(runId, { transaction, rejectOnEmpty: true });
  const message = `Someone was first: run ${run.number} is valuing book ${book.code}. Wait until it has ended, or cancel it.`;
  throw new AppError('wrong-state', [{ path: 'bookIds', code: 'book-in-run', message }]);
}

/** Chunks come after the short jobs of others that wait. */
const chunkPriority = 1;

async function storeRun(
  { desk, userId }: DeskActor,
  { bookIds, snapshotId }: RunDraft,
  rerunOfId: string | null,
  transaction: Transaction,
): Promise<RunOnTheWire> {
  const locked = await lockDesk(desk.id, transaction);
  await refuseBusyBooks(bookIds, transaction);
  const { snapshot, policy, valuedAtMs, trades, chunks, leftOut } = await planRun(
    desk,
    { bookIds, snapshotId },
    transaction,
  );
  const ordinal = locked.lastRunNumber + 1;
  await locked.update({ lastRunNumber: ordinal }, { transaction });
  const run = await ValuationRun.create(
    {
      deskId: desk.id,
      ordinal,
      snapshotId,
      snapshotDate: snapshot.date,
      policyId: policy.id,
      valuedAt: new Date(valuedAtMs),
      engine: engineVersion,
      rerunOfId,
      total: trades.length,
      leftOut,
      startedById: userId,
    },
    { transaction },
  );
  await RunBook.bulkCreate(
    bookIds.map((bookId) => ({
      runId: run.id,
      bookId,
      deskId: desk.id,
      isActive: true,
      trades: trades.filter((trade) => trade.bookId === bookId).length,
    })),
    { transaction },
  );
  await RunChunk.bulkCreate(
    chunks.map((tradeVersionIds, index) => ({ runId: run.id, number: index + 1, tradeVersionIds })),
    { transaction },
  );
  const payloads = chunks.map((_, index) => ({ runId: run.id, number: index + 1 }));
  await addJobs(transaction, 'run-chunk', payloads, chunkPriority);
  return readRun(desk, run.id, transaction);
}

export const createRun = (
  actor: DeskActor,
  draft: RunDraft,
  writeOnce: WriteOnce,
): Promise<RunOnTheWire> => writeOnce((transaction) => storeRun(actor, draft, null, transaction));

/** A run under lock: whoever would change it meanwhile waits. */
export async function lockRun(
  desk: Desk,
  id: string,
  transaction: Transaction,
): Promise<ValuationRun> {
  const where = { deskId: desk.id, id };
  const run = await ValuationRun.findOne({ where, transaction, lock: true });
  if (!run) throw new AppError('not-found');
  return run;
}

const standsAt: Record<RunStatus, string> = {
  queued: 'waits to be worked off',
  running: 'is being worked off',
  finished: 'has finished',
  cancelled: 'was cancelled',
  'signed-off': 'was signed off',
};

/** The state that somebody else was quicker to bring about, in a sentence. */
export function refuseState(run: ValuationRun): never {
  const status: RunStatus = run.status;
  const message = `Someone was first: run ${run.number} ${standsAt[status]}.`;
  throw new AppError('wrong-state', [{ path: '', code: 'wrong-state', message }]);
}

export const rerunRun = (
  actor: DeskActor,
  id: string,
  writeOnce: WriteOnce,
): Promise<RunOnTheWire> =>
  writeOnce(async (transaction) => {
    const run = await lockRun(actor.desk, id, transaction);
    if (run.status !== 'finished' && run.status !== 'cancelled') refuseState(run);
    const books = await RunBook.findAll({ where: { runId: id }, transaction });
    const bookIds = books.map(({ bookId }) => bookId);
    return storeRun(actor, { bookIds, snapshotId: run.snapshotId }, id, transaction);
  });

/** A chunk that is being computed at this moment is dropped; what was kept before stays. */
export const cancelRun = ({ desk, userId }: DeskActor, id: string): Promise<RunOnTheWire> =>
  sequelize.transaction(async (transaction) => {
    const run = await lockRun(desk, id, transaction);
    if (!isActive(run.status)) refuseState(run);
    await run.update(
      {
        status: 'cancelled',
        cancelledById: userId,
        cancelledAt: new Date(),
        version: run.version + 1,
      },
      { transaction },
    );
    return readRun(desk, id, transaction);
  });
