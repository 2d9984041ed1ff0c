import type { Migration } from './migration';

/**
 * Books, the trades on them, and every version that a trade has had. What a trade was last worth
 * lies on its row, so that a book is listed, sorted and filtered without touching its history.
 */
export const trades: Migration = {
  name: '0011-trades',
  async up({ client }) {
    await client.query(tables);
    await client.query(indexes);
    await client.query(rights);
  },
};

const tables = `
  ALTER TABLE desks ADD COLUMN last_trade_number integer NOT NULL DEFAULT 0
    CHECK (last_trade_number >= 0);

  CREATE TABLE books (
    id uuid PRIMARY KEY,
    desk_id uuid NOT NULL REFERENCES desks,
    code text NOT NULL CHECK (code ~ '^[A-Z0-9][A-Z0-9-]{1,11}$'),
    name text NOT NULL CHECK (name <> ''),
    created_by_id uuid NOT NULL REFERENCES users,
    created_at timestamptz(3) NOT NULL,
    archived_at timestamptz(3),
    UNIQUE (desk_id, code),
    UNIQUE (desk_id, id)
  );

  CREATE TABLE trades (
    id uuid PRIMARY KEY,
    desk_id uuid NOT NULL REFERENCES desks,
    book_id uuid NOT NULL,
    ordinal integer NOT NULL CHECK (ordinal >= 1),
    number text NOT NULL GENERATED ALWAYS AS
      ('T-' || lpad(ordinal::text, greatest(4, length(ordinal::text)), '0')) STORED,
    status text NOT NULL
      CHECK (status IN ('proposed', 'returned', 'live', 'amended', 'closed', 'expired')),
    live_version_id uuid,
    latest_version_id uuid NOT NULL,
    version integer NOT NULL DEFAULT 0 CHECK (version >= 0),
    underlying_id uuid NOT NULL,
    expiry_at timestamptz(3) NOT NULL,
    proposed_by_id uuid NOT NULL REFERENCES users,
    proposed_at timestamptz(3) NOT NULL,
    end_outcome text CHECK (end_outcome IN ('closed', 'lapsed', 'exercised')),
    end_date date,
    end_amount numeric,
    end_currency text CHECK (end_currency ~ '^[A-Z]{3}$'),
    last_run_id uuid,
    last_snapshot_date date,
    last_value double precision CHECK (abs(last_value) < 'Infinity'),
    last_error double precision CHECK (last_error >= 0 AND last_error < 'Infinity'),
    last_verdict text CHECK (last_verdict IN ('agree', 'wide', 'disagree', 'one-route')),
    last_refuted boolean,
    last_total numeric,
    last_strip jsonb CHECK (jsonb_typeof(last_strip) = 'array'),
    last_tolerance double precision CHECK (last_tolerance > 0),
    previous_value double precision CHECK (abs(previous_value) < 'Infinity'),
    value_change double precision GENERATED ALWAYS AS (last_value - previous_value) STORED,
    UNIQUE (desk_id, ordinal),
    UNIQUE (desk_id, id),
    FOREIGN KEY (desk_id, book_id) REFERENCES books (desk_id, id),
    FOREIGN KEY (desk_id, underlying_id) REFERENCES underlyings (desk_id, id),
    CHECK ((live_version_id IS NULL) = (status IN ('proposed', 'returned'))),
    CHECK (live_version_id <> latest_version_id OR status <> 'amended'),
    CHECK ((end_outcome IS NULL) = (end_date IS NULL)),
    CHECK ((end_amount IS NULL) = (end_currency IS NULL)),
    CHECK (CASE status WHEN 'closed' THEN end_outcome = 'closed' AND end_amount IS NOT NULL
      WHEN 'expired' THEN end_outcome IN ('lapsed', 'exercised') AND end_amount IS NULL
      ELSE end_outcome IS NULL AND end_amount IS NULL END),
    CHECK ((last_run_id IS NULL) = (last_snapshot_date IS NULL)),
    CHECK (last_run_id IS NOT NULL OR last_value IS NULL),
    CHECK ((last_value IS NULL) = (last_total IS NULL)),
    CHECK ((last_value IS NULL) = (last_verdict IS NULL)),
    CHECK ((last_value IS NULL) = (last_refuted IS NULL)),
    CHECK ((last_value IS NULL) = (last_strip IS NULL)),
    CHECK ((last_value IS NULL) = (last_tolerance IS NULL)),
    CHECK (last_error IS NULL OR last_value IS NOT NULL)
  );

  -- What was agreed, as each proposal or amendment puts it. Terms never change once written.
  CREATE TABLE trade_versions (
    id uuid PRIMARY KEY,
    desk_id uuid NOT NULL,
    trade_id uuid NOT NULL,
    number integer NOT NULL CHECK (number >= 1),
    state text NOT NULL CHECK (state IN ('proposed', 'approved', 'returned', 'superseded')),
    underlying_id uuid NOT NULL,
    direction text NOT NULL CHECK (direction IN ('buy', 'sell')),
    quantity numeric NOT NULL CHECK (quantity > 0),
    contract_size numeric NOT NULL CHECK (contract_size > 0),
    kind text NOT NULL CHECK (kind IN ('call', 'put')),
    exercise text NOT NULL CHECK (exercise IN ('european', 'american')),
    strike numeric NOT NULL CHECK (strike > 0),
    expiry_date date NOT NULL,
    expiry_at timestamptz(3) NOT NULL,
    premium_amount numeric NOT NULL CHECK (premium_amount >= 0),
    premium_currency text NOT NULL CHECK (premium_currency ~ '^[A-Z]{3}$'),
    premium_date date NOT NULL,
    counterparty text NOT NULL CHECK (counterparty <> ''),
    traded_at timestamptz(3) NOT NULL CHECK (traded_at < expiry_at),
    note text NOT NULL,
    quote_id uuid REFERENCES quotes,
    amendment_reason text CHECK (amendment_reason <> ''),
    proposed_by_id uuid NOT NULL REFERENCES users,
    proposed_at timestamptz(3) NOT NULL,
    decided_by_id uuid REFERENCES users,
    decided_at timestamptz(3),
    decision_reason text CHECK (decision_reason <> ''),
    UNIQUE (trade_id, number),
    UNIQUE (trade_id, id),
    FOREIGN KEY (desk_id, trade_id) REFERENCES trades (desk_id, id),
    FOREIGN KEY (desk_id, underlying_id) REFERENCES underlyings (desk_id, id),
    CHECK ((amendment_reason IS NULL) = (number = 1)),
    CHECK (decided_by_id <> proposed_by_id),
    CHECK ((decided_by_id IS NULL) = (decided_at IS NULL)),
    CHECK (decided_by_id IS NOT NULL OR state IN ('proposed', 'superseded')),
    CHECK (decided_by_id IS NULL OR state <> 'proposed'),
    CHECK (state <> 'returned' OR decision_reason IS NOT NULL)
  );

  ALTER TABLE trades
    ADD FOREIGN KEY (id, live_version_id) REFERENCES trade_versions (trade_id, id)
      DEFERRABLE INITIALLY DEFERRED,
    ADD FOREIGN KEY (id, latest_version_id) REFERENCES trade_versions (trade_id, id)
      DEFERRABLE INITIALLY DEFERRED`;

/**
 * The orders that stay as they are have an index; values change with every run, and sorting the
 * ten thousand narrow rows of a desk costs less than keeping three more indexes through each run.
 */
const indexes = `
  CREATE UNIQUE INDEX trade_versions_waiting ON trade_versions (trade_id)
    WHERE state = 'proposed';
  CREATE UNIQUE INDEX trade_versions_approved ON trade_versions (trade_id)
    WHERE state = 'approved';
  CREATE INDEX trades_book_id_ordinal ON trades (book_id, ordinal, id);
  CREATE INDEX trades_book_id_expiry_at ON trades (book_id, expiry_at, id);
  CREATE INDEX trades_desk_id_expiry_at ON trades (desk_id, expiry_at, id);
  CREATE INDEX trades_waiting ON trades (desk_id, ordinal) WHERE status IN ('proposed', 'amended')`;

const rights = `
  GRANT SELECT, INSERT ON books, trades, trade_versions TO app;
  GRANT UPDATE (last_trade_number) ON desks TO app;
  GRANT UPDATE (name, archived_at) ON books TO app;
  GRANT UPDATE (status, live_version_id, latest_version_id, version, expiry_at, end_outcome,
    end_date, end_amount, end_currency, last_run_id, last_snapshot_date, last_value, last_error,
    last_verdict, last_refuted, last_total, last_strip, last_tolerance, previous_value)
    ON trades TO app;
  GRANT UPDATE (state, decided_by_id, decided_at, decision_reason) ON trade_versions TO app`;
