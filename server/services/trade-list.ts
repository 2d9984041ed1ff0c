/**
 * The list of trades: sorted, filtered and searched by the database, in keyset pages. First the
 * ids of one page in their order, on narrow rows; then what is shown of those few.
 */
import { QueryTypes } from 'sequelize';
import { z } from 'zod';
import { tradeSorts, type listTrades as endpoint, type TradeSort } from '@/shared/contracts/trades';
import type { QueryOf } from '@/shared/endpoint';
import { AppError } from '@/shared/errors';
import { waitingStatuses } from '@/shared/trade-moves';
import { sequelize } from '../database';
import type { Desk } from '../models/desk';
import { Trade } from '../models/trade';
import { containing } from './containing';
import { summaryOf, withBookUnderlyingAndMaker, withShownVersions } from './trade-rows';

export type TradeQuery = QueryOf<typeof endpoint>;

type SortKey = { expression: string; type: string; mayBeNull: boolean };

const sortKeys: Record<TradeSort, SortKey> = {
  number: { expression: 'trade.ordinal', type: 'integer', mayBeNull: false },
  underlying: { expression: 'underlying.symbol', type: 'text', mayBeNull: false },
  expiry: { expression: 'trade.expiry_at', type: 'timestamptz', mayBeNull: false },
  value: { expression: 'trade.last_value', type: 'double precision', mayBeNull: true },
  change: { expression: 'trade.value_change', type: 'double precision', mayBeNull: true },
  total: { expression: 'trade.last_total', type: 'numeric', mayBeNull: true },
};

type PlacedRow = { id: string; key: string | null };

const directions = ['ascending', 'descending'] as const;

/** A cursor belongs to the order that it was made in. */
const cursorSchema = z.tuple([
  z.enum(tradeSorts),
  z.enum(directions),
  z.string().nullable(),
  z.uuid(),
]);

const refuseCursor = () => {
  const message = 'Take the cursor from the page before, unchanged, with the same order.';
  return new AppError('validation-failed', [{ path: 'cursor', code: 'not-a-cursor', message }]);
};

const cursorOf = ({ sort, direction }: TradeQuery, { id, key }: PlacedRow): string =>
  Buffer.from(JSON.stringify([sort, direction, key, id])).toString('base64url');

const keyPatterns: Record<string, RegExp> = {
  integer: /^\d{1,9}$/,
  text: /^.{1,200}$/s,
  timestamptz: /^[\d :.+-]{19,40}$/,
  'double precision': /^-?[\d.]+(e[+-]?\d+)?$/,
  numeric: /^-?[\d.]+$/,
};

function placeOf(cursor: string, { sort, direction }: TradeQuery): PlacedRow {
  try {
    const [ofSort, ofDirection, key, id] = cursorSchema.parse(
      JSON.parse(Buffer.from(cursor, 'base64url').toString('utf8')),
    );
    const { type, mayBeNull } = sortKeys[sort];
    const fits = key === null ? mayBeNull : keyPatterns[type].test(key);
    if (ofSort !== sort || ofDirection !== direction || !fits) throw refuseCursor();
    return { id, key };
  } catch (error) {
    if (!(error instanceof SyntaxError || error instanceof z.ZodError)) throw error;
    throw refuseCursor();
  }
}

/** The rows behind a place; those without a value come last, whichever way round. */
function behind({ sort, direction }: TradeQuery, { key }: PlacedRow): string {
  const { expression, type, mayBeNull } = sortKeys[sort];
  const compare = direction === 'ascending' ? '>' : '<';
  if (key === null) return `${expression} IS NULL AND trade.id ${compare} $id::uuid`;
  const after = `(${expression}, trade.id) ${compare} ($key::${type}, $id::uuid)`;
  return mayBeNull ? `(${after} OR ${expression} IS NULL)` : after;
}

function conditionsOf(query: TradeQuery, place: PlacedRow | null): string[] {
  const conditions = ['trade.desk_id = $deskId'];
  if (query.bookId !== undefined) conditions.push('trade.book_id = $bookId');
  if (query.status !== undefined) conditions.push('trade.status = ANY ($statuses::text[])');
  if (query.verdict !== undefined) conditions.push('trade.last_verdict = $verdict');
  if (query.underlyingId !== undefined) conditions.push('trade.underlying_id = $underlyingId');
  if (query.search)
    conditions.push(`(trade.number ILIKE $search OR underlying.symbol ILIKE $search
      OR underlying.name ILIKE $search OR version.counterparty ILIKE $search)`);
  if (place) conditions.push(behind(query, place));
  return conditions;
}

/** Only what a query names is joined, so that an index can give the rows in their order. */
function joinsOf({ sort, search }: TradeQuery): string {
  const underlying = 'JOIN underlyings underlying ON underlying.id = trade.underlying_id';
  const version = `JOIN trade_versions version
    ON version.id = coalesce(trade.live_version_id, trade.latest_version_id)`;
  if (search) return `${underlying} ${version}`;
  return sort === 'underlying' ? underlying : '';
}

/** The statement of one page, which is asked for one row more than it has. */
export function pageStatement(desk: Desk, query: TradeQuery) {
  const place = query.cursor === undefined ? null : placeOf(query.cursor, query);
  const { expression, mayBeNull } = sortKeys[query.sort];
  const way = query.direction === 'ascending' ? 'ASC' : 'DESC';
  const sql = `
    SELECT trade.id, ${expression}::text AS key FROM trades trade ${joinsOf(query)}
    WHERE ${conditionsOf(query, place).join(' AND ')}
    ORDER BY ${expression} ${way}${mayBeNull ? ' NULLS LAST' : ''}, trade.id ${way}
    LIMIT $limit`;
  const all = {
    deskId: desk.id,
    bookId: query.bookId,
    statuses: query.status === 'waiting' ? waitingStatuses : [query.status],
    verdict: query.verdict,
    underlyingId: query.underlyingId,
    search: query.search ? containing(query.search) : undefined,
    key: place?.key ?? undefined,
    id: place?.id,
    limit: query.limit + 1,
  };
  const bind = Object.fromEntries(
    Object.entries(all).filter(([name]) => new RegExp(`\\$${name}\\b`).test(sql)),
  );
  return { sql, bind };
}

export async function listTrades(desk: Desk, query: TradeQuery) {
  const { sql, bind } = pageStatement(desk, query);
  const placed = await sequelize.query<PlacedRow>(sql, { bind, type: QueryTypes.SELECT });
  const page = placed.slice(0, query.limit);
  const rows = await Trade.findAll({
    where: { id: page.map(({ id }) => id) },
    include: [...withBookUnderlyingAndMaker, ...withShownVersions],
  });
  const rowsById = new Map(rows.map((row) => [row.id, row]));
  const last = page.at(-1);
  return {
    items: page.flatMap(({ id }) => {
      const row = rowsById.get(id);
      const shown = row?.liveVersion ?? row?.latestVersion;
      return row && shown ? [summaryOf(row, shown)] : [];
    }),
    nextCursor: placed.length > query.limit && last ? cursorOf(query, last) : null,
  };
}
