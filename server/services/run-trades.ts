/** The trades of a run: which ones it takes up, and their terms as it values them. */
import { QueryTypes, type Transaction } from 'sequelize';
import type { OptionKind, PricedExercise } from '@/pricing/contract';
import { addDays, instantInZone } from '@/shared/dates';
import { sequelize } from '../database';
import type { Desk } from '../models/desk';
import { liveTradesOfBooks, type LiveTrade } from './trades';

export type RunTrade = {
  tradeId: string;
  tradeNumber: string;
  tradeVersionId: string;
  bookId: string;
  bookCode: string;
  bookName: string;
  underlying: {
    id: string;
    symbol: string;
    name: string;
    currency: string;
    unit: string;
    priceDecimals: number;
    tolerance: number;
  };
  direction: 'buy' | 'sell';
  quantity: string;
  contractSize: string;
  kind: OptionKind;
  exercise: PricedExercise;
  strike: string;
  expiryDate: string;
  expiryAt: Date;
  /** Whoever proposed, amended, approved or returned a version of it. */
  touchedByIds: string[];
};

const tradesOfVersions = `
  SELECT trade.id AS "tradeId", trade.number AS "tradeNumber", version.id AS "tradeVersionId",
    book.id AS "bookId", book.code AS "bookCode", book.name AS "bookName",
    json_build_object('id', underlying.id, 'symbol', underlying.symbol, 'name', underlying.name,
      'currency', underlying.currency, 'unit', underlying.unit,
      'priceDecimals', underlying.price_decimals, 'tolerance', underlying.tolerance) AS underlying,
    version.direction, version.quantity, version.contract_size AS "contractSize", version.kind,
    version.exercise, version.strike, version.expiry_date::text AS "expiryDate",
    version.expiry_at AS "expiryAt", touched.ids AS "touchedByIds"
  FROM unnest($versionIds::uuid[]) WITH ORDINALITY AS wanted (id, place)
  JOIN trade_versions version ON version.id = wanted.id AND version.desk_id = $deskId
  JOIN trades trade ON trade.id = version.trade_id
  JOIN books book ON book.id = trade.book_id
  JOIN underlyings underlying ON underlying.id = version.underlying_id
  CROSS JOIN LATERAL (
    SELECT array_agg(DISTINCT hand.id) AS ids
    FROM trade_versions each_version,
      unnest(ARRAY[each_version.proposed_by_id, each_version.decided_by_id]) AS hand (id)
    WHERE each_version.trade_id = trade.id AND hand.id IS NOT NULL
  ) touched
  ORDER BY wanted.place`;

/** In the order of the ids. */
export const findRunTrades = (
  deskId: string,
  versionIds: readonly string[],
  transaction?: Transaction,
): Promise<RunTrade[]> =>
  sequelize.query<RunTrade>(tradesOfVersions, {
    bind: { deskId, versionIds },
    type: QueryTypes.SELECT,
    transaction,
  });

/** Whoever had a hand in any trade of the run. */
export async function findTouchers(runId: string, transaction?: Transaction): Promise<string[]> {
  const rows = await sequelize.query<{ id: string }>(
    `SELECT DISTINCT hand.id
      FROM run_chunks chunk
      CROSS JOIN unnest(chunk.trade_version_ids) AS valued (id)
      JOIN trade_versions version ON version.id = valued.id
      JOIN trade_versions each_version ON each_version.trade_id = version.trade_id
      CROSS JOIN unnest(ARRAY[each_version.proposed_by_id, each_version.decided_by_id])
        AS hand (id)
      WHERE chunk.run_id = $runId AND hand.id IS NOT NULL`,
    { bind: { runId }, type: QueryTypes.SELECT, transaction },
  );
  return rows.map(({ id }) => id);
}

export type TakenUp = { trades: LiveTrade[]; leftOut: number };

type Close = { valuedAtMs: number; date: string };

/** A close values what was agreed by its day and still runs at its instant. */
export async function takeUpTrades(
  desk: Desk,
  bookIds: readonly string[],
  { valuedAtMs, date }: Close,
  transaction: Transaction,
): Promise<TakenUp> {
  const dayEndMs = instantInZone(addDays(date, 1), '00:00', desk.timeZone);
  const live = await liveTradesOfBooks(desk.id, bookIds, transaction);
  const trades = live.filter(
    ({ expiryAt, tradedAt }) => expiryAt.getTime() > valuedAtMs && tradedAt.getTime() < dayEndMs,
  );
  return { trades, leftOut: live.length - trades.length };
}
