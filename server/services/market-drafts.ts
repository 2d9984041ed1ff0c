/**
 * What people do to closes: enter, save, restate, approve. Acts on one desk's closes come one after
 * the other, so that a day has one draft and one approved close at most.
 */
import { Transaction } from 'sequelize';
import type {
  Snapshot as SnapshotOnTheWire,
  SnapshotDraft,
  SnapshotSaving,
  SnapshotStatus,
} from '@/shared/contracts/market-data';
import { AppError, type Issue } from '@/shared/errors';
import { warningKey } from '@/shared/market-warnings';
import { appendRecord } from '../chain/append';
import { sequelize } from '../database';
import { Desk } from '../models/desk';
import { MarketQuote } from '../models/market-quote';
import { MarketSnapshot } from '../models/market-snapshot';
import type { DeskActor } from './access';
import { getSnapshot, makersOf } from './market-data';
import { dateIssues, refuseWrong } from './market-issues';
import { yieldOf } from './underlyings';
import type { WriteOnce } from './write-once';

/** Others go on reading the desk, and pointing to it. */
const lockDesk = (deskId: string, transaction: Transaction) =>
  Desk.findByPk(deskId, { transaction, lock: Transaction.LOCK.NO_KEY_UPDATE, rejectOnEmpty: true });

const standsAs: Record<SnapshotStatus, string> = {
  draft: 'was saved anew',
  approved: 'is approved, and can be restated only',
  superseded: 'was superseded by a later one',
};

function refuse(code: 'stale-version' | 'wrong-state', { date, status }: MarketSnapshot): never {
  const stands: SnapshotStatus = status;
  const message = `Someone was first: the close of ${date} ${standsAs[stands]}.`;
  throw new AppError(code, [{ path: '', code, message }]);
}

/** The close under lock; one that is no draft any more, or was saved since, is refused. */
async function openDraft(
  { desk }: DeskActor,
  id: string,
  version: number,
  transaction: Transaction,
): Promise<MarketSnapshot> {
  await lockDesk(desk.id, transaction);
  const snapshot = await MarketSnapshot.findOne({
    where: { deskId: desk.id, id },
    include: { model: MarketQuote, as: 'quotes' },
    transaction,
  });
  if (!snapshot) throw new AppError('not-found');
  if (snapshot.status !== 'draft') refuse('wrong-state', snapshot);
  if (snapshot.version !== version) refuse('stale-version', snapshot);
  return snapshot;
}

const writeQuotes = (
  snapshot: MarketSnapshot,
  quotes: SnapshotDraft['quotes'],
  transaction: Transaction,
) =>
  MarketQuote.bulkCreate(
    quotes.map(({ underlyingId, market }) => ({
      snapshotId: snapshot.id,
      underlyingId,
      deskId: snapshot.deskId,
      spot: market.spot,
      rate: market.rate,
      yield: yieldOf(market),
      volatility: market.volatility,
    })),
    { transaction },
  );

export const createSnapshot = (
  { desk, userId }: DeskActor,
  draft: SnapshotDraft,
  writeOnce: WriteOnce,
): Promise<SnapshotOnTheWire> =>
  writeOnce(async (transaction) => {
    await lockDesk(desk.id, transaction);
    await refuseWrong(desk, draft, null, transaction);
    const { date, source } = draft;
    const snapshot = await MarketSnapshot.create(
      { deskId: desk.id, date, source, enteredById: userId },
      { transaction },
    );
    await writeQuotes(snapshot, draft.quotes, transaction);
    return getSnapshot(desk, snapshot.id, transaction);
  });

/** Numbers are replaced whole. Whoever saves is one of the makers from then on. */
export const saveSnapshot = (
  actor: DeskActor,
  id: string,
  saving: SnapshotSaving,
): Promise<SnapshotOnTheWire> =>
  sequelize.transaction(async (transaction) => {
    const { desk, userId } = actor;
    const snapshot = await openDraft(actor, id, saving.version, transaction);
    await refuseWrong(desk, saving, snapshot, transaction);
    await snapshot.update(
      {
        date: saving.date,
        source: snapshot.restatesId === null ? saving.source : snapshot.source,
        version: snapshot.version + 1,
        savedByIds: [...new Set([...snapshot.savedByIds, userId])],
        savedAt: new Date(),
      },
      { transaction },
    );
    await MarketQuote.destroy({ where: { snapshotId: id }, transaction });
    await writeQuotes(snapshot, saving.quotes, transaction);
    return getSnapshot(desk, id, transaction);
  });

/** A draft with the numbers of an approved close, which holds until the draft is approved. */
export const restateSnapshot = (
  { desk, userId }: DeskActor,
  id: string,
  reason: string,
  writeOnce: WriteOnce,
): Promise<SnapshotOnTheWire> =>
  writeOnce(async (transaction) => {
    await lockDesk(desk.id, transaction);
    const before = await MarketSnapshot.findOne({ where: { deskId: desk.id, id }, transaction });
    if (!before) throw new AppError('not-found');
    if (before.status !== 'approved') {
      const stands = before.status === 'draft' ? 'is a draft: change it' : standsAs.superseded;
      const message = `The close of ${before.date} ${stands}.`;
      throw new AppError('wrong-state', [{ path: '', code: 'wrong-state', message }]);
    }
    const own = { id: null, restatesId: before.id };
    const issues = await dateIssues(desk, before.date, own, transaction);
    if (issues.length > 0) throw new AppError('validation-failed', issues);
    const snapshot = await MarketSnapshot.create(
      {
        deskId: desk.id,
        date: before.date,
        source: 'restatement',
        reason,
        restatesId: before.id,
        enteredById: userId,
      },
      { transaction },
    );
    const quotes = await MarketQuote.findAll({ where: { snapshotId: id }, transaction });
    await MarketQuote.bulkCreate(
      quotes.map((quote) => ({ ...quote.get(), snapshotId: snapshot.id })),
      { transaction },
    );
    return getSnapshot(desk, snapshot.id, transaction);
  });

function approvalIssues(snapshot: SnapshotOnTheWire, confirmed: readonly string[]): Issue[] {
  const missing = snapshot.missing.map(({ symbol }) => ({
    path: 'quotes',
    code: 'incomplete',
    message: `${symbol} has no close yet; it is filled in before the rest is approved.`,
  }));
  const unconfirmed = snapshot.warnings
    .filter((warning) => !confirmed.includes(warningKey(warning)))
    .map(({ message }) => ({ path: 'confirmedWarnings', code: 'unconfirmed', message }));
  return [...missing, ...unconfirmed];
}

async function supersede(draft: MarketSnapshot, transaction: Transaction): Promise<string | null> {
  const before = await MarketSnapshot.findOne({
    where: { deskId: draft.deskId, date: draft.date, status: 'approved' },
    transaction,
  });
  if (!before) return null;
  const version = before.version + 1;
  await before.update({ status: 'superseded', supersededById: draft.id, version }, { transaction });
  return before.id;
}

const sealed = (snapshot: SnapshotOnTheWire, supersededId: string | null, by: string) => ({
  kind: 'market-data' as const,
  event: 'approved',
  subject: { type: 'market-snapshot', id: snapshot.id, version: snapshot.version },
  by,
  ...(snapshot.reason === null ? {} : { reason: snapshot.reason }),
  details: {
    date: snapshot.date,
    makerIds: snapshot.makerIds,
    ...(supersededId === null ? {} : { supersedes: supersededId }),
    quotes: snapshot.quotes.map(({ underlyingId, market }) => ({ underlyingId, market })),
  },
});

/** Makes the close official, and seals its numbers with what was confirmed about them. */
export const approveSnapshot = (
  actor: DeskActor,
  id: string,
  approval: { version: number; confirmedWarnings: readonly string[] },
): Promise<SnapshotOnTheWire> =>
  sequelize.transaction(async (transaction) => {
    const { desk, userId } = actor;
    const draft = await openDraft(actor, id, approval.version, transaction);
    if (makersOf(draft).includes(userId)) throw new AppError('own-work');
    const before = await getSnapshot(desk, id, transaction);
    const issues = approvalIssues(before, approval.confirmedWarnings);
    if (issues.length > 0) throw new AppError('validation-failed', issues);
    const supersededId = await supersede(draft, transaction);
    await draft.update(
      {
        status: 'approved',
        approvedById: userId,
        approvedAt: new Date(),
        version: draft.version + 1,
      },
      { transaction },
    );
    const approved = await getSnapshot(desk, id, transaction);
    const body = sealed(approved, supersededId, userId);
    const confirmedWarnings = before.warnings.map(({ message }) => message);
    await appendRecord(transaction, desk.id, {
      ...body,
      details: { ...body.details, confirmedWarnings },
    });
    return approved;
  });
