import type { Migration } from './migration';

/**
 * Closes as they are made, approved and restated, and the policies that say how a desk prices.
 * A draft is changed freely; what has been approved is not, by the service or by anyone else: the
 * triggers let it be superseded once and refuse the rest.
 */
export const marketData: Migration = {
  name: '0012-market-data',
  async up({ client }) {
    await client.query(snapshots);
    await client.query(policies);
  },
};

const snapshots = `
  ALTER TABLE market_snapshots
    ADD COLUMN version integer NOT NULL DEFAULT 0 CHECK (version >= 0),
    ADD COLUMN source text NOT NULL DEFAULT 'typed'
      CHECK (source IN ('typed', 'file', 'restatement')),
    ADD COLUMN saved_by_ids uuid[] NOT NULL DEFAULT '{}',
    ADD COLUMN saved_at timestamptz(3),
    ADD COLUMN reason text CHECK (reason <> ''),
    ADD COLUMN restates_id uuid,
    ADD COLUMN superseded_by_id uuid,
    ADD FOREIGN KEY (desk_id, restates_id) REFERENCES market_snapshots (desk_id, id),
    ADD FOREIGN KEY (desk_id, superseded_by_id) REFERENCES market_snapshots (desk_id, id)
      DEFERRABLE INITIALLY DEFERRED,
    ADD CHECK ((source = 'restatement') = (restates_id IS NOT NULL)),
    ADD CHECK ((source = 'restatement') = (reason IS NOT NULL)),
    ADD CHECK ((superseded_by_id IS NOT NULL) = (status = 'superseded')),
    ADD CHECK (superseded_by_id <> id),
    ADD CHECK (approved_by_id <> ALL (saved_by_ids));
  CREATE UNIQUE INDEX market_snapshots_draft ON market_snapshots (desk_id, date)
    WHERE status = 'draft';
  CREATE INDEX market_snapshots_listed ON market_snapshots (desk_id, date, entered_at, id);

  CREATE FUNCTION guard_approved() RETURNS trigger LANGUAGE plpgsql AS $$
  BEGIN
    IF TG_OP = 'INSERT' THEN
      IF NEW.status = 'draft' THEN RETURN NEW; END IF;
    ELSIF TG_OP = 'UPDATE' THEN
      IF OLD.status = 'draft' AND NEW.status IN ('draft', 'approved') THEN RETURN NEW; END IF;
      IF OLD.status = 'approved' AND NEW.status = 'superseded' AND
        (to_jsonb(NEW) - ARRAY['status', 'superseded_by_id', 'version'])
          = (to_jsonb(OLD) - ARRAY['status', 'superseded_by_id', 'version'])
      THEN RETURN NEW; END IF;
    END IF;
    RAISE EXCEPTION '% of a row of % is refused: a draft is made, approved, and then only superseded',
      TG_OP, TG_TABLE_NAME USING ERRCODE = 'integrity_constraint_violation';
  END $$;
  CREATE FUNCTION guard_truncate() RETURNS trigger LANGUAGE plpgsql AS $$
  BEGIN
    RAISE EXCEPTION 'TRUNCATE of % is refused: what was approved stays', TG_TABLE_NAME
      USING ERRCODE = 'integrity_constraint_violation';
  END $$;
  CREATE TRIGGER guard_row BEFORE INSERT OR UPDATE OR DELETE ON market_snapshots
    FOR EACH ROW EXECUTE FUNCTION guard_approved();
  CREATE TRIGGER guard_truncate BEFORE TRUNCATE ON market_snapshots
    FOR EACH STATEMENT EXECUTE FUNCTION guard_truncate();
  ALTER TABLE market_snapshots ENABLE ALWAYS TRIGGER guard_row;
  ALTER TABLE market_snapshots ENABLE ALWAYS TRIGGER guard_truncate;

  -- The snapshot is locked, so that it cannot be approved between the look and the write.
  CREATE FUNCTION guard_market_quote() RETURNS trigger LANGUAGE plpgsql AS $$
  DECLARE
    snapshot uuid := CASE TG_OP WHEN 'INSERT' THEN NEW.snapshot_id ELSE OLD.snapshot_id END;
    found_status text;
  BEGIN
    SELECT status INTO found_status FROM market_snapshots WHERE id = snapshot FOR SHARE;
    IF TG_OP <> 'UPDATE' AND found_status = 'draft' THEN
      RETURN CASE TG_OP WHEN 'INSERT' THEN NEW ELSE OLD END;
    END IF;
    RAISE EXCEPTION '% of a quote is refused: its snapshot is no draft, or quotes are replaced whole',
      TG_OP USING ERRCODE = 'integrity_constraint_violation';
  END $$;
  CREATE TRIGGER guard_row BEFORE INSERT OR UPDATE OR DELETE ON market_quotes
    FOR EACH ROW EXECUTE FUNCTION guard_market_quote();
  CREATE TRIGGER guard_truncate BEFORE TRUNCATE ON market_quotes
    FOR EACH STATEMENT EXECUTE FUNCTION guard_truncate();
  ALTER TABLE market_quotes ENABLE ALWAYS TRIGGER guard_row;
  ALTER TABLE market_quotes ENABLE ALWAYS TRIGGER guard_truncate;

  GRANT UPDATE (date, version, source, saved_by_ids, saved_at, superseded_by_id)
    ON market_snapshots TO app;
  GRANT DELETE ON market_quotes TO app`;

const method = (column: string) =>
  `${column} text NOT NULL CHECK (${column} IN
      ('closed-form', 'heat-crank-nicolson', 'lattice-crr', 'lattice-symmetric'))`;

const policies = `
  CREATE TABLE pricing_policies (
    id uuid PRIMARY KEY,
    desk_id uuid NOT NULL REFERENCES desks,
    number integer NOT NULL CHECK (number >= 1),
    status text NOT NULL CHECK (status IN ('draft', 'approved', 'superseded')),
    version integer NOT NULL CHECK (version >= 0),
    ${method('primary_european')},
    ${method('check_european')},
    ${method('primary_american')},
    ${method('check_american')},
    sizes jsonb CHECK (jsonb_typeof(sizes) = 'object'),
    tolerance_share double precision CHECK (tolerance_share > 0 AND tolerance_share <= 1),
    unit_tolerance jsonb NOT NULL CHECK (jsonb_typeof(unit_tolerance) = 'object'),
    money_tolerance jsonb NOT NULL CHECK (jsonb_typeof(money_tolerance) = 'object'),
    reason text NOT NULL CHECK (reason <> ''),
    author_id uuid NOT NULL REFERENCES users,
    authored_at timestamptz(3) NOT NULL,
    saved_by_ids uuid[] NOT NULL,
    saved_at timestamptz(3),
    approved_by_id uuid REFERENCES users,
    approved_at timestamptz(3),
    superseded_by_id uuid,
    UNIQUE (desk_id, id),
    UNIQUE (desk_id, number),
    FOREIGN KEY (desk_id, superseded_by_id) REFERENCES pricing_policies (desk_id, id)
      DEFERRABLE INITIALLY DEFERRED,
    CHECK (primary_european <> check_european),
    CHECK (primary_american <> check_american),
    CHECK (primary_american <> 'closed-form' AND check_american <> 'closed-form'),
    CHECK ((sizes IS NULL) <> (tolerance_share IS NULL)),
    CHECK (approved_by_id <> author_id AND approved_by_id <> ALL (saved_by_ids)),
    CHECK ((approved_by_id IS NULL) = (approved_at IS NULL)),
    CHECK ((approved_at IS NULL) = (status = 'draft')),
    CHECK ((superseded_by_id IS NOT NULL) = (status = 'superseded')),
    CHECK (superseded_by_id <> id)
  );
  CREATE UNIQUE INDEX pricing_policies_draft ON pricing_policies (desk_id)
    WHERE status = 'draft';
  CREATE UNIQUE INDEX pricing_policies_approved ON pricing_policies (desk_id)
    WHERE status = 'approved';

  CREATE TRIGGER guard_row BEFORE INSERT OR UPDATE OR DELETE ON pricing_policies
    FOR EACH ROW EXECUTE FUNCTION guard_approved();
  CREATE TRIGGER guard_truncate BEFORE TRUNCATE ON pricing_policies
    FOR EACH STATEMENT EXECUTE FUNCTION guard_truncate();
  ALTER TABLE pricing_policies ENABLE ALWAYS TRIGGER guard_row;
  ALTER TABLE pricing_policies ENABLE ALWAYS TRIGGER guard_truncate;

  GRANT SELECT, INSERT ON pricing_policies TO app;
  GRANT UPDATE (status, version, primary_european, check_european, primary_american,
    check_american, sizes, tolerance_share, unit_tolerance, money_tolerance, reason, saved_by_ids,
    saved_at, approved_by_id, approved_at, superseded_by_id) ON pricing_policies TO app`;
