import { QueryTypes } from 'sequelize';
import { sequelize } from '@/server/database';
import type { Book } from '@/server/models/book';
import type { Underlying } from '@/server/models/underlying';
import type { User } from '@/server/models/user';

type Filling = {
  book: Book;
  underlyings: readonly Underlying[];
  proposer: User;
  approver: User;
  count: number;
};

/**
 * Fills a book with trades in one statement: two in twenty wait, one in twenty was returned, the
 * rest are live; of these some have no value yet and a few are wide or in disagreement. Values,
 * expiries and changes repeat, so that orders have to look at the id as well.
 */
const fill = `
  WITH base AS (
    UPDATE desks SET last_trade_number = last_trade_number + $count WHERE id = $deskId
    RETURNING last_trade_number - $count AS ordinal
  ), made AS (
    SELECT n, base.ordinal + n AS ordinal, gen_random_uuid() AS id,
      gen_random_uuid() AS version_id,
      ($underlyingIds::uuid[])[1 + n % cardinality($underlyingIds::uuid[])] AS underlying_id,
      CASE WHEN n % 20 IN (0, 1) THEN 'proposed' WHEN n % 20 = 2 THEN 'returned' ELSE 'live' END
        AS status,
      timestamptz '2027-01-04 15:30Z' + (n % 400) * interval '1 day' AS expiry_at,
      CASE WHEN n % 20 > 3 THEN (n * 7919 % 5000) / 100.0 END AS value
    FROM base, generate_series(1, $count) AS n
  ), trades_made AS (
    INSERT INTO trades (id, desk_id, book_id, ordinal, status, live_version_id,
      latest_version_id, underlying_id, expiry_at, proposed_by_id, proposed_at, last_run_id,
      last_snapshot_date, last_value, last_error, last_verdict, last_refuted, last_total,
      last_strip, last_tolerance, previous_value)
    SELECT id, $deskId, $bookId, ordinal, status, CASE status WHEN 'live' THEN version_id END,
      version_id, underlying_id, expiry_at, $proposerId, now(),
      CASE WHEN value IS NOT NULL THEN $bookId::uuid END,
      CASE WHEN value IS NOT NULL THEN date '2026-11-30' END, value,
      CASE WHEN value IS NOT NULL THEN 0.0001 END,
      CASE WHEN value IS NULL THEN NULL WHEN n % 97 = 0 THEN 'disagree'
        WHEN n % 41 = 0 THEN 'wide' ELSE 'agree' END,
      CASE WHEN value IS NOT NULL THEN false END, round(value * -500, 2),
      CASE WHEN value IS NOT NULL THEN jsonb_build_array(
        jsonb_build_object('name', 'closed-form', 'value', value, 'errorEstimate', 1e-12),
        jsonb_build_object('name', 'heat-crank-nicolson', 'value', value + 0.0001,
          'errorEstimate', 0.0002)) END,
      CASE WHEN value IS NOT NULL THEN 0.01 END,
      CASE WHEN n % 20 > 5 THEN value + (n % 13 - 6) / 10.0 END
    FROM made
  )
  INSERT INTO trade_versions (id, desk_id, trade_id, number, state, underlying_id, direction,
    quantity, contract_size, kind, exercise, strike, expiry_date, expiry_at, premium_amount,
    premium_currency, premium_date, counterparty, traded_at, note, proposed_by_id, proposed_at,
    decided_by_id, decided_at, decision_reason)
  SELECT version_id, $deskId, id, 1,
    CASE status WHEN 'live' THEN 'approved' ELSE status END, underlying_id, 'sell', 10, 50, 'put',
    'european', 200 + n % 30, expiry_at::date, expiry_at, 6750, 'EUR', '2026-06-03',
    'Mill ' || n % 50, '2026-06-01T10:00Z', '', $proposerId, now(),
    CASE WHEN status <> 'proposed' THEN $approverId::uuid END,
    CASE WHEN status <> 'proposed' THEN now() END,
    CASE WHEN status = 'returned' THEN 'Not what was quoted' END
  FROM made`;

export async function fillBook({ book, underlyings, proposer, approver, count }: Filling) {
  const bind = {
    count,
    deskId: book.deskId,
    bookId: book.id,
    underlyingIds: underlyings.map(({ id }) => id),
    proposerId: proposer.id,
    approverId: approver.id,
  };
  await sequelize.query(fill, { bind, type: QueryTypes.INSERT });
}
