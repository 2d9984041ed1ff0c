import type { Migration } from './migration';

/** Quotes as the server priced them, with all that is needed to price them again. Append-only. */
export const quotes: Migration = {
  name: '0004-quotes',
  async up({ client }) {
    await client.query(`
      CREATE TABLE quotes (
        id uuid PRIMARY KEY,
        desk_id uuid NOT NULL REFERENCES desks,
        number text NOT NULL CHECK (number ~ '^Q-[0-9]{4,}$'),
        underlying_id uuid NOT NULL,
        direction text NOT NULL CHECK (direction IN ('buy', 'sell')),
        quantity numeric NOT NULL CHECK (quantity > 0),
        contract_size numeric NOT NULL CHECK (contract_size > 0),
        kind text NOT NULL CHECK (kind IN ('call', 'put')),
        exercise text NOT NULL CHECK (exercise IN ('european', 'american')),
        strike numeric NOT NULL CHECK (strike > 0),
        expiry_date date NOT NULL,
        expiry_at timestamptz(3) NOT NULL,
        expiry_years double precision NOT NULL CHECK (expiry_years > 0),
        spot double precision NOT NULL CHECK (spot > 0 AND spot < 'Infinity'),
        rate double precision NOT NULL CHECK (abs(rate) < 'Infinity'),
        yield double precision CHECK (abs(yield) < 'Infinity'),
        volatility double precision NOT NULL CHECK (volatility > 0 AND volatility < 'Infinity'),
        snapshot_id uuid,
        priced_at timestamptz(3) NOT NULL CHECK (priced_at < expiry_at),
        value double precision NOT NULL CHECK (abs(value) < 'Infinity'),
        error_estimate double precision CHECK (error_estimate >= 0),
        total numeric NOT NULL,
        tolerance double precision NOT NULL CHECK (tolerance > 0),
        verdict text NOT NULL CHECK (verdict IN ('agree', 'wide', 'disagree', 'one-route')),
        refuted boolean NOT NULL,
        primary_route text NOT NULL CHECK (primary_route <> ''),
        routes jsonb NOT NULL CHECK (jsonb_typeof(routes) = 'array'),
        engine text NOT NULL CHECK (engine <> ''),
        indicative_value double precision NOT NULL CHECK (abs(indicative_value) < 'Infinity'),
        note text NOT NULL,
        created_by_id uuid NOT NULL REFERENCES users,
        created_at timestamptz(3) NOT NULL,
        UNIQUE (desk_id, number),
        FOREIGN KEY (desk_id, underlying_id) REFERENCES underlyings (desk_id, id),
        FOREIGN KEY (desk_id, snapshot_id) REFERENCES market_snapshots (desk_id, id)
      );
      CREATE INDEX quotes_desk_id_created_at ON quotes (desk_id, created_at DESC, id DESC);

      GRANT SELECT, INSERT ON quotes TO app`);
  },
};
