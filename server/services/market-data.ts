/** Closes as they stand: the list, one of them, and the approved one that prices are made on. */
import { Op, type Transaction, type WhereOptions } from 'sequelize';
import { z } from 'zod';
import type { Market } from '@/pricing/contract';
import type {
  PreviousClose,
  Snapshot as SnapshotOnTheWire,
  SnapshotStatus,
  SnapshotSummary,
} from '@/shared/contracts/market-data';
import { AppError } from '@/shared/errors';
import { marketWarnings } from '@/shared/market-warnings';
import type { Desk } from '../models/desk';
import { MarketQuote } from '../models/market-quote';
import { MarketSnapshot } from '../models/market-snapshot';
import { Underlying } from '../models/underlying';
import { User } from '../models/user';
import { marketOf } from './underlyings';

const withQuotes = { model: MarketQuote, as: 'quotes' };

const withPeople = [
  { model: User, as: 'enteredBy', attributes: ['id', 'name'], required: true },
  { model: User, as: 'approvedBy', attributes: ['id', 'name'] },
];

/** The approved close of that id, or the last one of the desk, with its quotes. */
export const approvedSnapshot = (
  deskId: string,
  snapshotId?: string,
  transaction?: Transaction,
): Promise<MarketSnapshot | null> =>
  MarketSnapshot.findOne({
    where: { deskId, status: 'approved', ...(snapshotId === undefined ? {} : { id: snapshotId }) },
    order: [['date', 'DESC']],
    include: withQuotes,
    transaction,
  });

/** A close that is or was in force, and so may have been valued on; null: the last in force. */
export const closeThatWasApproved = (
  deskId: string,
  snapshotId: string | null,
): Promise<MarketSnapshot | null> =>
  snapshotId === null
    ? approvedSnapshot(deskId)
    : MarketSnapshot.findOne({
        where: { deskId, id: snapshotId, status: ['approved', 'superseded'] },
        include: withQuotes,
      });

/** The market of an underlying on that close; null where the close does not have it. */
export function marketIn(snapshot: MarketSnapshot, underlyingId: string): Market | null {
  if (!snapshot.quotes) throw new Error('A close was read without its quotes.');
  const quote = snapshot.quotes.find((row) => row.underlyingId === underlyingId);
  return quote ? marketOf(quote) : null;
}

/** The approved close that the numbers of a day are compared with. */
export const findPrevious = (
  deskId: string,
  date: string,
  transaction?: Transaction,
): Promise<MarketSnapshot | null> =>
  MarketSnapshot.findOne({
    where: { deskId, status: 'approved', date: { [Op.lt]: date } },
    order: [['date', 'DESC']],
    include: withQuotes,
    transaction,
  });

export const marketsOf = (snapshot: MarketSnapshot | null): Map<string, Market> =>
  new Map((snapshot?.quotes ?? []).map((row) => [row.underlyingId, marketOf(row)]));

const previousOf = (snapshot: MarketSnapshot | null): PreviousClose | null =>
  snapshot && {
    snapshotId: snapshot.id,
    date: snapshot.date,
    quotes: [...marketsOf(snapshot)].map(([underlyingId, market]) => ({ underlyingId, market })),
  };

export async function getPreviousClose(desk: Desk, date: string) {
  return { close: previousOf(await findPrevious(desk.id, date)) };
}

export const makersOf = ({ enteredById, savedByIds }: MarketSnapshot): string[] => [
  ...new Set([enteredById, ...savedByIds]),
];

export const listedUnderlyings = (deskId: string, transaction?: Transaction) =>
  Underlying.findAll({
    where: { deskId },
    order: [
      ['name', 'ASC'],
      ['id', 'ASC'],
    ],
    transaction,
  });

const personOf = ({ id, name }: User) => ({ id, name });

function summaryOf(snapshot: MarketSnapshot, quoteCount: number): SnapshotSummary {
  const { enteredBy, approvedBy } = snapshot;
  if (!enteredBy) throw new Error('A close was read without whoever entered it.');
  return {
    id: snapshot.id,
    date: snapshot.date,
    status: snapshot.status,
    source: snapshot.source,
    quoteCount,
    enteredBy: personOf(enteredBy),
    enteredAt: snapshot.enteredAt.toISOString(),
    approvedBy: approvedBy ? personOf(approvedBy) : null,
    approvedAt: snapshot.approvedAt?.toISOString() ?? null,
  };
}

function snapshotOf(
  snapshot: MarketSnapshot,
  underlyings: readonly Underlying[],
  previous: MarketSnapshot | null,
): SnapshotOnTheWire {
  const markets = marketsOf(snapshot);
  const quotes = underlyings.flatMap((underlying) => {
    const market = markets.get(underlying.id);
    if (!market) return [];
    const { id, symbol, name, kind, currency, priceDecimals } = underlying;
    return [{ underlyingId: id, symbol, name, kind, currency, priceDecimals, market }];
  });
  const isDraft = snapshot.status === 'draft';
  return {
    ...summaryOf(snapshot, markets.size),
    version: snapshot.version,
    reason: snapshot.reason,
    restatesId: snapshot.restatesId,
    supersededById: snapshot.supersededById,
    savedAt: snapshot.savedAt?.toISOString() ?? null,
    makerIds: makersOf(snapshot),
    quotes,
    missing: underlyings
      .filter(({ id, archivedAt }) => isDraft && archivedAt === null && !markets.has(id))
      .map(({ id, symbol }) => ({ underlyingId: id, symbol })),
    previous: previousOf(previous),
    // What was confirmed when it was approved is sealed in the chain of records.
    warnings: isDraft ? marketWarnings(quotes, marketsOf(previous)) : [],
  };
}

export async function getSnapshot(
  desk: Desk,
  id: string,
  transaction?: Transaction,
): Promise<SnapshotOnTheWire> {
  const snapshot = await MarketSnapshot.findOne({
    where: { deskId: desk.id, id },
    include: [withQuotes, ...withPeople],
    transaction,
  });
  if (!snapshot) throw new AppError('not-found');
  const underlyings = await listedUnderlyings(desk.id, transaction);
  return snapshotOf(snapshot, underlyings, await findPrevious(desk.id, snapshot.date, transaction));
}

/** The rows after the one that the page before ended with. */
async function afterRow(desk: Desk, cursor: string | undefined): Promise<WhereOptions> {
  if (cursor === undefined) return {};
  const id = z.uuid().safeParse(cursor);
  const last = id.success
    ? await MarketSnapshot.findOne({ where: { deskId: desk.id, id: id.data } })
    : null;
  if (!last) {
    const message = 'Take the cursor from the page before, unchanged.';
    throw new AppError('validation-failed', [{ path: 'cursor', code: 'not-a-cursor', message }]);
  }
  const { date, enteredAt } = last;
  return {
    [Op.or]: [
      { date: { [Op.lt]: date } },
      { date, enteredAt: { [Op.lt]: enteredAt } },
      { date, enteredAt, id: { [Op.lt]: last.id } },
    ],
  };
}

async function countQuotes(snapshotIds: readonly string[]): Promise<Map<string, number>> {
  const counts = await MarketQuote.count({
    where: { snapshotId: [...snapshotIds] },
    group: ['snapshot_id'],
  });
  return new Map(counts.map((row) => [String(row.snapshot_id), row.count]));
}

export async function listSnapshots(
  desk: Desk,
  query: { cursor?: string; limit: number; status?: SnapshotStatus },
) {
  const rows = await MarketSnapshot.findAll({
    where: {
      deskId: desk.id,
      ...(query.status === undefined ? {} : { status: query.status }),
      ...(await afterRow(desk, query.cursor)),
    },
    include: withPeople,
    order: [
      ['date', 'DESC'],
      ['enteredAt', 'DESC'],
      ['id', 'DESC'],
    ],
    limit: query.limit + 1,
  });
  const shown = rows.slice(0, query.limit);
  const counts = await countQuotes(shown.map(({ id }) => id));
  return {
    items: shown.map((row) => summaryOf(row, counts.get(row.id) ?? 0)),
    nextCursor: rows.length > query.limit ? (shown.at(-1)?.id ?? null) : null,
  };
}
