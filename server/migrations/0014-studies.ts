import type { Migration } from './migration';

/** Convergence studies and their rows, one transaction a row. */
export const studies: Migration = {
  name: '0014-studies',
  async up({ client }) {
    await client.query(`
      CREATE TABLE studies (
        id uuid PRIMARY KEY,
        desk_id uuid NOT NULL REFERENCES desks,
        ordinal integer NOT NULL CHECK (ordinal >= 1),
        number text NOT NULL GENERATED ALWAYS AS
          ('S-' || lpad(ordinal::text, greatest(4, length(ordinal::text)), '0')) STORED,
        source text NOT NULL CHECK (source IN ('trade', 'quote', 'free')),
        quote_id uuid REFERENCES quotes,
        trade_id uuid REFERENCES trades,
        trade_version_id uuid REFERENCES trade_versions,
        underlying_id uuid NOT NULL,
        terms jsonb NOT NULL CHECK (jsonb_typeof(terms) = 'object'),
        request jsonb NOT NULL CHECK (jsonb_typeof(request) = 'object'),
        reference jsonb NOT NULL CHECK (jsonb_typeof(reference) = 'object'),
        ladders jsonb NOT NULL CHECK (jsonb_typeof(ladders) = 'array'),
        orders jsonb CHECK (jsonb_typeof(orders) = 'array'),
        engine text NOT NULL CHECK (engine <> ''),
        status text NOT NULL CHECK (status IN
          ('queued', 'running', 'finished', 'cancelled', 'signed-off', 'sent-back')),
        total integer NOT NULL CHECK (total > 0),
        done integer NOT NULL CHECK (done >= 0 AND done <= total),
        version integer NOT NULL CHECK (version >= 0),
        started_by_id uuid NOT NULL REFERENCES users,
        created_at timestamptz(3) NOT NULL,
        finished_at timestamptz(3),
        decided_by_id uuid REFERENCES users,
        decided_at timestamptz(3),
        decision_comment text CHECK (decision_comment <> ''),
        UNIQUE (desk_id, ordinal),
        FOREIGN KEY (desk_id, underlying_id) REFERENCES underlyings (desk_id, id),
        CHECK ((source = 'quote') = (quote_id IS NOT NULL)),
        CHECK ((source = 'trade') = (trade_id IS NOT NULL)),
        CHECK ((trade_id IS NULL) = (trade_version_id IS NULL)),
        CHECK ((orders IS NOT NULL) = (status IN ('finished', 'signed-off', 'sent-back'))),
        CHECK ((decided_by_id IS NOT NULL) = (status IN ('signed-off', 'sent-back'))),
        CHECK ((decided_by_id IS NULL) = (decided_at IS NULL)),
        CHECK ((decided_by_id IS NULL) = (decision_comment IS NULL)),
        CHECK (decided_by_id <> started_by_id)
      );
      CREATE INDEX studies_desk_id ON studies (desk_id, created_at DESC, id DESC);
      CREATE INDEX studies_quote_id ON studies (quote_id) WHERE quote_id IS NOT NULL;
      CREATE INDEX studies_trade_id ON studies (trade_id) WHERE trade_id IS NOT NULL;

      CREATE TABLE study_rows (
        study_id uuid NOT NULL REFERENCES studies,
        route text NOT NULL CHECK (route <> ''),
        ordinal integer NOT NULL CHECK (ordinal >= 0),
        result jsonb NOT NULL CHECK (jsonb_typeof(result) = 'object'),
        milliseconds double precision NOT NULL
          CHECK (milliseconds >= 0 AND milliseconds < 'Infinity'),
        PRIMARY KEY (study_id, route, ordinal)
      );

      GRANT SELECT, INSERT ON studies TO app;
      GRANT UPDATE (status, done, orders, version, finished_at,
        decided_by_id, decided_at, decision_comment) ON studies TO app;
      GRANT SELECT, INSERT ON study_rows TO app`);
  },
};
