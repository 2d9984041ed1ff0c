import { sequelize } from '@/server/database';
import type { Book } from '@/server/models/book';
import type { Desk } from '@/server/models/desk';
import type { MarketSnapshot } from '@/server/models/market-snapshot';
import { PricingPolicy } from '@/server/models/pricing-policy';
import { RunChunk } from '@/server/models/run-chunk';
import { RunException } from '@/server/models/run-exception';
import { TradeVersion } from '@/server/models/trade-version';
import type { Underlying } from '@/server/models/underlying';
import type { User } from '@/server/models/user';
import { findDeskActor } from '@/server/services/access';
import { runChunk } from '@/server/services/run-work';
import { createRun } from '@/server/services/runs';
import type { WriteOnce } from '@/server/services/write-once';
import type { Run } from '@/shared/contracts/runs';
import { makeApprovedClose } from './market';
import { makeDraftPolicy, nextPolicyNumber } from './market-drafts';
import { makeMember, makeUser } from './people';
import { makeBook, makeTrade } from './trades';

/** The policy of the desk, or a first one that no member has a hand in. */
export async function policyInForce(desk: Desk): Promise<PricingPolicy> {
  const find = () => PricingPolicy.findOne({ where: { deskId: desk.id, status: 'approved' } });
  const before = await find();
  if (before) return before;
  await makeDraftPolicy(desk, await makeUser());
  await nextPolicyNumber(desk);
  const made = await find();
  if (!made) throw new Error('no policy is in force');
  return made;
}

export type Live = { book: Book; underlying: Underlying };

/** A live trade whose makers do nothing else. */
export const makeLiveTrade = async (
  { book, underlying }: Live,
  version: NonNullable<Parameters<typeof makeTrade>[3]>['version'] = {},
) =>
  makeTrade(book, underlying, await makeUser(), {
    approver: await makeUser(),
    version: { tradedAt: new Date('2025-06-02T10:05:00Z'), ...version },
  });

/** A book with so many live trades on one underlying, European puts unless told otherwise. */
export async function makeFilledBook(
  desk: Desk,
  underlying: Underlying,
  count = 1,
  version: Parameters<typeof makeLiveTrade>[1] = {},
): Promise<Book> {
  const book = await makeBook(desk);
  for (let made = 0; made < count; made += 1)
    await makeLiveTrade(
      { book, underlying },
      { exercise: 'european', strike: String(210 + made), ...version },
    );
  return book;
}

const inTransaction: WriteOnce = (write) => sequelize.transaction(write);

type Beginning = { books: readonly Book[]; snapshot: MarketSnapshot; starter?: User };

/** A run that waits, started by someone who does nothing else unless told otherwise. */
export async function startRun(desk: Desk, { books, snapshot, starter }: Beginning): Promise<Run> {
  await policyInForce(desk);
  const user = starter ?? (await makeMember(desk, 'analyst')).user;
  const actor = await findDeskActor({ userId: user.id, name: user.name }, desk.id);
  if (!actor) throw new Error('whoever starts a run is a member');
  const draft = { bookIds: books.map(({ id }) => id), snapshotId: snapshot.id };
  return createRun(actor, draft, inTransaction);
}

/** Values every chunk of a run that waits, as a worker would. */
export async function workOffRun(runId: string): Promise<void> {
  const chunks = await RunChunk.findAll({ where: { runId, doneAt: null } });
  for (const { number } of chunks) await runChunk(runId, number);
}

type Settled = { day: string; starter?: User };

/** A finished run of a book of its own with one trade. */
export async function makeFinishedRun(
  desk: Desk,
  underlying: Underlying,
  { day, starter }: Settled,
): Promise<Run> {
  const book = await makeFilledBook(desk, underlying);
  const snapshot = await makeApprovedClose(desk, underlying, day);
  const run = await startRun(desk, { books: [book], snapshot, starter });
  await workOffRun(run.id);
  return run;
}

/** Something wrong with the first trade of a run, whatever the run itself has found. */
export async function makeException(
  { id: runId }: Pick<Run, 'id'>,
  fields: Partial<RunException> = {},
): Promise<RunException> {
  const chunk = await RunChunk.findOne({ where: { runId, number: 1 }, rejectOnEmpty: true });
  const [tradeVersionId] = chunk.tradeVersionIds;
  const version = await TradeVersion.findByPk(tradeVersionId, { rejectOnEmpty: true });
  const { deskId, tradeId } = version;
  const key = { deskId, runId, tradeId, tradeVersionId };
  return RunException.create({ ...key, kind: 'wide', materiality: '12.5', ...fields });
}
