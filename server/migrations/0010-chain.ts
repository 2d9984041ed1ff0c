import type { Migration } from './migration';

/**
 * The chain: valuations and records of a desk, each entry sealed to the one before it.
 *
 * `app` reads the tables and calls `append`; it can neither write a row itself nor change one. The
 * triggers refuse changes to everyone besides, the owner included, and fire whatever the session's
 * replication role. The columns that are searched are generated from the body that is hashed, so
 * that they cannot say anything else.
 *
 * An entry's hash is SHA-256 over 32 bytes of the previous hash (zeros before the first entry) and
 * then, each as a big-endian 32-bit count of bytes followed by those bytes in UTF-8: the chain's
 * name, the position in decimal digits, the time, the body. `server/chain/hash.ts` makes the same.
 */
export const chain: Migration = {
  name: '0010-chain',
  async up({ client }) {
    await client.query(tables);
    await client.query(guards);
    await client.query(functions);
    await client.query(verifications);
  },
};

const tables = `
  -- Heads are made with their desk, so that an append never waits for another one's desk.
  CREATE TABLE chain_heads (
    chain text PRIMARY KEY CHECK (chain ~ '^(valuations|records)/[0-9a-f-]{36}$'),
    desk_id uuid NOT NULL GENERATED ALWAYS AS (split_part(chain, '/', 2)::uuid) STORED
      REFERENCES desks,
    position bigint NOT NULL CHECK (position >= 0),
    at text COLLATE "C" NOT NULL,
    hash text NOT NULL CHECK (hash ~ '^[0-9a-f]{64}$')
  );
  CREATE INDEX chain_heads_desk_id ON chain_heads (desk_id);

  CREATE TABLE chain_entries (
    chain text NOT NULL REFERENCES chain_heads,
    position bigint NOT NULL CHECK (position >= 1),
    at text COLLATE "C" NOT NULL,
    previous text NOT NULL CHECK (previous ~ '^[0-9a-f]{64}$'),
    hash text NOT NULL CHECK (hash ~ '^[0-9a-f]{64}$'),
    body text NOT NULL CHECK (octet_length(body) <= 262144),
    kind text NOT NULL GENERATED ALWAYS AS (body::jsonb ->> 'kind') STORED,
    subject_id uuid GENERATED ALWAYS AS ((body::jsonb #>> '{subject,id}')::uuid) STORED,
    run_id uuid GENERATED ALWAYS AS ((body::jsonb ->> 'runId')::uuid) STORED,
    run_number text GENERATED ALWAYS AS (body::jsonb ->> 'runNumber') STORED,
    trade_number text GENERATED ALWAYS AS (body::jsonb ->> 'tradeNumber') STORED,
    trade_version_id uuid GENERATED ALWAYS AS ((body::jsonb ->> 'tradeVersionId')::uuid) STORED,
    book_id uuid GENERATED ALWAYS AS ((body::jsonb ->> 'bookId')::uuid) STORED,
    underlying_id uuid GENERATED ALWAYS AS ((body::jsonb ->> 'underlyingId')::uuid) STORED,
    route text GENERATED ALWAYS AS (body::jsonb ->> 'route') STORED,
    role text GENERATED ALWAYS AS (body::jsonb ->> 'role') STORED,
    verdict text GENERATED ALWAYS AS (body::jsonb ->> 'verdict') STORED,
    valued_at text COLLATE "C" GENERATED ALWAYS AS (body::jsonb ->> 'valuedAt') STORED,
    PRIMARY KEY (chain, position),
    CHECK ((kind = 'valuation') = (chain LIKE 'valuations/%')),
    CHECK (kind <> 'valuation' OR (
      run_id IS NOT NULL AND run_number IS NOT NULL AND trade_number IS NOT NULL
      AND trade_version_id IS NOT NULL AND book_id IS NOT NULL AND underlying_id IS NOT NULL
      AND route IS NOT NULL
      AND role IN ('primary', 'check')
      AND valued_at ~ '^[0-9]{4}-[0-9]{2}-[0-9]{2}T[0-9]{2}:[0-9]{2}:[0-9]{2}[.][0-9]{3}Z$')),
    CHECK (kind = 'valuation' OR subject_id IS NOT NULL)
  );
  CREATE UNIQUE INDEX chain_entries_valuation ON chain_entries (run_id, trade_version_id, route)
    WHERE kind = 'valuation';
  CREATE INDEX chain_entries_subject ON chain_entries (chain, subject_id, position)
    WHERE kind <> 'valuation';
  CREATE INDEX chain_entries_valued ON chain_entries (chain, valued_at, position)
    WHERE role = 'primary';
  CREATE INDEX chain_entries_trade ON chain_entries (chain, trade_number, valued_at, position)
    WHERE role = 'primary';
  CREATE INDEX chain_entries_run ON chain_entries (chain, run_number, valued_at, position)
    WHERE role = 'primary';
  CREATE INDEX chain_entries_book ON chain_entries (chain, book_id, valued_at, position)
    WHERE role = 'primary';
  CREATE INDEX chain_entries_underlying ON chain_entries (chain, underlying_id, valued_at, position)
    WHERE role = 'primary';
  CREATE INDEX chain_entries_verdict ON chain_entries (chain, verdict, valued_at, position)
    WHERE role = 'primary';

  -- A head as it was signed. Kept apart from the entries, so that it stays when they are cut off.
  CREATE TABLE chain_anchors (
    id uuid PRIMARY KEY,
    chain text NOT NULL REFERENCES chain_heads,
    position bigint NOT NULL CHECK (position >= 1),
    hash text NOT NULL CHECK (hash ~ '^[0-9a-f]{64}$'),
    signed_at timestamptz(3) NOT NULL,
    purpose text NOT NULL CHECK (purpose IN ('sign-off', 'export')),
    key_id text NOT NULL CHECK (key_id ~ '^[0-9a-f]{16}$'),
    signature text NOT NULL CHECK (signature ~ '^[0-9a-f]{128}$')
  );
  CREATE INDEX chain_anchors_chain ON chain_anchors (chain, position, id);

  GRANT SELECT ON chain_heads, chain_entries, chain_anchors TO app;
  -- A signature cannot be invented, so an anchor needs no function of its own.
  GRANT INSERT ON chain_anchors TO app`;

const guards = `
  CREATE FUNCTION refuse_change() RETURNS trigger LANGUAGE plpgsql AS $$
  BEGIN
    RAISE EXCEPTION '% of % is refused: the chain only grows', TG_OP, TG_TABLE_NAME
      USING ERRCODE = 'integrity_constraint_violation';
  END $$;

  CREATE FUNCTION refuse_step_back() RETURNS trigger LANGUAGE plpgsql AS $$
  BEGIN
    IF NEW.chain <> OLD.chain OR NEW.position <= OLD.position OR NEW.at < OLD.at THEN
      RAISE EXCEPTION 'the head of a chain only goes forward'
        USING ERRCODE = 'integrity_constraint_violation';
    END IF;
    RETURN NEW;
  END $$;

  CREATE TRIGGER refuse_row BEFORE UPDATE OR DELETE ON chain_entries
    FOR EACH ROW EXECUTE FUNCTION refuse_change();
  CREATE TRIGGER refuse_truncate BEFORE TRUNCATE ON chain_entries
    FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();
  ALTER TABLE chain_entries ENABLE ALWAYS TRIGGER refuse_row;
  ALTER TABLE chain_entries ENABLE ALWAYS TRIGGER refuse_truncate;

  CREATE TRIGGER refuse_row BEFORE UPDATE OR DELETE ON chain_anchors
    FOR EACH ROW EXECUTE FUNCTION refuse_change();
  CREATE TRIGGER refuse_truncate BEFORE TRUNCATE ON chain_anchors
    FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();
  ALTER TABLE chain_anchors ENABLE ALWAYS TRIGGER refuse_row;
  ALTER TABLE chain_anchors ENABLE ALWAYS TRIGGER refuse_truncate;

  CREATE TRIGGER refuse_step_back BEFORE UPDATE ON chain_heads
    FOR EACH ROW EXECUTE FUNCTION refuse_step_back();
  CREATE TRIGGER refuse_row BEFORE DELETE ON chain_heads
    FOR EACH ROW EXECUTE FUNCTION refuse_change();
  CREATE TRIGGER refuse_truncate BEFORE TRUNCATE ON chain_heads
    FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();
  ALTER TABLE chain_heads ENABLE ALWAYS TRIGGER refuse_step_back;
  ALTER TABLE chain_heads ENABLE ALWAYS TRIGGER refuse_row;
  ALTER TABLE chain_heads ENABLE ALWAYS TRIGGER refuse_truncate`;

const functions = `
  CREATE FUNCTION chain_hash(previous text, chain text, pos bigint, at text, body text)
  RETURNS text LANGUAGE sql IMMUTABLE STRICT PARALLEL SAFE
  SET search_path = pg_catalog, pg_temp AS $$
    SELECT encode(sha256(
      decode(previous, 'hex') || string_agg(
        int4send(octet_length(convert_to(field, 'UTF8'))) || convert_to(field, 'UTF8'),
        ''::bytea ORDER BY place)), 'hex')
    FROM unnest(ARRAY[chain, pos::text, at, body]) WITH ORDINALITY AS fields (field, place)
  $$;

  -- Locks the head until the transaction ends; gives its position.
  CREATE FUNCTION lock_chain(chain_name text) RETURNS bigint
  LANGUAGE plpgsql SECURITY DEFINER SET search_path = pg_catalog, public, pg_temp AS $$
  DECLARE
    head_position bigint;
  BEGIN
    SELECT position INTO STRICT head_position FROM chain_heads
      WHERE chain = chain_name FOR UPDATE;
    RETURN head_position;
  END $$;

  CREATE FUNCTION append(chain_name text, bodies text[])
  RETURNS TABLE (entry_position bigint, entry_at text, entry_hash text)
  LANGUAGE plpgsql SECURITY DEFINER SET search_path = pg_catalog, public, pg_temp AS $$
  DECLARE
    first_position bigint;
    head chain_heads;
    moment text;
    hashes text[] := ARRAY[]::text[];
    sealed text;
    each_body text;
  BEGIN
    IF coalesce(array_ndims(bodies), 1) <> 1 OR cardinality(bodies) NOT BETWEEN 1 AND 1000 THEN
      RAISE EXCEPTION 'append takes 1 to 1000 bodies'
        USING ERRCODE = 'invalid_parameter_value';
    END IF;
    first_position := lock_chain(chain_name) + 1;
    SELECT * INTO STRICT head FROM chain_heads WHERE chain = chain_name;
    -- A clock that was set back does not turn the order of the entries round.
    moment := greatest(head.at,
      to_char(clock_timestamp() AT TIME ZONE 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.US"Z"') COLLATE "C");
    sealed := head.hash;
    FOREACH each_body IN ARRAY bodies LOOP
      IF each_body IS NULL THEN
        RAISE EXCEPTION 'a body is missing' USING ERRCODE = 'null_value_not_allowed';
      END IF;
      sealed := chain_hash(sealed, chain_name, first_position + cardinality(hashes), moment,
        each_body);
      hashes := array_append(hashes, sealed);
    END LOOP;
    RETURN QUERY
      INSERT INTO chain_entries AS entry (chain, position, at, previous, hash, body)
      SELECT chain_name, first_position + place - 1, moment,
        CASE place WHEN 1 THEN head.hash ELSE hashes[place - 1] END, hashes[place], body
      FROM unnest(bodies) WITH ORDINALITY AS given (body, place)
      ORDER BY place
      RETURNING entry.position, entry.at, entry.hash;
    UPDATE chain_heads
      SET position = first_position + cardinality(hashes) - 1, at = moment, hash = sealed
      WHERE chain = chain_name;
  END $$;

  CREATE FUNCTION start_chains() RETURNS trigger
  LANGUAGE plpgsql SECURITY DEFINER SET search_path = pg_catalog, public, pg_temp AS $$
  BEGIN
    INSERT INTO chain_heads (chain, position, at, hash)
      SELECT kind || '/' || NEW.id, 0, '', repeat('0', 64)
      FROM unnest(ARRAY['valuations', 'records']) AS kinds (kind);
    RETURN NULL;
  END $$;
  INSERT INTO chain_heads (chain, position, at, hash)
    SELECT kind || '/' || desks.id, 0, '', repeat('0', 64)
    FROM desks, unnest(ARRAY['valuations', 'records']) AS kinds (kind);
  CREATE TRIGGER start_chains AFTER INSERT ON desks
    FOR EACH ROW EXECUTE FUNCTION start_chains();

  REVOKE ALL ON FUNCTION chain_hash, lock_chain, append, start_chains, refuse_change,
    refuse_step_back FROM PUBLIC;
  GRANT EXECUTE ON FUNCTION lock_chain, append TO app`;

const verifications = `
  -- Who had a chain verified, how far that has come, and what was found.
  CREATE TABLE chain_verifications (
    id uuid PRIMARY KEY,
    desk_id uuid NOT NULL REFERENCES desks,
    chain text NOT NULL CHECK (chain ~ '^(valuations|records)/[0-9a-f-]{36}$'),
    status text NOT NULL CHECK (status IN ('queued', 'running', 'finished')),
    held_position bigint CHECK (held_position >= 1),
    held_hash text CHECK (held_hash ~ '^[0-9a-f]{64}$'),
    total bigint NOT NULL CHECK (total >= 0),
    checked bigint NOT NULL CHECK (checked >= 0),
    anchors bigint NOT NULL CHECK (anchors >= 0),
    break_kind text CHECK (break_kind <> ''),
    break_position bigint CHECK (break_position >= 0),
    started_by_id uuid NOT NULL REFERENCES users,
    started_at timestamptz(3) NOT NULL,
    finished_at timestamptz(3),
    CHECK ((held_position IS NULL) = (held_hash IS NULL)),
    CHECK ((break_kind IS NULL) = (break_position IS NULL)),
    CHECK ((finished_at IS NOT NULL) = (status = 'finished'))
  );
  CREATE INDEX chain_verifications_desk_id ON chain_verifications (desk_id, started_at DESC, id DESC);
  GRANT SELECT, INSERT ON chain_verifications TO app;
  GRANT UPDATE (status, total, checked, anchors, break_kind, break_position, finished_at)
    ON chain_verifications TO app`;
