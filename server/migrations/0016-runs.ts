import type { Migration } from './migration';

/**
 * Valuation runs, the chunks that they are worked off in, and the exceptions that they find. The
 * values themselves are in the chain and nowhere else. A book is in one active run at most: whether
 * a run is active is part of the key that its books refer to, and so follows it by itself.
 */
export const runs: Migration = {
  name: '0016-runs',
  async up({ client }) {
    await client.query(tables);
    await client.query(guards);
    await client.query(rights);
  },
};

const count = (column: string) => `${column} integer NOT NULL DEFAULT 0 CHECK (${column} >= 0)`;

const tables = `
  ALTER TABLE desks ADD COLUMN ${count('last_run_number')};

  CREATE TABLE valuation_runs (
    id uuid PRIMARY KEY,
    desk_id uuid NOT NULL REFERENCES desks,
    ordinal integer NOT NULL CHECK (ordinal >= 1),
    number text NOT NULL GENERATED ALWAYS AS
      ('R-' || lpad(ordinal::text, greatest(4, length(ordinal::text)), '0')) STORED,
    snapshot_id uuid NOT NULL,
    snapshot_date date NOT NULL,
    policy_id uuid NOT NULL,
    valued_at timestamptz(3) NOT NULL,
    engine text NOT NULL CHECK (engine <> ''),
    status text NOT NULL
      CHECK (status IN ('queued', 'running', 'finished', 'cancelled', 'signed-off')),
    is_active boolean NOT NULL GENERATED ALWAYS AS (status IN ('queued', 'running')) STORED,
    version integer NOT NULL CHECK (version >= 0),
    rerun_of_id uuid CHECK (rerun_of_id <> id),
    total integer NOT NULL CHECK (total >= 1),
    ${count('done')},
    ${count('left_out')},
    ${count('agree')},
    ${count('wide')},
    ${count('disagree')},
    ${count('one_route')},
    ${count('failed')},
    ${count('refuted')},
    totals jsonb CHECK (jsonb_typeof(totals) = 'object'),
    started_by_id uuid NOT NULL REFERENCES users,
    started_at timestamptz(3) NOT NULL,
    finished_at timestamptz(3),
    cancelled_by_id uuid REFERENCES users,
    cancelled_at timestamptz(3),
    signed_off_by_id uuid REFERENCES users,
    signed_off_at timestamptz(3),
    sign_off_comment text CHECK (sign_off_comment <> ''),
    UNIQUE (desk_id, ordinal),
    UNIQUE (desk_id, id),
    UNIQUE (id, is_active),
    FOREIGN KEY (desk_id, snapshot_id) REFERENCES market_snapshots (desk_id, id),
    FOREIGN KEY (desk_id, policy_id) REFERENCES pricing_policies (desk_id, id),
    FOREIGN KEY (desk_id, rerun_of_id) REFERENCES valuation_runs (desk_id, id),
    CHECK (done <= total AND refuted <= done),
    CHECK (agree + wide + disagree + one_route + failed = done),
    CHECK (status <> 'queued' OR done = 0),
    CHECK ((done = total) = (status IN ('finished', 'signed-off'))),
    CHECK ((finished_at IS NOT NULL) = (status IN ('finished', 'signed-off'))),
    CHECK ((totals IS NOT NULL) = (status IN ('finished', 'signed-off'))),
    CHECK ((cancelled_at IS NOT NULL) = (status = 'cancelled')),
    CHECK ((cancelled_by_id IS NULL) = (cancelled_at IS NULL)),
    CHECK ((signed_off_at IS NOT NULL) = (status = 'signed-off')),
    CHECK ((signed_off_by_id IS NULL) = (signed_off_at IS NULL)),
    CHECK ((sign_off_comment IS NULL) = (signed_off_at IS NULL)),
    CHECK (signed_off_by_id <> started_by_id)
  );
  CREATE INDEX valuation_runs_desk_id ON valuation_runs (desk_id, started_at DESC, id DESC);
  CREATE INDEX valuation_runs_rerun_of_id ON valuation_runs (rerun_of_id)
    WHERE rerun_of_id IS NOT NULL;

  CREATE TABLE run_books (
    run_id uuid NOT NULL,
    book_id uuid NOT NULL,
    desk_id uuid NOT NULL,
    is_active boolean NOT NULL,
    trades integer NOT NULL CHECK (trades >= 0),
    PRIMARY KEY (run_id, book_id),
    FOREIGN KEY (desk_id, run_id) REFERENCES valuation_runs (desk_id, id),
    FOREIGN KEY (desk_id, book_id) REFERENCES books (desk_id, id),
    FOREIGN KEY (run_id, is_active) REFERENCES valuation_runs (id, is_active) ON UPDATE CASCADE
  );
  CREATE UNIQUE INDEX run_books_active ON run_books (book_id) WHERE is_active;
  CREATE INDEX run_books_book_id ON run_books (book_id, run_id);

  CREATE TABLE run_chunks (
    run_id uuid NOT NULL REFERENCES valuation_runs,
    number integer NOT NULL CHECK (number >= 1),
    trade_version_ids uuid[] NOT NULL CHECK (cardinality(trade_version_ids) >= 1),
    done_at timestamptz(3),
    PRIMARY KEY (run_id, number)
  );

  CREATE TABLE run_exceptions (
    id uuid PRIMARY KEY,
    desk_id uuid NOT NULL,
    run_id uuid NOT NULL,
    trade_id uuid NOT NULL,
    trade_version_id uuid NOT NULL,
    kind text NOT NULL CHECK (kind IN ('failure', 'disagree', 'refuted', 'unchecked', 'wide')),
    -- The gravest first, and then the largest; one whose size nobody knows stands on top.
    gravity integer NOT NULL GENERATED ALWAYS AS (CASE kind WHEN 'failure' THEN 1
      WHEN 'disagree' THEN 2 WHEN 'refuted' THEN 3 WHEN 'unchecked' THEN 4 ELSE 5 END) STORED,
    materiality numeric CHECK (materiality >= 0),
    descent numeric NOT NULL GENERATED ALWAYS AS (-coalesce(materiality, 'Infinity')) STORED,
    state text NOT NULL CHECK (state IN ('open', 'answered')),
    answer_kind text CHECK (answer_kind IN ('study', 'override', 'rerun')),
    study_id uuid REFERENCES studies,
    override_value numeric,
    rerun_id uuid,
    reason text CHECK (reason <> ''),
    answered_by_id uuid REFERENCES users,
    answered_at timestamptz(3),
    UNIQUE (run_id, trade_id),
    FOREIGN KEY (desk_id, run_id) REFERENCES valuation_runs (desk_id, id),
    FOREIGN KEY (desk_id, rerun_id) REFERENCES valuation_runs (desk_id, id),
    FOREIGN KEY (desk_id, trade_id) REFERENCES trades (desk_id, id),
    FOREIGN KEY (trade_id, trade_version_id) REFERENCES trade_versions (trade_id, id),
    CHECK ((state = 'answered') = (answer_kind IS NOT NULL)),
    CHECK ((state = 'answered') = (answered_by_id IS NOT NULL)),
    CHECK ((state = 'answered') = (answered_at IS NOT NULL)),
    CHECK ((study_id IS NOT NULL) = coalesce(answer_kind = 'study', false)),
    CHECK ((rerun_id IS NOT NULL) = coalesce(answer_kind = 'rerun', false)),
    CHECK (override_value IS NULL OR answer_kind = 'override'),
    CHECK ((reason IS NOT NULL) = coalesce(answer_kind IN ('study', 'override'), false))
  );
  CREATE INDEX run_exceptions_order ON run_exceptions (run_id, state DESC, gravity, descent, id);
  CREATE INDEX run_exceptions_trade_id ON run_exceptions (trade_id);
  CREATE INDEX run_exceptions_study_id ON run_exceptions (study_id) WHERE study_id IS NOT NULL`;

/** What is settled stays: for the service as for everyone else. */
const guards = `
  CREATE FUNCTION guard_settled() RETURNS trigger LANGUAGE plpgsql AS $$
  BEGIN
    IF TG_OP = 'UPDATE' THEN
      IF TG_TABLE_NAME = 'valuation_runs' AND
        to_jsonb(OLD) ->> 'status' NOT IN ('cancelled', 'signed-off') THEN RETURN NEW; END IF;
      IF TG_TABLE_NAME = 'run_exceptions' AND
        to_jsonb(OLD) ->> 'state' = 'open' THEN RETURN NEW; END IF;
      IF TG_TABLE_NAME = 'run_chunks' AND
        to_jsonb(OLD) ->> 'done_at' IS NULL THEN RETURN NEW; END IF;
    END IF;
    RAISE EXCEPTION '% of a row of % is refused: it is settled', TG_OP, TG_TABLE_NAME
      USING ERRCODE = 'integrity_constraint_violation';
  END $$;
  ${['valuation_runs', 'run_chunks', 'run_exceptions']
    .map(
      (table) => `
  CREATE TRIGGER guard_row BEFORE UPDATE OR DELETE ON ${table}
    FOR EACH ROW EXECUTE FUNCTION guard_settled();
  ALTER TABLE ${table} ENABLE ALWAYS TRIGGER guard_row;`,
    )
    .join('')}
  REVOKE ALL ON FUNCTION guard_settled FROM PUBLIC`;

const rights = `
  GRANT UPDATE (last_run_number) ON desks TO app;
  GRANT SELECT, INSERT ON valuation_runs, run_books, run_chunks, run_exceptions TO app;
  GRANT UPDATE (status, version, done, agree, wide, disagree, one_route, failed, refuted, totals,
    finished_at, cancelled_by_id, cancelled_at, signed_off_by_id, signed_off_at, sign_off_comment)
    ON valuation_runs TO app;
  GRANT UPDATE (done_at) ON run_chunks TO app;
  GRANT UPDATE (state, answer_kind, study_id, override_value, rerun_id, reason, answered_by_id,
    answered_at) ON run_exceptions TO app`;
