import type { Migration } from './migration';

/** What a desk quotes on, and its official closes. An approved close is never changed. */
export const market: Migration = {
  name: '0003-market',
  async up({ client }) {
    await client.query(`
      CREATE TABLE underlyings (
        id uuid PRIMARY KEY,
        desk_id uuid NOT NULL REFERENCES desks,
        symbol text NOT NULL CHECK (symbol <> ''),
        name text NOT NULL CHECK (name <> ''),
        kind text NOT NULL CHECK (kind IN ('share', 'index', 'currency-pair', 'future')),
        currency text NOT NULL CHECK (currency ~ '^[A-Z]{3}$'),
        unit text NOT NULL CHECK (unit <> ''),
        contract_size numeric NOT NULL CHECK (contract_size > 0),
        price_decimals integer NOT NULL CHECK (price_decimals BETWEEN 0 AND 10),
        tolerance double precision NOT NULL CHECK (tolerance > 0),
        archived_at timestamptz(3),
        UNIQUE (desk_id, symbol),
        UNIQUE (desk_id, id)
      );

      CREATE TABLE market_snapshots (
        id uuid PRIMARY KEY,
        desk_id uuid NOT NULL REFERENCES desks,
        date date NOT NULL,
        status text NOT NULL CHECK (status IN ('draft', 'approved', 'superseded')),
        entered_by_id uuid NOT NULL REFERENCES users,
        entered_at timestamptz(3) NOT NULL,
        approved_by_id uuid REFERENCES users,
        approved_at timestamptz(3),
        UNIQUE (desk_id, id),
        CHECK (approved_by_id <> entered_by_id),
        CHECK ((approved_by_id IS NULL) = (approved_at IS NULL)),
        CHECK ((approved_at IS NULL) = (status = 'draft'))
      );
      CREATE UNIQUE INDEX market_snapshots_approved ON market_snapshots (desk_id, date)
        WHERE status = 'approved';

      CREATE TABLE market_quotes (
        snapshot_id uuid NOT NULL,
        underlying_id uuid NOT NULL,
        desk_id uuid NOT NULL,
        spot double precision NOT NULL CHECK (spot > 0 AND spot < 'Infinity'),
        rate double precision NOT NULL CHECK (abs(rate) < 'Infinity'),
        yield double precision CHECK (abs(yield) < 'Infinity'),
        volatility double precision NOT NULL CHECK (volatility > 0 AND volatility < 'Infinity'),
        PRIMARY KEY (snapshot_id, underlying_id),
        FOREIGN KEY (desk_id, snapshot_id) REFERENCES market_snapshots (desk_id, id),
        FOREIGN KEY (desk_id, underlying_id) REFERENCES underlyings (desk_id, id)
      );

      GRANT SELECT, INSERT ON underlyings, market_snapshots, market_quotes TO app;
      GRANT UPDATE (symbol, name, unit, contract_size, price_decimals, tolerance, archived_at)
        ON underlyings TO app;
      GRANT UPDATE (status, approved_by_id, approved_at) ON market_snapshots TO app`);
  },
};
