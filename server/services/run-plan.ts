/** What a run will do, decided when it is started: close, policy, instant, trades and chunks. */
import type { Transaction } from 'sequelize';
import type { RunDraft } from '@/shared/contracts/runs';
import { instantInZone } from '@/shared/dates';
import { AppError, type Issue } from '@/shared/errors';
import { Book } from '../models/book';
import type { Desk } from '../models/desk';
import type { MarketSnapshot } from '../models/market-snapshot';
import type { PricingPolicy } from '../models/pricing-policy';
import { Underlying } from '../models/underlying';
import { approvedSnapshot, marketIn } from './market-data';
import { activePolicy } from './policies';
import { takeUpTrades } from './run-trades';
import type { LiveTrade } from './trades';

/** Small enough that a stop costs less than a second or two, large enough to share their overhead. */
const chunkSize = 50;

const refuse = (path: string, code: string, message: string): never => {
  throw new AppError('validation-failed', [{ path, code, message }]);
};

async function refuseUnknownBooks(
  desk: Desk,
  bookIds: readonly string[],
  transaction: Transaction,
) {
  const books = await Book.findAll({
    where: { deskId: desk.id, id: [...bookIds], archivedAt: null },
    transaction,
  });
  const known = new Set(books.map(({ id }) => id));
  const message = 'There is no such book on this desk; choose one from the list.';
  const issues = bookIds.flatMap((id, index): Issue[] =>
    known.has(id) ? [] : [{ path: `bookIds.${index}`, code: 'unknown-book', message }],
  );
  if (issues.length > 0) throw new AppError('validation-failed', issues);
}

/** Every trade needs its market, or the run would leave out what it claims to have valued. */
async function refuseMissingMarkets(
  snapshot: MarketSnapshot,
  trades: readonly LiveTrade[],
  transaction: Transaction,
) {
  const needed = [...new Set(trades.map(({ underlyingId }) => underlyingId))];
  const missing = needed.filter((id) => marketIn(snapshot, id) === null);
  if (missing.length === 0) return;
  const rows = await Underlying.findAll({
    where: { id: missing },
    order: [['symbol', 'ASC']],
    transaction,
  });
  const symbols = rows.map(({ symbol }) => symbol).join(', ');
  refuse(
    'snapshotId',
    'incomplete-close',
    `The close of ${snapshot.date} has no market for ${symbols}, which trades of these books need. Restate the close with it.`,
  );
}

function chunksOf(trades: readonly LiveTrade[]): string[][] {
  const ids = trades.map(({ tradeVersionId }) => tradeVersionId);
  const count = Math.ceil(ids.length / chunkSize);
  return Array.from({ length: count }, (_, index) =>
    ids.slice(index * chunkSize, (index + 1) * chunkSize),
  );
}

export type RunPlan = {
  snapshot: MarketSnapshot;
  policy: PricingPolicy;
  valuedAtMs: number;
  trades: LiveTrade[];
  chunks: string[][];
  leftOut: number;
};

export async function planRun(
  desk: Desk,
  { bookIds, snapshotId }: RunDraft,
  transaction: Transaction,
): Promise<RunPlan> {
  await refuseUnknownBooks(desk, bookIds, transaction);
  const snapshot =
    (await approvedSnapshot(desk.id, snapshotId, transaction)) ??
    refuse('snapshotId', 'not-approved', 'Choose an approved close that has not been restated.');
  const policy =
    (await activePolicy(desk.id, transaction)) ??
    refuse('', 'no-policy', 'The desk has no pricing policy in force; a risk officer writes one.');
  const { date } = snapshot;
  const valuedAtMs = instantInZone(date, desk.expiryCutoff, desk.timeZone);
  const { trades, leftOut } = await takeUpTrades(desk, bookIds, { valuedAtMs, date }, transaction);
  if (trades.length === 0)
    refuse('bookIds', 'nothing-to-value', `These books have no live trades on ${date}.`);
  await refuseMissingMarkets(snapshot, trades, transaction);
  return { snapshot, policy, valuedAtMs, trades, chunks: chunksOf(trades), leftOut };
}
