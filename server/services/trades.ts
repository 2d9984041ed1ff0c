/** One trade with all that happened to it, and what the runs need of trades and leave on them. */
import { QueryTypes, type Transaction } from 'sequelize';
import type { OptionKind, PricedExercise, Verdict } from '@/pricing/contract';
import type { LastValuation, Trade as TradeOnTheWire } from '@/shared/contracts/trades';
import { AppError } from '@/shared/errors';
import { liveStatuses } from '@/shared/trade-moves';
import { sequelize } from '../database';
import type { Desk } from '../models/desk';
import { Trade } from '../models/trade';
import { TradeVersion } from '../models/trade-version';
import { listTradeEvents } from './trade-events';
import { endOf, summaryOf, versionOf, withBookUnderlyingAndMaker, withPeople } from './trade-rows';

export async function getTrade(
  desk: Desk,
  tradeId: string,
  transaction?: Transaction,
): Promise<TradeOnTheWire> {
  const trade = await Trade.findOne({
    where: { deskId: desk.id, id: tradeId },
    include: withBookUnderlyingAndMaker,
    transaction,
  });
  if (!trade) throw new AppError('not-found');
  const versions = await TradeVersion.findAll({
    where: { tradeId },
    include: withPeople,
    order: [['number', 'DESC']],
    transaction,
  });
  const shown = versions.find(({ id }) => id === (trade.liveVersionId ?? trade.latestVersionId));
  if (!shown) throw new Error(`Trade ${trade.number} has lost its version.`);
  return {
    ...summaryOf(trade, shown),
    version: trade.version,
    liveVersionId: trade.liveVersionId,
    latestVersionId: trade.latestVersionId,
    versions: versions.map(versionOf),
    events: await listTradeEvents(desk.id, tradeId, transaction),
    end: endOf(trade),
  };
}

/** A trade as a run takes it up: the terms in force, and who had a hand in them. */
export type LiveTrade = {
  tradeId: string;
  tradeNumber: string;
  bookId: string;
  bookCode: string;
  tradeVersionId: string;
  underlyingId: string;
  currency: string;
  direction: 'buy' | 'sell';
  quantity: string;
  contractSize: string;
  kind: OptionKind;
  exercise: PricedExercise;
  strike: string;
  expiryDate: string;
  expiryAt: Date;
  tradedAt: Date;
  /** Whoever proposed, amended, approved or returned a version of it. */
  touchedByIds: string[];
};

const liveTrades = `
  SELECT trade.id AS "tradeId", trade.number AS "tradeNumber", book.id AS "bookId",
    book.code AS "bookCode", version.id AS "tradeVersionId",
    version.underlying_id AS "underlyingId", underlying.currency, version.direction,
    version.quantity, version.contract_size AS "contractSize", version.kind, version.exercise,
    version.strike, version.expiry_date::text AS "expiryDate", version.expiry_at AS "expiryAt",
    version.traded_at AS "tradedAt", touched.ids AS "touchedByIds"
  FROM trades trade
  JOIN books book ON book.id = trade.book_id
  JOIN trade_versions version ON version.id = trade.live_version_id
  JOIN underlyings underlying ON underlying.id = version.underlying_id
  CROSS JOIN LATERAL (
    SELECT array_agg(DISTINCT hand.id) AS ids
    FROM trade_versions each_version,
      unnest(ARRAY[each_version.proposed_by_id, each_version.decided_by_id]) AS hand (id)
    WHERE each_version.trade_id = trade.id AND hand.id IS NOT NULL
  ) touched
  WHERE trade.desk_id = $deskId AND trade.book_id = ANY ($bookIds::uuid[])
    AND trade.status = ANY ($live::text[])
  ORDER BY trade.ordinal`;

export const liveTradesOfBooks = (
  deskId: string,
  bookIds: readonly string[],
  transaction: Transaction,
): Promise<LiveTrade[]> =>
  sequelize.query<LiveTrade>(liveTrades, {
    bind: { deskId, bookIds, live: liveStatuses },
    type: QueryTypes.SELECT,
    transaction,
  });

/** What a run found for a trade; a value of null where no route gave one. */
export type ValuedTrade = {
  tradeId: string;
  runId: string;
  snapshotDate: string;
  found: {
    value: number;
    errorEstimate: number | null;
    verdict: Verdict;
    refuted: boolean;
    total: string;
    strip: LastValuation['strip'];
    tolerance: number;
  } | null;
};

/**
 * A value of the same close takes the place of the one before; a later close makes that one the
 * previous value; a run on an earlier close leaves what stands. Locked in one order, so that two
 * runs never wait for each other.
 */
const record = `
  WITH given AS (
    SELECT * FROM jsonb_to_recordset($rows::jsonb) AS row ("tradeId" uuid, "runId" uuid,
      "snapshotDate" date, value double precision, "errorEstimate" double precision, verdict text,
      refuted boolean, total numeric, strip jsonb, tolerance double precision)
  ), locked AS (
    SELECT id FROM trades WHERE id IN (SELECT "tradeId" FROM given) ORDER BY id FOR NO KEY UPDATE
  )
  UPDATE trades trade SET
    previous_value = CASE WHEN trade.last_snapshot_date = given."snapshotDate"
      THEN trade.previous_value ELSE trade.last_value END,
    last_run_id = given."runId", last_snapshot_date = given."snapshotDate",
    last_value = given.value, last_error = given."errorEstimate",
    last_verdict = given.verdict, last_refuted = given.refuted, last_total = given.total,
    last_strip = given.strip, last_tolerance = given.tolerance
  FROM given JOIN locked ON locked.id = given."tradeId"
  WHERE trade.id = given."tradeId"
    AND (trade.last_snapshot_date IS NULL OR trade.last_snapshot_date <= given."snapshotDate")`;

export async function recordLastValues(
  transaction: Transaction,
  rows: readonly ValuedTrade[],
): Promise<void> {
  const flat = rows.map(({ found, ...row }) => ({ ...row, ...found }));
  await sequelize.query(record, { bind: { rows: JSON.stringify(flat) }, transaction });
}
