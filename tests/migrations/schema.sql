CREATE SCHEMA public;
COMMENT ON SCHEMA public IS 'standard public schema';
CREATE FUNCTION public.append(chain_name text, bodies text[]) RETURNS TABLE(entry_position bigint, entry_at text, entry_hash text)
    LANGUAGE plpgsql SECURITY DEFINER
    SET search_path TO 'pg_catalog', 'public', 'pg_temp'
    AS $$
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
CREATE FUNCTION public.chain_hash(previous text, chain text, pos bigint, at text, body text) RETURNS text
    LANGUAGE sql IMMUTABLE STRICT PARALLEL SAFE
    SET search_path TO 'pg_catalog', 'pg_temp'
    AS $$
    SELECT encode(sha256(
      decode(previous, 'hex') || string_agg(
        int4send(octet_length(convert_to(field, 'UTF8'))) || convert_to(field, 'UTF8'),
        ''::bytea ORDER BY place)), 'hex')
    FROM unnest(ARRAY[chain, pos::text, at, body]) WITH ORDINALITY AS fields (field, place)
  $$;
CREATE FUNCTION public.guard_approved() RETURNS trigger
    LANGUAGE plpgsql
    AS $$
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
CREATE FUNCTION public.guard_market_quote() RETURNS trigger
    LANGUAGE plpgsql
    AS $$
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
CREATE FUNCTION public.guard_settled() RETURNS trigger
    LANGUAGE plpgsql
    AS $$
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
CREATE FUNCTION public.guard_truncate() RETURNS trigger
    LANGUAGE plpgsql
    AS $$
  BEGIN
    RAISE EXCEPTION 'TRUNCATE of % is refused: what was approved stays', TG_TABLE_NAME
      USING ERRCODE = 'integrity_constraint_violation';
  END $$;
CREATE FUNCTION public.lock_chain(chain_name text) RETURNS bigint
    LANGUAGE plpgsql SECURITY DEFINER
    SET search_path TO 'pg_catalog', 'public', 'pg_temp'
    AS $$
  DECLARE
    head_position bigint;
  BEGIN
    SELECT position INTO STRICT head_position FROM chain_heads
      WHERE chain = chain_name FOR UPDATE;
    RETURN head_position;
  END $$;
CREATE FUNCTION public.refuse_change() RETURNS trigger
    LANGUAGE plpgsql
    AS $$
  BEGIN
    RAISE EXCEPTION '% of % is refused: the chain only grows', TG_OP, TG_TABLE_NAME
      USING ERRCODE = 'integrity_constraint_violation';
  END $$;
CREATE FUNCTION public.refuse_step_back() RETURNS trigger
    LANGUAGE plpgsql
    AS $$
  BEGIN
    IF NEW.chain <> OLD.chain OR NEW.position <= OLD.position OR NEW.at < OLD.at THEN
      RAISE EXCEPTION 'the head of a chain only goes forward'
        USING ERRCODE = 'integrity_constraint_violation';
    END IF;
    RETURN NEW;
  END $$;
CREATE FUNCTION public.start_chains() RETURNS trigger
    LANGUAGE plpgsql SECURITY DEFINER
    SET search_path TO 'pg_catalog', 'public', 'pg_temp'
    AS $$
  BEGIN
    INSERT INTO chain_heads (chain, position, at, hash)
      SELECT kind || '/' || NEW.id, 0, '', repeat('0', 64)
      FROM unnest(ARRAY['valuations', 'records']) AS kinds (kind);
    RETURN NULL;
  END $$;
CREATE TABLE public.books (
    id uuid NOT NULL,
    desk_id uuid NOT NULL,
    code text NOT NULL,
    name text NOT NULL,
    created_by_id uuid NOT NULL,
    created_at timestamp(3) with time zone NOT NULL,
    archived_at timestamp(3) with time zone,
    CONSTRAINT books_code_check CHECK ((code ~ '^[A-Z0-9][A-Z0-9-]{1,11}$'::text)),
    CONSTRAINT books_name_check CHECK ((name <> ''::text))
);
CREATE TABLE public.chain_anchors (
    id uuid NOT NULL,
    chain text NOT NULL,
    "position" bigint NOT NULL,
    hash text NOT NULL,
    signed_at timestamp(3) with time zone NOT NULL,
    purpose text NOT NULL,
    key_id text NOT NULL,
    signature text NOT NULL,
    CONSTRAINT chain_anchors_hash_check CHECK ((hash ~ '^[0-9a-f]{64}$'::text)),
    CONSTRAINT chain_anchors_key_id_check CHECK ((key_id ~ '^[0-9a-f]{16}$'::text)),
    CONSTRAINT chain_anchors_position_check CHECK (("position" >= 1)),
    CONSTRAINT chain_anchors_purpose_check CHECK ((purpose = ANY (ARRAY['sign-off'::text, 'export'::text]))),
    CONSTRAINT chain_anchors_signature_check CHECK ((signature ~ '^[0-9a-f]{128}$'::text))
);
CREATE TABLE public.chain_entries (
    chain text NOT NULL,
    "position" bigint NOT NULL,
    at text NOT NULL COLLATE pg_catalog."C",
    previous text NOT NULL,
    hash text NOT NULL,
    body text NOT NULL,
    kind text GENERATED ALWAYS AS (((body)::jsonb ->> 'kind'::text)) STORED NOT NULL,
    subject_id uuid GENERATED ALWAYS AS ((((body)::jsonb #>> '{subject,id}'::text[]))::uuid) STORED,
    run_id uuid GENERATED ALWAYS AS ((((body)::jsonb ->> 'runId'::text))::uuid) STORED,
    run_number text GENERATED ALWAYS AS (((body)::jsonb ->> 'runNumber'::text)) STORED,
    trade_number text GENERATED ALWAYS AS (((body)::jsonb ->> 'tradeNumber'::text)) STORED,
    trade_version_id uuid GENERATED ALWAYS AS ((((body)::jsonb ->> 'tradeVersionId'::text))::uuid) STORED,
    book_id uuid GENERATED ALWAYS AS ((((body)::jsonb ->> 'bookId'::text))::uuid) STORED,
    underlying_id uuid GENERATED ALWAYS AS ((((body)::jsonb ->> 'underlyingId'::text))::uuid) STORED,
    route text GENERATED ALWAYS AS (((body)::jsonb ->> 'route'::text)) STORED,
    role text GENERATED ALWAYS AS (((body)::jsonb ->> 'role'::text)) STORED,
    verdict text GENERATED ALWAYS AS (((body)::jsonb ->> 'verdict'::text)) STORED,
    valued_at text GENERATED ALWAYS AS (((body)::jsonb ->> 'valuedAt'::text)) STORED COLLATE pg_catalog."C",
    CONSTRAINT chain_entries_body_check CHECK ((octet_length(body) <= 262144)),
    CONSTRAINT chain_entries_check CHECK (((kind = 'valuation'::text) = (chain ~~ 'valuations/%'::text))),
    CONSTRAINT chain_entries_check1 CHECK (((kind <> 'valuation'::text) OR ((run_id IS NOT NULL) AND (run_number IS NOT NULL) AND (trade_number IS NOT NULL) AND (trade_version_id IS NOT NULL) AND (book_id IS NOT NULL) AND (underlying_id IS NOT NULL) AND (route IS NOT NULL) AND (role = ANY (ARRAY['primary'::text, 'check'::text])) AND (valued_at ~ '^[0-9]{4}-[0-9]{2}-[0-9]{2}T[0-9]{2}:[0-9]{2}:[0-9]{2}[.][0-9]{3}Z$'::text)))),
    CONSTRAINT chain_entries_check2 CHECK (((kind = 'valuation'::text) OR (subject_id IS NOT NULL))),
    CONSTRAINT chain_entries_hash_check CHECK ((hash ~ '^[0-9a-f]{64}$'::text)),
    CONSTRAINT chain_entries_position_check CHECK (("position" >= 1)),
    CONSTRAINT chain_entries_previous_check CHECK ((previous ~ '^[0-9a-f]{64}$'::text))
);
CREATE TABLE public.chain_heads (
    chain text NOT NULL,
    desk_id uuid GENERATED ALWAYS AS ((split_part(chain, '/'::text, 2))::uuid) STORED NOT NULL,
    "position" bigint NOT NULL,
    at text NOT NULL COLLATE pg_catalog."C",
    hash text NOT NULL,
    CONSTRAINT chain_heads_chain_check CHECK ((chain ~ '^(valuations|records)/[0-9a-f-]{36}$'::text)),
    CONSTRAINT chain_heads_hash_check CHECK ((hash ~ '^[0-9a-f]{64}$'::text)),
    CONSTRAINT chain_heads_position_check CHECK (("position" >= 0))
);
CREATE TABLE public.chain_verifications (
    id uuid NOT NULL,
    desk_id uuid NOT NULL,
    chain text NOT NULL,
    status text NOT NULL,
    held_position bigint,
    held_hash text,
    total bigint NOT NULL,
    checked bigint NOT NULL,
    anchors bigint NOT NULL,
    break_kind text,
    break_position bigint,
    started_by_id uuid NOT NULL,
    started_at timestamp(3) with time zone NOT NULL,
    finished_at timestamp(3) with time zone,
    CONSTRAINT chain_verifications_anchors_check CHECK ((anchors >= 0)),
    CONSTRAINT chain_verifications_break_kind_check CHECK ((break_kind <> ''::text)),
    CONSTRAINT chain_verifications_break_position_check CHECK ((break_position >= 0)),
    CONSTRAINT chain_verifications_chain_check CHECK ((chain ~ '^(valuations|records)/[0-9a-f-]{36}$'::text)),
    CONSTRAINT chain_verifications_check CHECK (((held_position IS NULL) = (held_hash IS NULL))),
    CONSTRAINT chain_verifications_check1 CHECK (((break_kind IS NULL) = (break_position IS NULL))),
    CONSTRAINT chain_verifications_check2 CHECK (((finished_at IS NOT NULL) = (status = 'finished'::text))),
    CONSTRAINT chain_verifications_checked_check CHECK ((checked >= 0)),
    CONSTRAINT chain_verifications_held_hash_check CHECK ((held_hash ~ '^[0-9a-f]{64}$'::text)),
    CONSTRAINT chain_verifications_held_position_check CHECK ((held_position >= 1)),
    CONSTRAINT chain_verifications_status_check CHECK ((status = ANY (ARRAY['queued'::text, 'running'::text, 'finished'::text]))),
    CONSTRAINT chain_verifications_total_check CHECK ((total >= 0))
);
CREATE TABLE public.desks (
    id uuid NOT NULL,
    name text NOT NULL,
    time_zone text NOT NULL,
    expiry_cutoff text NOT NULL,
    last_quote_number integer DEFAULT 0 NOT NULL,
    created_at timestamp(3) with time zone NOT NULL,
    last_trade_number integer DEFAULT 0 NOT NULL,
    last_run_number integer DEFAULT 0 NOT NULL,
    CONSTRAINT desks_expiry_cutoff_check CHECK ((expiry_cutoff ~ '^([01][0-9]|2[0-3]):[0-5][0-9]$'::text)),
    CONSTRAINT desks_last_quote_number_check CHECK ((last_quote_number >= 0)),
    CONSTRAINT desks_last_run_number_check CHECK ((last_run_number >= 0)),
    CONSTRAINT desks_last_trade_number_check CHECK ((last_trade_number >= 0)),
    CONSTRAINT desks_name_check CHECK ((name <> ''::text)),
    CONSTRAINT desks_time_zone_check CHECK ((time_zone <> ''::text))
);
CREATE TABLE public.exports (
    id uuid NOT NULL,
    desk_id uuid NOT NULL,
    format text NOT NULL,
    filter jsonb NOT NULL,
    up_to_position bigint NOT NULL,
    status text NOT NULL,
    total integer NOT NULL,
    done integer NOT NULL,
    content bytea,
    sha256 text,
    manifest jsonb,
    created_by_id uuid NOT NULL,
    created_at timestamp(3) with time zone NOT NULL,
    ready_at timestamp(3) with time zone,
    CONSTRAINT exports_check CHECK (((content IS NOT NULL) = (status = 'ready'::text))),
    CONSTRAINT exports_check1 CHECK (((content IS NULL) = (sha256 IS NULL))),
    CONSTRAINT exports_check2 CHECK (((content IS NULL) = (manifest IS NULL))),
    CONSTRAINT exports_check3 CHECK (((content IS NULL) = (ready_at IS NULL))),
    CONSTRAINT exports_content_check CHECK ((octet_length(content) <= 33554432)),
    CONSTRAINT exports_done_check CHECK ((done >= 0)),
    CONSTRAINT exports_filter_check CHECK ((jsonb_typeof(filter) = 'object'::text)),
    CONSTRAINT exports_format_check CHECK ((format = ANY (ARRAY['csv'::text, 'xlsx'::text]))),
    CONSTRAINT exports_manifest_check CHECK ((jsonb_typeof(manifest) = 'object'::text)),
    CONSTRAINT exports_sha256_check CHECK ((sha256 ~ '^[0-9a-f]{64}$'::text)),
    CONSTRAINT exports_status_check CHECK ((status = ANY (ARRAY['queued'::text, 'running'::text, 'ready'::text]))),
    CONSTRAINT exports_total_check CHECK ((total >= 0)),
    CONSTRAINT exports_up_to_position_check CHECK ((up_to_position >= 0))
);
CREATE TABLE public.grants (
    id uuid NOT NULL,
    desk_id uuid NOT NULL,
    subject_id uuid NOT NULL,
    kind text NOT NULL,
    permission text,
    role text,
    previous_role text,
    ends_on date,
    ended_grant_id uuid,
    reason text NOT NULL,
    made_by_id uuid NOT NULL,
    made_at timestamp(3) with time zone NOT NULL,
    CONSTRAINT grants_check CHECK ((made_by_id <> subject_id)),
    CONSTRAINT grants_check1 CHECK (((role IS NOT NULL) = (kind = 'role-set'::text))),
    CONSTRAINT grants_check2 CHECK (((previous_role IS NULL) OR (kind = 'role-set'::text))),
    CONSTRAINT grants_check3 CHECK (((permission IS NOT NULL) = (kind = ANY (ARRAY['permission-granted'::text, 'permission-withdrawn'::text, 'change-ended'::text])))),
    CONSTRAINT grants_check4 CHECK (((ended_grant_id IS NOT NULL) = (kind = 'change-ended'::text))),
    CONSTRAINT grants_check5 CHECK (((ends_on IS NULL) OR (kind = ANY (ARRAY['permission-granted'::text, 'permission-withdrawn'::text])))),
    CONSTRAINT grants_kind_check CHECK ((kind = ANY (ARRAY['role-set'::text, 'permission-granted'::text, 'permission-withdrawn'::text, 'change-ended'::text, 'suspended'::text, 'reinstated'::text]))),
    CONSTRAINT grants_permission_check CHECK ((permission <> ''::text)),
    CONSTRAINT grants_previous_role_check CHECK ((previous_role = ANY (ARRAY['analyst'::text, 'desk-head'::text, 'risk-officer'::text, 'auditor'::text]))),
    CONSTRAINT grants_reason_check CHECK ((reason <> ''::text)),
    CONSTRAINT grants_role_check CHECK ((role = ANY (ARRAY['analyst'::text, 'desk-head'::text, 'risk-officer'::text, 'auditor'::text])))
);
CREATE TABLE public.idempotency_keys (
    user_id uuid NOT NULL,
    endpoint text NOT NULL,
    key uuid NOT NULL,
    request_hash text NOT NULL,
    answer jsonb NOT NULL,
    created_at timestamp(3) with time zone NOT NULL,
    CONSTRAINT idempotency_keys_endpoint_check CHECK ((endpoint <> ''::text)),
    CONSTRAINT idempotency_keys_request_hash_check CHECK ((request_hash ~ '^[0-9a-f]{64}$'::text))
);
CREATE TABLE public.market_quotes (
    snapshot_id uuid NOT NULL,
    underlying_id uuid NOT NULL,
    desk_id uuid NOT NULL,
    spot double precision NOT NULL,
    rate double precision NOT NULL,
    yield double precision,
    volatility double precision NOT NULL,
    CONSTRAINT market_quotes_rate_check CHECK ((abs(rate) < 'Infinity'::double precision)),
    CONSTRAINT market_quotes_spot_check CHECK (((spot > (0)::double precision) AND (spot < 'Infinity'::double precision))),
    CONSTRAINT market_quotes_volatility_check CHECK (((volatility > (0)::double precision) AND (volatility < 'Infinity'::double precision))),
    CONSTRAINT market_quotes_yield_check CHECK ((abs(yield) < 'Infinity'::double precision))
);
CREATE TABLE public.market_snapshots (
    id uuid NOT NULL,
    desk_id uuid NOT NULL,
    date date NOT NULL,
    status text NOT NULL,
    entered_by_id uuid NOT NULL,
    entered_at timestamp(3) with time zone NOT NULL,
    approved_by_id uuid,
    approved_at timestamp(3) with time zone,
    version integer DEFAULT 0 NOT NULL,
    source text DEFAULT 'typed'::text NOT NULL,
    saved_by_ids uuid[] DEFAULT '{}'::uuid[] NOT NULL,
    saved_at timestamp(3) with time zone,
    reason text,
    restates_id uuid,
    superseded_by_id uuid,
    CONSTRAINT market_snapshots_check CHECK ((approved_by_id <> entered_by_id)),
    CONSTRAINT market_snapshots_check1 CHECK (((approved_by_id IS NULL) = (approved_at IS NULL))),
    CONSTRAINT market_snapshots_check2 CHECK (((approved_at IS NULL) = (status = 'draft'::text))),
    CONSTRAINT market_snapshots_check3 CHECK (((source = 'restatement'::text) = (restates_id IS NOT NULL))),
    CONSTRAINT market_snapshots_check4 CHECK (((source = 'restatement'::text) = (reason IS NOT NULL))),
    CONSTRAINT market_snapshots_check5 CHECK (((superseded_by_id IS NOT NULL) = (status = 'superseded'::text))),
    CONSTRAINT market_snapshots_check6 CHECK ((superseded_by_id <> id)),
    CONSTRAINT market_snapshots_check7 CHECK ((approved_by_id <> ALL (saved_by_ids))),
    CONSTRAINT market_snapshots_reason_check CHECK ((reason <> ''::text)),
    CONSTRAINT market_snapshots_source_check CHECK ((source = ANY (ARRAY['typed'::text, 'file'::text, 'restatement'::text]))),
    CONSTRAINT market_snapshots_status_check CHECK ((status = ANY (ARRAY['draft'::text, 'approved'::text, 'superseded'::text]))),
    CONSTRAINT market_snapshots_version_check CHECK ((version >= 0))
);
CREATE TABLE public.memberships (
    id uuid NOT NULL,
    desk_id uuid NOT NULL,
    user_id uuid NOT NULL,
    role text NOT NULL,
    member_since date NOT NULL,
    suspended_at timestamp(3) with time zone,
    suspension_reason text,
    version integer DEFAULT 0 NOT NULL,
    CONSTRAINT memberships_check CHECK (((suspended_at IS NULL) = (suspension_reason IS NULL))),
    CONSTRAINT memberships_role_check CHECK ((role = ANY (ARRAY['analyst'::text, 'desk-head'::text, 'risk-officer'::text, 'auditor'::text]))),
    CONSTRAINT memberships_suspension_reason_check CHECK ((suspension_reason <> ''::text)),
    CONSTRAINT memberships_version_check CHECK ((version >= 0))
);
CREATE TABLE public.pricing_policies (
    id uuid NOT NULL,
    desk_id uuid NOT NULL,
    number integer NOT NULL,
    status text NOT NULL,
    version integer NOT NULL,
    primary_european text NOT NULL,
    check_european text NOT NULL,
    primary_american text NOT NULL,
    check_american text NOT NULL,
    sizes jsonb,
    tolerance_share double precision,
    unit_tolerance jsonb NOT NULL,
    money_tolerance jsonb NOT NULL,
    reason text NOT NULL,
    author_id uuid NOT NULL,
    authored_at timestamp(3) with time zone NOT NULL,
    saved_by_ids uuid[] NOT NULL,
    saved_at timestamp(3) with time zone,
    approved_by_id uuid,
    approved_at timestamp(3) with time zone,
    superseded_by_id uuid,
    CONSTRAINT pricing_policies_check CHECK ((primary_european <> check_european)),
    CONSTRAINT pricing_policies_check1 CHECK ((primary_american <> check_american)),
    CONSTRAINT pricing_policies_check2 CHECK (((primary_american <> 'closed-form'::text) AND (check_american <> 'closed-form'::text))),
    CONSTRAINT pricing_policies_check3 CHECK (((sizes IS NULL) <> (tolerance_share IS NULL))),
    CONSTRAINT pricing_policies_check4 CHECK (((approved_by_id <> author_id) AND (approved_by_id <> ALL (saved_by_ids)))),
    CONSTRAINT pricing_policies_check5 CHECK (((approved_by_id IS NULL) = (approved_at IS NULL))),
    CONSTRAINT pricing_policies_check6 CHECK (((approved_at IS NULL) = (status = 'draft'::text))),
    CONSTRAINT pricing_policies_check7 CHECK (((superseded_by_id IS NOT NULL) = (status = 'superseded'::text))),
    CONSTRAINT pricing_policies_check8 CHECK ((superseded_by_id <> id)),
    CONSTRAINT pricing_policies_check_american_check CHECK ((check_american = ANY (ARRAY['closed-form'::text, 'heat-crank-nicolson'::text, 'lattice-crr'::text, 'lattice-symmetric'::text]))),
    CONSTRAINT pricing_policies_check_european_check CHECK ((check_european = ANY (ARRAY['closed-form'::text, 'heat-crank-nicolson'::text, 'lattice-crr'::text, 'lattice-symmetric'::text]))),
    CONSTRAINT pricing_policies_money_tolerance_check CHECK ((jsonb_typeof(money_tolerance) = 'object'::text)),
    CONSTRAINT pricing_policies_number_check CHECK ((number >= 1)),
    CONSTRAINT pricing_policies_primary_american_check CHECK ((primary_american = ANY (ARRAY['closed-form'::text, 'heat-crank-nicolson'::text, 'lattice-crr'::text, 'lattice-symmetric'::text]))),
    CONSTRAINT pricing_policies_primary_european_check CHECK ((primary_european = ANY (ARRAY['closed-form'::text, 'heat-crank-nicolson'::text, 'lattice-crr'::text, 'lattice-symmetric'::text]))),
    CONSTRAINT pricing_policies_reason_check CHECK ((reason <> ''::text)),
    CONSTRAINT pricing_policies_sizes_check CHECK ((jsonb_typeof(sizes) = 'object'::text)),
    CONSTRAINT pricing_policies_status_check CHECK ((status = ANY (ARRAY['draft'::text, 'approved'::text, 'superseded'::text]))),
    CONSTRAINT pricing_policies_tolerance_share_check CHECK (((tolerance_share > (0)::double precision) AND (tolerance_share <= (1)::double precision))),
    CONSTRAINT pricing_policies_unit_tolerance_check CHECK ((jsonb_typeof(unit_tolerance) = 'object'::text)),
    CONSTRAINT pricing_policies_version_check CHECK ((version >= 0))
);
CREATE TABLE public.quotes (
    id uuid NOT NULL,
    desk_id uuid NOT NULL,
    number text NOT NULL,
    underlying_id uuid NOT NULL,
    direction text NOT NULL,
    quantity numeric NOT NULL,
    contract_size numeric NOT NULL,
    kind text NOT NULL,
    exercise text NOT NULL,
    strike numeric NOT NULL,
    expiry_date date NOT NULL,
    expiry_at timestamp(3) with time zone NOT NULL,
    expiry_years double precision NOT NULL,
    spot double precision NOT NULL,
    rate double precision NOT NULL,
    yield double precision,
    volatility double precision NOT NULL,
    snapshot_id uuid,
    priced_at timestamp(3) with time zone NOT NULL,
    value double precision NOT NULL,
    error_estimate double precision,
    total numeric NOT NULL,
    tolerance double precision NOT NULL,
    verdict text NOT NULL,
    refuted boolean NOT NULL,
    primary_route text NOT NULL,
    routes jsonb NOT NULL,
    engine text NOT NULL,
    indicative_value double precision NOT NULL,
    note text NOT NULL,
    created_by_id uuid NOT NULL,
    created_at timestamp(3) with time zone NOT NULL,
    CONSTRAINT quotes_check CHECK ((priced_at < expiry_at)),
    CONSTRAINT quotes_contract_size_check CHECK ((contract_size > (0)::numeric)),
    CONSTRAINT quotes_direction_check CHECK ((direction = ANY (ARRAY['buy'::text, 'sell'::text]))),
    CONSTRAINT quotes_engine_check CHECK ((engine <> ''::text)),
    CONSTRAINT quotes_error_estimate_check CHECK ((error_estimate >= (0)::double precision)),
    CONSTRAINT quotes_exercise_check CHECK ((exercise = ANY (ARRAY['european'::text, 'american'::text]))),
    CONSTRAINT quotes_expiry_years_check CHECK ((expiry_years > (0)::double precision)),
    CONSTRAINT quotes_indicative_value_check CHECK ((abs(indicative_value) < 'Infinity'::double precision)),
    CONSTRAINT quotes_kind_check CHECK ((kind = ANY (ARRAY['call'::text, 'put'::text]))),
    CONSTRAINT quotes_number_check CHECK ((number ~ '^Q-[0-9]{4,}$'::text)),
    CONSTRAINT quotes_primary_route_check CHECK ((primary_route <> ''::text)),
    CONSTRAINT quotes_quantity_check CHECK ((quantity > (0)::numeric)),
    CONSTRAINT quotes_rate_check CHECK ((abs(rate) < 'Infinity'::double precision)),
    CONSTRAINT quotes_routes_check CHECK ((jsonb_typeof(routes) = 'array'::text)),
    CONSTRAINT quotes_spot_check CHECK (((spot > (0)::double precision) AND (spot < 'Infinity'::double precision))),
    CONSTRAINT quotes_strike_check CHECK ((strike > (0)::numeric)),
    CONSTRAINT quotes_tolerance_check CHECK ((tolerance > (0)::double precision)),
    CONSTRAINT quotes_value_check CHECK ((abs(value) < 'Infinity'::double precision)),
    CONSTRAINT quotes_verdict_check CHECK ((verdict = ANY (ARRAY['agree'::text, 'wide'::text, 'disagree'::text, 'one-route'::text]))),
    CONSTRAINT quotes_volatility_check CHECK (((volatility > (0)::double precision) AND (volatility < 'Infinity'::double precision))),
    CONSTRAINT quotes_yield_check CHECK ((abs(yield) < 'Infinity'::double precision))
);
CREATE TABLE public.run_books (
    run_id uuid NOT NULL,
    book_id uuid NOT NULL,
    desk_id uuid NOT NULL,
    is_active boolean NOT NULL,
    trades integer NOT NULL,
    CONSTRAINT run_books_trades_check CHECK ((trades >= 0))
);
CREATE TABLE public.run_chunks (
    run_id uuid NOT NULL,
    number integer NOT NULL,
    trade_version_ids uuid[] NOT NULL,
    done_at timestamp(3) with time zone,
    CONSTRAINT run_chunks_number_check CHECK ((number >= 1)),
    CONSTRAINT run_chunks_trade_version_ids_check CHECK ((cardinality(trade_version_ids) >= 1))
);
CREATE TABLE public.run_exceptions (
    id uuid NOT NULL,
    desk_id uuid NOT NULL,
    run_id uuid NOT NULL,
    trade_id uuid NOT NULL,
    trade_version_id uuid NOT NULL,
    kind text NOT NULL,
    gravity integer GENERATED ALWAYS AS (
CASE kind
    WHEN 'failure'::text THEN 1
    WHEN 'disagree'::text THEN 2
    WHEN 'refuted'::text THEN 3
    WHEN 'unchecked'::text THEN 4
    ELSE 5
END) STORED NOT NULL,
    materiality numeric,
    descent numeric GENERATED ALWAYS AS ((- COALESCE(materiality, 'Infinity'::numeric))) STORED NOT NULL,
    state text NOT NULL,
    answer_kind text,
    study_id uuid,
    override_value numeric,
    rerun_id uuid,
    reason text,
    answered_by_id uuid,
    answered_at timestamp(3) with time zone,
    CONSTRAINT run_exceptions_answer_kind_check CHECK ((answer_kind = ANY (ARRAY['study'::text, 'override'::text, 'rerun'::text]))),
    CONSTRAINT run_exceptions_check CHECK (((state = 'answered'::text) = (answer_kind IS NOT NULL))),
    CONSTRAINT run_exceptions_check1 CHECK (((state = 'answered'::text) = (answered_by_id IS NOT NULL))),
    CONSTRAINT run_exceptions_check2 CHECK (((state = 'answered'::text) = (answered_at IS NOT NULL))),
    CONSTRAINT run_exceptions_check3 CHECK (((study_id IS NOT NULL) = COALESCE((answer_kind = 'study'::text), false))),
    CONSTRAINT run_exceptions_check4 CHECK (((rerun_id IS NOT NULL) = COALESCE((answer_kind = 'rerun'::text), false))),
    CONSTRAINT run_exceptions_check5 CHECK (((override_value IS NULL) OR (answer_kind = 'override'::text))),
    CONSTRAINT run_exceptions_check6 CHECK (((reason IS NOT NULL) = COALESCE((answer_kind = ANY (ARRAY['study'::text, 'override'::text])), false))),
    CONSTRAINT run_exceptions_kind_check CHECK ((kind = ANY (ARRAY['failure'::text, 'disagree'::text, 'refuted'::text, 'unchecked'::text, 'wide'::text]))),
    CONSTRAINT run_exceptions_materiality_check CHECK ((materiality >= (0)::numeric)),
    CONSTRAINT run_exceptions_reason_check CHECK ((reason <> ''::text)),
    CONSTRAINT run_exceptions_state_check CHECK ((state = ANY (ARRAY['open'::text, 'answered'::text])))
);
CREATE TABLE public.schema_migrations (
    name text NOT NULL,
    run_at timestamp with time zone DEFAULT now() NOT NULL,
    CONSTRAINT schema_migrations_name_check CHECK ((name <> ''::text))
);
CREATE TABLE public.sessions (
    id uuid NOT NULL,
    user_id uuid NOT NULL,
    refresh_hash text NOT NULL,
    stepped_up_at timestamp(3) with time zone NOT NULL,
    created_at timestamp(3) with time zone NOT NULL,
    rotated_at timestamp(3) with time zone NOT NULL,
    expires_at timestamp(3) with time zone NOT NULL,
    ended_at timestamp(3) with time zone,
    end_cause text,
    CONSTRAINT sessions_check CHECK ((expires_at > created_at)),
    CONSTRAINT sessions_check1 CHECK (((ended_at IS NULL) = (end_cause IS NULL))),
    CONSTRAINT sessions_end_cause_check CHECK ((end_cause = ANY (ARRAY['signed-out'::text, 'token-reused'::text]))),
    CONSTRAINT sessions_refresh_hash_check CHECK ((refresh_hash ~ '^[0-9a-f]{64}$'::text))
);
CREATE TABLE public.studies (
    id uuid NOT NULL,
    desk_id uuid NOT NULL,
    ordinal integer NOT NULL,
    number text GENERATED ALWAYS AS (('S-'::text || lpad((ordinal)::text, GREATEST(4, length((ordinal)::text)), '0'::text))) STORED NOT NULL,
    source text NOT NULL,
    quote_id uuid,
    trade_id uuid,
    trade_version_id uuid,
    underlying_id uuid NOT NULL,
    terms jsonb NOT NULL,
    request jsonb NOT NULL,
    reference jsonb NOT NULL,
    ladders jsonb NOT NULL,
    orders jsonb,
    engine text NOT NULL,
    status text NOT NULL,
    total integer NOT NULL,
    done integer NOT NULL,
    version integer NOT NULL,
    started_by_id uuid NOT NULL,
    created_at timestamp(3) with time zone NOT NULL,
    finished_at timestamp(3) with time zone,
    decided_by_id uuid,
    decided_at timestamp(3) with time zone,
    decision_comment text,
    CONSTRAINT studies_check CHECK (((done >= 0) AND (done <= total))),
    CONSTRAINT studies_check1 CHECK (((source = 'quote'::text) = (quote_id IS NOT NULL))),
    CONSTRAINT studies_check2 CHECK (((source = 'trade'::text) = (trade_id IS NOT NULL))),
    CONSTRAINT studies_check3 CHECK (((trade_id IS NULL) = (trade_version_id IS NULL))),
    CONSTRAINT studies_check4 CHECK (((orders IS NOT NULL) = (status = ANY (ARRAY['finished'::text, 'signed-off'::text, 'sent-back'::text])))),
    CONSTRAINT studies_check5 CHECK (((decided_by_id IS NOT NULL) = (status = ANY (ARRAY['signed-off'::text, 'sent-back'::text])))),
    CONSTRAINT studies_check6 CHECK (((decided_by_id IS NULL) = (decided_at IS NULL))),
    CONSTRAINT studies_check7 CHECK (((decided_by_id IS NULL) = (decision_comment IS NULL))),
    CONSTRAINT studies_check8 CHECK ((decided_by_id <> started_by_id)),
    CONSTRAINT studies_decision_comment_check CHECK ((decision_comment <> ''::text)),
    CONSTRAINT studies_engine_check CHECK ((engine <> ''::text)),
    CONSTRAINT studies_ladders_check CHECK ((jsonb_typeof(ladders) = 'array'::text)),
    CONSTRAINT studies_orders_check CHECK ((jsonb_typeof(orders) = 'array'::text)),
    CONSTRAINT studies_ordinal_check CHECK ((ordinal >= 1)),
    CONSTRAINT studies_reference_check CHECK ((jsonb_typeof(reference) = 'object'::text)),
    CONSTRAINT studies_request_check CHECK ((jsonb_typeof(request) = 'object'::text)),
    CONSTRAINT studies_source_check CHECK ((source = ANY (ARRAY['trade'::text, 'quote'::text, 'free'::text]))),
    CONSTRAINT studies_status_check CHECK ((status = ANY (ARRAY['queued'::text, 'running'::text, 'finished'::text, 'cancelled'::text, 'signed-off'::text, 'sent-back'::text]))),
    CONSTRAINT studies_terms_check CHECK ((jsonb_typeof(terms) = 'object'::text)),
    CONSTRAINT studies_total_check CHECK ((total > 0)),
    CONSTRAINT studies_version_check CHECK ((version >= 0))
);
CREATE TABLE public.study_rows (
    study_id uuid NOT NULL,
    route text NOT NULL,
    ordinal integer NOT NULL,
    result jsonb NOT NULL,
    milliseconds double precision NOT NULL,
    CONSTRAINT study_rows_milliseconds_check CHECK (((milliseconds >= (0)::double precision) AND (milliseconds < 'Infinity'::double precision))),
    CONSTRAINT study_rows_ordinal_check CHECK ((ordinal >= 0)),
    CONSTRAINT study_rows_result_check CHECK ((jsonb_typeof(result) = 'object'::text)),
    CONSTRAINT study_rows_route_check CHECK ((route <> ''::text))
);
CREATE TABLE public.trade_versions (
    id uuid NOT NULL,
    desk_id uuid NOT NULL,
    trade_id uuid NOT NULL,
    number integer NOT NULL,
    state text NOT NULL,
    underlying_id uuid NOT NULL,
    direction text NOT NULL,
    quantity numeric NOT NULL,
    contract_size numeric NOT NULL,
    kind text NOT NULL,
    exercise text NOT NULL,
    strike numeric NOT NULL,
    expiry_date date NOT NULL,
    expiry_at timestamp(3) with time zone NOT NULL,
    premium_amount numeric NOT NULL,
    premium_currency text NOT NULL,
    premium_date date NOT NULL,
    counterparty text NOT NULL,
    traded_at timestamp(3) with time zone NOT NULL,
    note text NOT NULL,
    quote_id uuid,
    amendment_reason text,
    proposed_by_id uuid NOT NULL,
    proposed_at timestamp(3) with time zone NOT NULL,
    decided_by_id uuid,
    decided_at timestamp(3) with time zone,
    decision_reason text,
    CONSTRAINT trade_versions_amendment_reason_check CHECK ((amendment_reason <> ''::text)),
    CONSTRAINT trade_versions_check CHECK ((traded_at < expiry_at)),
    CONSTRAINT trade_versions_check1 CHECK (((amendment_reason IS NULL) = (number = 1))),
    CONSTRAINT trade_versions_check2 CHECK ((decided_by_id <> proposed_by_id)),
    CONSTRAINT trade_versions_check3 CHECK (((decided_by_id IS NULL) = (decided_at IS NULL))),
    CONSTRAINT trade_versions_check4 CHECK (((decided_by_id IS NOT NULL) OR (state = ANY (ARRAY['proposed'::text, 'superseded'::text])))),
    CONSTRAINT trade_versions_check5 CHECK (((decided_by_id IS NULL) OR (state <> 'proposed'::text))),
    CONSTRAINT trade_versions_check6 CHECK (((state <> 'returned'::text) OR (decision_reason IS NOT NULL))),
    CONSTRAINT trade_versions_contract_size_check CHECK ((contract_size > (0)::numeric)),
    CONSTRAINT trade_versions_counterparty_check CHECK ((counterparty <> ''::text)),
    CONSTRAINT trade_versions_decision_reason_check CHECK ((decision_reason <> ''::text)),
    CONSTRAINT trade_versions_direction_check CHECK ((direction = ANY (ARRAY['buy'::text, 'sell'::text]))),
    CONSTRAINT trade_versions_exercise_check CHECK ((exercise = ANY (ARRAY['european'::text, 'american'::text]))),
    CONSTRAINT trade_versions_kind_check CHECK ((kind = ANY (ARRAY['call'::text, 'put'::text]))),
    CONSTRAINT trade_versions_number_check CHECK ((number >= 1)),
    CONSTRAINT trade_versions_premium_amount_check CHECK ((premium_amount >= (0)::numeric)),
    CONSTRAINT trade_versions_premium_currency_check CHECK ((premium_currency ~ '^[A-Z]{3}$'::text)),
    CONSTRAINT trade_versions_quantity_check CHECK ((quantity > (0)::numeric)),
    CONSTRAINT trade_versions_state_check CHECK ((state = ANY (ARRAY['proposed'::text, 'approved'::text, 'returned'::text, 'superseded'::text]))),
    CONSTRAINT trade_versions_strike_check CHECK ((strike > (0)::numeric))
);
CREATE TABLE public.trades (
    id uuid NOT NULL,
    desk_id uuid NOT NULL,
    book_id uuid NOT NULL,
    ordinal integer NOT NULL,
    number text GENERATED ALWAYS AS (('T-'::text || lpad((ordinal)::text, GREATEST(4, length((ordinal)::text)), '0'::text))) STORED NOT NULL,
    status text NOT NULL,
    live_version_id uuid,
    latest_version_id uuid NOT NULL,
    version integer DEFAULT 0 NOT NULL,
    underlying_id uuid NOT NULL,
    expiry_at timestamp(3) with time zone NOT NULL,
    proposed_by_id uuid NOT NULL,
    proposed_at timestamp(3) with time zone NOT NULL,
    end_outcome text,
    end_date date,
    end_amount numeric,
    end_currency text,
    last_run_id uuid,
    last_snapshot_date date,
    last_value double precision,
    last_error double precision,
    last_verdict text,
    last_refuted boolean,
    last_total numeric,
    last_strip jsonb,
    last_tolerance double precision,
    previous_value double precision,
    value_change double precision GENERATED ALWAYS AS ((last_value - previous_value)) STORED,
    CONSTRAINT trades_check CHECK (((live_version_id IS NULL) = (status = ANY (ARRAY['proposed'::text, 'returned'::text])))),
    CONSTRAINT trades_check1 CHECK (((live_version_id <> latest_version_id) OR (status <> 'amended'::text))),
    CONSTRAINT trades_check10 CHECK (((last_value IS NULL) = (last_strip IS NULL))),
    CONSTRAINT trades_check11 CHECK (((last_value IS NULL) = (last_tolerance IS NULL))),
    CONSTRAINT trades_check12 CHECK (((last_error IS NULL) OR (last_value IS NOT NULL))),
    CONSTRAINT trades_check2 CHECK (((end_outcome IS NULL) = (end_date IS NULL))),
    CONSTRAINT trades_check3 CHECK (((end_amount IS NULL) = (end_currency IS NULL))),
    CONSTRAINT trades_check4 CHECK (
CASE status
    WHEN 'closed'::text THEN ((end_outcome = 'closed'::text) AND (end_amount IS NOT NULL))
    WHEN 'expired'::text THEN ((end_outcome = ANY (ARRAY['lapsed'::text, 'exercised'::text])) AND (end_amount IS NULL))
    ELSE ((end_outcome IS NULL) AND (end_amount IS NULL))
END),
    CONSTRAINT trades_check5 CHECK (((last_run_id IS NULL) = (last_snapshot_date IS NULL))),
    CONSTRAINT trades_check6 CHECK (((last_run_id IS NOT NULL) OR (last_value IS NULL))),
    CONSTRAINT trades_check7 CHECK (((last_value IS NULL) = (last_total IS NULL))),
    CONSTRAINT trades_check8 CHECK (((last_value IS NULL) = (last_verdict IS NULL))),
    CONSTRAINT trades_check9 CHECK (((last_value IS NULL) = (last_refuted IS NULL))),
    CONSTRAINT trades_end_currency_check CHECK ((end_currency ~ '^[A-Z]{3}$'::text)),
    CONSTRAINT trades_end_outcome_check CHECK ((end_outcome = ANY (ARRAY['closed'::text, 'lapsed'::text, 'exercised'::text]))),
    CONSTRAINT trades_last_error_check CHECK (((last_error >= (0)::double precision) AND (last_error < 'Infinity'::double precision))),
    CONSTRAINT trades_last_strip_check CHECK ((jsonb_typeof(last_strip) = 'array'::text)),
    CONSTRAINT trades_last_tolerance_check CHECK ((last_tolerance > (0)::double precision)),
    CONSTRAINT trades_last_value_check CHECK ((abs(last_value) < 'Infinity'::double precision)),
    CONSTRAINT trades_last_verdict_check CHECK ((last_verdict = ANY (ARRAY['agree'::text, 'wide'::text, 'disagree'::text, 'one-route'::text]))),
    CONSTRAINT trades_ordinal_check CHECK ((ordinal >= 1)),
    CONSTRAINT trades_previous_value_check CHECK ((abs(previous_value) < 'Infinity'::double precision)),
    CONSTRAINT trades_status_check CHECK ((status = ANY (ARRAY['proposed'::text, 'returned'::text, 'live'::text, 'amended'::text, 'closed'::text, 'expired'::text]))),
    CONSTRAINT trades_version_check CHECK ((version >= 0))
);
CREATE TABLE public.underlyings (
    id uuid NOT NULL,
    desk_id uuid NOT NULL,
    symbol text NOT NULL,
    name text NOT NULL,
    kind text NOT NULL,
    currency text NOT NULL,
    unit text NOT NULL,
    contract_size numeric NOT NULL,
    price_decimals integer NOT NULL,
    tolerance double precision NOT NULL,
    archived_at timestamp(3) with time zone,
    CONSTRAINT underlyings_contract_size_check CHECK ((contract_size > (0)::numeric)),
    CONSTRAINT underlyings_currency_check CHECK ((currency ~ '^[A-Z]{3}$'::text)),
    CONSTRAINT underlyings_kind_check CHECK ((kind = ANY (ARRAY['share'::text, 'index'::text, 'currency-pair'::text, 'future'::text]))),
    CONSTRAINT underlyings_name_check CHECK ((name <> ''::text)),
    CONSTRAINT underlyings_price_decimals_check CHECK (((price_decimals >= 0) AND (price_decimals <= 10))),
    CONSTRAINT underlyings_symbol_check CHECK ((symbol <> ''::text)),
    CONSTRAINT underlyings_tolerance_check CHECK ((tolerance > (0)::double precision)),
    CONSTRAINT underlyings_unit_check CHECK ((unit <> ''::text))
);
CREATE TABLE public.users (
    id uuid NOT NULL,
    email text NOT NULL,
    name text NOT NULL,
    password_hash text NOT NULL,
    created_at timestamp(3) with time zone NOT NULL,
    CONSTRAINT users_email_check CHECK (((email = lower(email)) AND (email ~~ '%_@_%'::text))),
    CONSTRAINT users_name_check CHECK ((name <> ''::text)),
    CONSTRAINT users_password_hash_check CHECK ((password_hash <> ''::text))
);
CREATE TABLE public.valuation_runs (
    id uuid NOT NULL,
    desk_id uuid NOT NULL,
    ordinal integer NOT NULL,
    number text GENERATED ALWAYS AS (('R-'::text || lpad((ordinal)::text, GREATEST(4, length((ordinal)::text)), '0'::text))) STORED NOT NULL,
    snapshot_id uuid NOT NULL,
    snapshot_date date NOT NULL,
    policy_id uuid NOT NULL,
    valued_at timestamp(3) with time zone NOT NULL,
    engine text NOT NULL,
    status text NOT NULL,
    is_active boolean GENERATED ALWAYS AS ((status = ANY (ARRAY['queued'::text, 'running'::text]))) STORED NOT NULL,
    version integer NOT NULL,
    rerun_of_id uuid,
    total integer NOT NULL,
    done integer DEFAULT 0 NOT NULL,
    left_out integer DEFAULT 0 NOT NULL,
    agree integer DEFAULT 0 NOT NULL,
    wide integer DEFAULT 0 NOT NULL,
    disagree integer DEFAULT 0 NOT NULL,
    one_route integer DEFAULT 0 NOT NULL,
    failed integer DEFAULT 0 NOT NULL,
    refuted integer DEFAULT 0 NOT NULL,
    totals jsonb,
    started_by_id uuid NOT NULL,
    started_at timestamp(3) with time zone NOT NULL,
    finished_at timestamp(3) with time zone,
    cancelled_by_id uuid,
    cancelled_at timestamp(3) with time zone,
    signed_off_by_id uuid,
    signed_off_at timestamp(3) with time zone,
    sign_off_comment text,
    CONSTRAINT valuation_runs_agree_check CHECK ((agree >= 0)),
    CONSTRAINT valuation_runs_check CHECK ((rerun_of_id <> id)),
    CONSTRAINT valuation_runs_check1 CHECK (((done <= total) AND (refuted <= done))),
    CONSTRAINT valuation_runs_check10 CHECK (((signed_off_by_id IS NULL) = (signed_off_at IS NULL))),
    CONSTRAINT valuation_runs_check11 CHECK (((sign_off_comment IS NULL) = (signed_off_at IS NULL))),
    CONSTRAINT valuation_runs_check12 CHECK ((signed_off_by_id <> started_by_id)),
    CONSTRAINT valuation_runs_check2 CHECK ((((((agree + wide) + disagree) + one_route) + failed) = done)),
    CONSTRAINT valuation_runs_check3 CHECK (((status <> 'queued'::text) OR (done = 0))),
    CONSTRAINT valuation_runs_check4 CHECK (((done = total) = (status = ANY (ARRAY['finished'::text, 'signed-off'::text])))),
    CONSTRAINT valuation_runs_check5 CHECK (((finished_at IS NOT NULL) = (status = ANY (ARRAY['finished'::text, 'signed-off'::text])))),
    CONSTRAINT valuation_runs_check6 CHECK (((totals IS NOT NULL) = (status = ANY (ARRAY['finished'::text, 'signed-off'::text])))),
    CONSTRAINT valuation_runs_check7 CHECK (((cancelled_at IS NOT NULL) = (status = 'cancelled'::text))),
    CONSTRAINT valuation_runs_check8 CHECK (((cancelled_by_id IS NULL) = (cancelled_at IS NULL))),
    CONSTRAINT valuation_runs_check9 CHECK (((signed_off_at IS NOT NULL) = (status = 'signed-off'::text))),
    CONSTRAINT valuation_runs_disagree_check CHECK ((disagree >= 0)),
    CONSTRAINT valuation_runs_done_check CHECK ((done >= 0)),
    CONSTRAINT valuation_runs_engine_check CHECK ((engine <> ''::text)),
    CONSTRAINT valuation_runs_failed_check CHECK ((failed >= 0)),
    CONSTRAINT valuation_runs_left_out_check CHECK ((left_out >= 0)),
    CONSTRAINT valuation_runs_one_route_check CHECK ((one_route >= 0)),
    CONSTRAINT valuation_runs_ordinal_check CHECK ((ordinal >= 1)),
    CONSTRAINT valuation_runs_refuted_check CHECK ((refuted >= 0)),
    CONSTRAINT valuation_runs_sign_off_comment_check CHECK ((sign_off_comment <> ''::text)),
    CONSTRAINT valuation_runs_status_check CHECK ((status = ANY (ARRAY['queued'::text, 'running'::text, 'finished'::text, 'cancelled'::text, 'signed-off'::text]))),
    CONSTRAINT valuation_runs_total_check CHECK ((total >= 1)),
    CONSTRAINT valuation_runs_totals_check CHECK ((jsonb_typeof(totals) = 'object'::text)),
    CONSTRAINT valuation_runs_version_check CHECK ((version >= 0)),
    CONSTRAINT valuation_runs_wide_check CHECK ((wide >= 0))
);
ALTER TABLE ONLY public.books
    ADD CONSTRAINT books_desk_id_code_key UNIQUE (desk_id, code);
ALTER TABLE ONLY public.books
    ADD CONSTRAINT books_desk_id_id_key UNIQUE (desk_id, id);
ALTER TABLE ONLY public.books
    ADD CONSTRAINT books_pkey PRIMARY KEY (id);
ALTER TABLE ONLY public.chain_anchors
    ADD CONSTRAINT chain_anchors_pkey PRIMARY KEY (id);
ALTER TABLE ONLY public.chain_entries
    ADD CONSTRAINT chain_entries_pkey PRIMARY KEY (chain, "position");
ALTER TABLE ONLY public.chain_heads
    ADD CONSTRAINT chain_heads_pkey PRIMARY KEY (chain);
ALTER TABLE ONLY public.chain_verifications
    ADD CONSTRAINT chain_verifications_pkey PRIMARY KEY (id);
ALTER TABLE ONLY public.desks
    ADD CONSTRAINT desks_name_key UNIQUE (name);
ALTER TABLE ONLY public.desks
    ADD CONSTRAINT desks_pkey PRIMARY KEY (id);
ALTER TABLE ONLY public.exports
    ADD CONSTRAINT exports_pkey PRIMARY KEY (id);
ALTER TABLE ONLY public.grants
    ADD CONSTRAINT grants_desk_id_id_key UNIQUE (desk_id, id);
ALTER TABLE ONLY public.grants
    ADD CONSTRAINT grants_ended_grant_id_key UNIQUE (ended_grant_id);
ALTER TABLE ONLY public.grants
    ADD CONSTRAINT grants_pkey PRIMARY KEY (id);
ALTER TABLE ONLY public.idempotency_keys
    ADD CONSTRAINT idempotency_keys_pkey PRIMARY KEY (user_id, endpoint, key);
ALTER TABLE ONLY public.market_quotes
    ADD CONSTRAINT market_quotes_pkey PRIMARY KEY (snapshot_id, underlying_id);
ALTER TABLE ONLY public.market_snapshots
    ADD CONSTRAINT market_snapshots_desk_id_id_key UNIQUE (desk_id, id);
ALTER TABLE ONLY public.market_snapshots
    ADD CONSTRAINT market_snapshots_pkey PRIMARY KEY (id);
ALTER TABLE ONLY public.memberships
    ADD CONSTRAINT memberships_desk_id_user_id_key UNIQUE (desk_id, user_id);
ALTER TABLE ONLY public.memberships
    ADD CONSTRAINT memberships_pkey PRIMARY KEY (id);
ALTER TABLE ONLY public.pricing_policies
    ADD CONSTRAINT pricing_policies_desk_id_id_key UNIQUE (desk_id, id);
ALTER TABLE ONLY public.pricing_policies
    ADD CONSTRAINT pricing_policies_desk_id_number_key UNIQUE (desk_id, number);
ALTER TABLE ONLY public.pricing_policies
    ADD CONSTRAINT pricing_policies_pkey PRIMARY KEY (id);
ALTER TABLE ONLY public.quotes
    ADD CONSTRAINT quotes_desk_id_number_key UNIQUE (desk_id, number);
ALTER TABLE ONLY public.quotes
    ADD CONSTRAINT quotes_pkey PRIMARY KEY (id);
ALTER TABLE ONLY public.run_books
    ADD CONSTRAINT run_books_pkey PRIMARY KEY (run_id, book_id);
ALTER TABLE ONLY public.run_chunks
    ADD CONSTRAINT run_chunks_pkey PRIMARY KEY (run_id, number);
ALTER TABLE ONLY public.run_exceptions
    ADD CONSTRAINT run_exceptions_pkey PRIMARY KEY (id);
ALTER TABLE ONLY public.run_exceptions
    ADD CONSTRAINT run_exceptions_run_id_trade_id_key UNIQUE (run_id, trade_id);
ALTER TABLE ONLY public.schema_migrations
    ADD CONSTRAINT schema_migrations_pkey PRIMARY KEY (name);
ALTER TABLE ONLY public.sessions
    ADD CONSTRAINT sessions_pkey PRIMARY KEY (id);
ALTER TABLE ONLY public.studies
    ADD CONSTRAINT studies_desk_id_ordinal_key UNIQUE (desk_id, ordinal);
ALTER TABLE ONLY public.studies
    ADD CONSTRAINT studies_pkey PRIMARY KEY (id);
ALTER TABLE ONLY public.study_rows
    ADD CONSTRAINT study_rows_pkey PRIMARY KEY (study_id, route, ordinal);
ALTER TABLE ONLY public.trade_versions
    ADD CONSTRAINT trade_versions_pkey PRIMARY KEY (id);
ALTER TABLE ONLY public.trade_versions
    ADD CONSTRAINT trade_versions_trade_id_id_key UNIQUE (trade_id, id);
ALTER TABLE ONLY public.trade_versions
    ADD CONSTRAINT trade_versions_trade_id_number_key UNIQUE (trade_id, number);
ALTER TABLE ONLY public.trades
    ADD CONSTRAINT trades_desk_id_id_key UNIQUE (desk_id, id);
ALTER TABLE ONLY public.trades
    ADD CONSTRAINT trades_desk_id_ordinal_key UNIQUE (desk_id, ordinal);
ALTER TABLE ONLY public.trades
    ADD CONSTRAINT trades_pkey PRIMARY KEY (id);
ALTER TABLE ONLY public.underlyings
    ADD CONSTRAINT underlyings_desk_id_id_key UNIQUE (desk_id, id);
ALTER TABLE ONLY public.underlyings
    ADD CONSTRAINT underlyings_desk_id_symbol_key UNIQUE (desk_id, symbol);
ALTER TABLE ONLY public.underlyings
    ADD CONSTRAINT underlyings_pkey PRIMARY KEY (id);
ALTER TABLE ONLY public.users
    ADD CONSTRAINT users_email_key UNIQUE (email);
ALTER TABLE ONLY public.users
    ADD CONSTRAINT users_pkey PRIMARY KEY (id);
ALTER TABLE ONLY public.valuation_runs
    ADD CONSTRAINT valuation_runs_desk_id_id_key UNIQUE (desk_id, id);
ALTER TABLE ONLY public.valuation_runs
    ADD CONSTRAINT valuation_runs_desk_id_ordinal_key UNIQUE (desk_id, ordinal);
ALTER TABLE ONLY public.valuation_runs
    ADD CONSTRAINT valuation_runs_id_is_active_key UNIQUE (id, is_active);
ALTER TABLE ONLY public.valuation_runs
    ADD CONSTRAINT valuation_runs_pkey PRIMARY KEY (id);
CREATE INDEX chain_anchors_chain ON public.chain_anchors USING btree (chain, "position", id);
CREATE INDEX chain_entries_book ON public.chain_entries USING btree (chain, book_id, valued_at, "position") WHERE (role = 'primary'::text);
CREATE INDEX chain_entries_run ON public.chain_entries USING btree (chain, run_number, valued_at, "position") WHERE (role = 'primary'::text);
CREATE INDEX chain_entries_subject ON public.chain_entries USING btree (chain, subject_id, "position") WHERE (kind <> 'valuation'::text);
CREATE INDEX chain_entries_trade ON public.chain_entries USING btree (chain, trade_number, valued_at, "position") WHERE (role = 'primary'::text);
CREATE INDEX chain_entries_underlying ON public.chain_entries USING btree (chain, underlying_id, valued_at, "position") WHERE (role = 'primary'::text);
CREATE UNIQUE INDEX chain_entries_valuation ON public.chain_entries USING btree (run_id, trade_version_id, route) WHERE (kind = 'valuation'::text);
CREATE INDEX chain_entries_valued ON public.chain_entries USING btree (chain, valued_at, "position") WHERE (role = 'primary'::text);
CREATE INDEX chain_entries_verdict ON public.chain_entries USING btree (chain, verdict, valued_at, "position") WHERE (role = 'primary'::text);
CREATE INDEX chain_heads_desk_id ON public.chain_heads USING btree (desk_id);
CREATE INDEX chain_verifications_desk_id ON public.chain_verifications USING btree (desk_id, started_at DESC, id DESC);
CREATE INDEX exports_desk_id ON public.exports USING btree (desk_id, created_at DESC, id DESC);
CREATE INDEX grants_desk_id_made_at ON public.grants USING btree (desk_id, made_at DESC, id DESC);
CREATE INDEX grants_desk_id_subject_id ON public.grants USING btree (desk_id, subject_id, made_at DESC, id DESC);
CREATE INDEX idempotency_keys_created_at ON public.idempotency_keys USING btree (created_at);
CREATE UNIQUE INDEX market_snapshots_approved ON public.market_snapshots USING btree (desk_id, date) WHERE (status = 'approved'::text);
CREATE UNIQUE INDEX market_snapshots_draft ON public.market_snapshots USING btree (desk_id, date) WHERE (status = 'draft'::text);
CREATE INDEX market_snapshots_listed ON public.market_snapshots USING btree (desk_id, date, entered_at, id);
CREATE INDEX memberships_user_id ON public.memberships USING btree (user_id);
CREATE UNIQUE INDEX pricing_policies_approved ON public.pricing_policies USING btree (desk_id) WHERE (status = 'approved'::text);
CREATE UNIQUE INDEX pricing_policies_draft ON public.pricing_policies USING btree (desk_id) WHERE (status = 'draft'::text);
CREATE INDEX quotes_desk_id_created_at ON public.quotes USING btree (desk_id, created_at DESC, id DESC);
CREATE UNIQUE INDEX run_books_active ON public.run_books USING btree (book_id) WHERE is_active;
CREATE INDEX run_books_book_id ON public.run_books USING btree (book_id, run_id);
CREATE INDEX run_exceptions_order ON public.run_exceptions USING btree (run_id, state DESC, gravity, descent, id);
CREATE INDEX run_exceptions_study_id ON public.run_exceptions USING btree (study_id) WHERE (study_id IS NOT NULL);
CREATE INDEX run_exceptions_trade_id ON public.run_exceptions USING btree (trade_id);
CREATE INDEX sessions_expires_at ON public.sessions USING btree (expires_at);
CREATE INDEX sessions_user_id ON public.sessions USING btree (user_id);
CREATE INDEX studies_desk_id ON public.studies USING btree (desk_id, created_at DESC, id DESC);
CREATE INDEX studies_quote_id ON public.studies USING btree (quote_id) WHERE (quote_id IS NOT NULL);
CREATE INDEX studies_trade_id ON public.studies USING btree (trade_id) WHERE (trade_id IS NOT NULL);
CREATE UNIQUE INDEX trade_versions_approved ON public.trade_versions USING btree (trade_id) WHERE (state = 'approved'::text);
CREATE UNIQUE INDEX trade_versions_waiting ON public.trade_versions USING btree (trade_id) WHERE (state = 'proposed'::text);
CREATE INDEX trades_book_id_expiry_at ON public.trades USING btree (book_id, expiry_at, id);
CREATE INDEX trades_book_id_ordinal ON public.trades USING btree (book_id, ordinal, id);
CREATE INDEX trades_desk_id_expiry_at ON public.trades USING btree (desk_id, expiry_at, id);
CREATE INDEX trades_waiting ON public.trades USING btree (desk_id, ordinal) WHERE (status = ANY (ARRAY['proposed'::text, 'amended'::text]));
CREATE INDEX valuation_runs_desk_id ON public.valuation_runs USING btree (desk_id, started_at DESC, id DESC);
CREATE INDEX valuation_runs_rerun_of_id ON public.valuation_runs USING btree (rerun_of_id) WHERE (rerun_of_id IS NOT NULL);
CREATE TRIGGER guard_row BEFORE INSERT OR DELETE OR UPDATE ON public.market_quotes FOR EACH ROW EXECUTE FUNCTION public.guard_market_quote();
ALTER TABLE public.market_quotes ENABLE ALWAYS TRIGGER guard_row;
CREATE TRIGGER guard_row BEFORE INSERT OR DELETE OR UPDATE ON public.market_snapshots FOR EACH ROW EXECUTE FUNCTION public.guard_approved();
ALTER TABLE public.market_snapshots ENABLE ALWAYS TRIGGER guard_row;
CREATE TRIGGER guard_row BEFORE INSERT OR DELETE OR UPDATE ON public.pricing_policies FOR EACH ROW EXECUTE FUNCTION public.guard_approved();
ALTER TABLE public.pricing_policies ENABLE ALWAYS TRIGGER guard_row;
CREATE TRIGGER guard_row BEFORE DELETE OR UPDATE ON public.run_chunks FOR EACH ROW EXECUTE FUNCTION public.guard_settled();
ALTER TABLE public.run_chunks ENABLE ALWAYS TRIGGER guard_row;
CREATE TRIGGER guard_row BEFORE DELETE OR UPDATE ON public.run_exceptions FOR EACH ROW EXECUTE FUNCTION public.guard_settled();
ALTER TABLE public.run_exceptions ENABLE ALWAYS TRIGGER guard_row;
CREATE TRIGGER guard_row BEFORE DELETE OR UPDATE ON public.valuation_runs FOR EACH ROW EXECUTE FUNCTION public.guard_settled();
ALTER TABLE public.valuation_runs ENABLE ALWAYS TRIGGER guard_row;
CREATE TRIGGER guard_truncate BEFORE TRUNCATE ON public.market_quotes FOR EACH STATEMENT EXECUTE FUNCTION public.guard_truncate();
ALTER TABLE public.market_quotes ENABLE ALWAYS TRIGGER guard_truncate;
CREATE TRIGGER guard_truncate BEFORE TRUNCATE ON public.market_snapshots FOR EACH STATEMENT EXECUTE FUNCTION public.guard_truncate();
ALTER TABLE public.market_snapshots ENABLE ALWAYS TRIGGER guard_truncate;
CREATE TRIGGER guard_truncate BEFORE TRUNCATE ON public.pricing_policies FOR EACH STATEMENT EXECUTE FUNCTION public.guard_truncate();
ALTER TABLE public.pricing_policies ENABLE ALWAYS TRIGGER guard_truncate;
CREATE TRIGGER refuse_row BEFORE DELETE OR UPDATE ON public.chain_anchors FOR EACH ROW EXECUTE FUNCTION public.refuse_change();
ALTER TABLE public.chain_anchors ENABLE ALWAYS TRIGGER refuse_row;
CREATE TRIGGER refuse_row BEFORE DELETE OR UPDATE ON public.chain_entries FOR EACH ROW EXECUTE FUNCTION public.refuse_change();
ALTER TABLE public.chain_entries ENABLE ALWAYS TRIGGER refuse_row;
CREATE TRIGGER refuse_row BEFORE DELETE ON public.chain_heads FOR EACH ROW EXECUTE FUNCTION public.refuse_change();
ALTER TABLE public.chain_heads ENABLE ALWAYS TRIGGER refuse_row;
CREATE TRIGGER refuse_step_back BEFORE UPDATE ON public.chain_heads FOR EACH ROW EXECUTE FUNCTION public.refuse_step_back();
ALTER TABLE public.chain_heads ENABLE ALWAYS TRIGGER refuse_step_back;
CREATE TRIGGER refuse_truncate BEFORE TRUNCATE ON public.chain_anchors FOR EACH STATEMENT EXECUTE FUNCTION public.refuse_change();
ALTER TABLE public.chain_anchors ENABLE ALWAYS TRIGGER refuse_truncate;
CREATE TRIGGER refuse_truncate BEFORE TRUNCATE ON public.chain_entries FOR EACH STATEMENT EXECUTE FUNCTION public.refuse_change();
ALTER TABLE public.chain_entries ENABLE ALWAYS TRIGGER refuse_truncate;
CREATE TRIGGER refuse_truncate BEFORE TRUNCATE ON public.chain_heads FOR EACH STATEMENT EXECUTE FUNCTION public.refuse_change();
ALTER TABLE public.chain_heads ENABLE ALWAYS TRIGGER refuse_truncate;
CREATE TRIGGER start_chains AFTER INSERT ON public.desks FOR EACH ROW EXECUTE FUNCTION public.start_chains();
ALTER TABLE ONLY public.books
    ADD CONSTRAINT books_created_by_id_fkey FOREIGN KEY (created_by_id) REFERENCES public.users(id);
ALTER TABLE ONLY public.books
    ADD CONSTRAINT books_desk_id_fkey FOREIGN KEY (desk_id) REFERENCES public.desks(id);
ALTER TABLE ONLY public.chain_anchors
    ADD CONSTRAINT chain_anchors_chain_fkey FOREIGN KEY (chain) REFERENCES public.chain_heads(chain);
ALTER TABLE ONLY public.chain_entries
    ADD CONSTRAINT chain_entries_chain_fkey FOREIGN KEY (chain) REFERENCES public.chain_heads(chain);
ALTER TABLE ONLY public.chain_heads
    ADD CONSTRAINT chain_heads_desk_id_fkey FOREIGN KEY (desk_id) REFERENCES public.desks(id);
ALTER TABLE ONLY public.chain_verifications
    ADD CONSTRAINT chain_verifications_desk_id_fkey FOREIGN KEY (desk_id) REFERENCES public.desks(id);
ALTER TABLE ONLY public.chain_verifications
    ADD CONSTRAINT chain_verifications_started_by_id_fkey FOREIGN KEY (started_by_id) REFERENCES public.users(id);
ALTER TABLE ONLY public.exports
    ADD CONSTRAINT exports_created_by_id_fkey FOREIGN KEY (created_by_id) REFERENCES public.users(id);
ALTER TABLE ONLY public.exports
    ADD CONSTRAINT exports_desk_id_fkey FOREIGN KEY (desk_id) REFERENCES public.desks(id);
ALTER TABLE ONLY public.grants
    ADD CONSTRAINT grants_desk_id_ended_grant_id_fkey FOREIGN KEY (desk_id, ended_grant_id) REFERENCES public.grants(desk_id, id);
ALTER TABLE ONLY public.grants
    ADD CONSTRAINT grants_desk_id_fkey FOREIGN KEY (desk_id) REFERENCES public.desks(id);
ALTER TABLE ONLY public.grants
    ADD CONSTRAINT grants_desk_id_subject_id_fkey FOREIGN KEY (desk_id, subject_id) REFERENCES public.memberships(desk_id, user_id);
ALTER TABLE ONLY public.grants
    ADD CONSTRAINT grants_made_by_id_fkey FOREIGN KEY (made_by_id) REFERENCES public.users(id);
ALTER TABLE ONLY public.idempotency_keys
    ADD CONSTRAINT idempotency_keys_user_id_fkey FOREIGN KEY (user_id) REFERENCES public.users(id);
ALTER TABLE ONLY public.market_quotes
    ADD CONSTRAINT market_quotes_desk_id_snapshot_id_fkey FOREIGN KEY (desk_id, snapshot_id) REFERENCES public.market_snapshots(desk_id, id);
ALTER TABLE ONLY public.market_quotes
    ADD CONSTRAINT market_quotes_desk_id_underlying_id_fkey FOREIGN KEY (desk_id, underlying_id) REFERENCES public.underlyings(desk_id, id);
ALTER TABLE ONLY public.market_snapshots
    ADD CONSTRAINT market_snapshots_approved_by_id_fkey FOREIGN KEY (approved_by_id) REFERENCES public.users(id);
ALTER TABLE ONLY public.market_snapshots
    ADD CONSTRAINT market_snapshots_desk_id_fkey FOREIGN KEY (desk_id) REFERENCES public.desks(id);
ALTER TABLE ONLY public.market_snapshots
    ADD CONSTRAINT market_snapshots_desk_id_restates_id_fkey FOREIGN KEY (desk_id, restates_id) REFERENCES public.market_snapshots(desk_id, id);
ALTER TABLE ONLY public.market_snapshots
    ADD CONSTRAINT market_snapshots_desk_id_superseded_by_id_fkey FOREIGN KEY (desk_id, superseded_by_id) REFERENCES public.market_snapshots(desk_id, id) DEFERRABLE INITIALLY DEFERRED;
ALTER TABLE ONLY public.market_snapshots
    ADD CONSTRAINT market_snapshots_entered_by_id_fkey FOREIGN KEY (entered_by_id) REFERENCES public.users(id);
ALTER TABLE ONLY public.memberships
    ADD CONSTRAINT memberships_desk_id_fkey FOREIGN KEY (desk_id) REFERENCES public.desks(id);
ALTER TABLE ONLY public.memberships
    ADD CONSTRAINT memberships_user_id_fkey FOREIGN KEY (user_id) REFERENCES public.users(id);
ALTER TABLE ONLY public.pricing_policies
    ADD CONSTRAINT pricing_policies_approved_by_id_fkey FOREIGN KEY (approved_by_id) REFERENCES public.users(id);
ALTER TABLE ONLY public.pricing_policies
    ADD CONSTRAINT pricing_policies_author_id_fkey FOREIGN KEY (author_id) REFERENCES public.users(id);
ALTER TABLE ONLY public.pricing_policies
    ADD CONSTRAINT pricing_policies_desk_id_fkey FOREIGN KEY (desk_id) REFERENCES public.desks(id);
ALTER TABLE ONLY public.pricing_policies
    ADD CONSTRAINT pricing_policies_desk_id_superseded_by_id_fkey FOREIGN KEY (desk_id, superseded_by_id) REFERENCES public.pricing_policies(desk_id, id) DEFERRABLE INITIALLY DEFERRED;
ALTER TABLE ONLY public.quotes
    ADD CONSTRAINT quotes_created_by_id_fkey FOREIGN KEY (created_by_id) REFERENCES public.users(id);
ALTER TABLE ONLY public.quotes
    ADD CONSTRAINT quotes_desk_id_fkey FOREIGN KEY (desk_id) REFERENCES public.desks(id);
ALTER TABLE ONLY public.quotes
    ADD CONSTRAINT quotes_desk_id_snapshot_id_fkey FOREIGN KEY (desk_id, snapshot_id) REFERENCES public.market_snapshots(desk_id, id);
ALTER TABLE ONLY public.quotes
    ADD CONSTRAINT quotes_desk_id_underlying_id_fkey FOREIGN KEY (desk_id, underlying_id) REFERENCES public.underlyings(desk_id, id);
ALTER TABLE ONLY public.run_books
    ADD CONSTRAINT run_books_desk_id_book_id_fkey FOREIGN KEY (desk_id, book_id) REFERENCES public.books(desk_id, id);
ALTER TABLE ONLY public.run_books
    ADD CONSTRAINT run_books_desk_id_run_id_fkey FOREIGN KEY (desk_id, run_id) REFERENCES public.valuation_runs(desk_id, id);
ALTER TABLE ONLY public.run_books
    ADD CONSTRAINT run_books_run_id_is_active_fkey FOREIGN KEY (run_id, is_active) REFERENCES public.valuation_runs(id, is_active) ON UPDATE CASCADE;
ALTER TABLE ONLY public.run_chunks
    ADD CONSTRAINT run_chunks_run_id_fkey FOREIGN KEY (run_id) REFERENCES public.valuation_runs(id);
ALTER TABLE ONLY public.run_exceptions
    ADD CONSTRAINT run_exceptions_answered_by_id_fkey FOREIGN KEY (answered_by_id) REFERENCES public.users(id);
ALTER TABLE ONLY public.run_exceptions
    ADD CONSTRAINT run_exceptions_desk_id_rerun_id_fkey FOREIGN KEY (desk_id, rerun_id) REFERENCES public.valuation_runs(desk_id, id);
ALTER TABLE ONLY public.run_exceptions
    ADD CONSTRAINT run_exceptions_desk_id_run_id_fkey FOREIGN KEY (desk_id, run_id) REFERENCES public.valuation_runs(desk_id, id);
ALTER TABLE ONLY public.run_exceptions
    ADD CONSTRAINT run_exceptions_desk_id_trade_id_fkey FOREIGN KEY (desk_id, trade_id) REFERENCES public.trades(desk_id, id);
ALTER TABLE ONLY public.run_exceptions
    ADD CONSTRAINT run_exceptions_study_id_fkey FOREIGN KEY (study_id) REFERENCES public.studies(id);
ALTER TABLE ONLY public.run_exceptions
    ADD CONSTRAINT run_exceptions_trade_id_trade_version_id_fkey FOREIGN KEY (trade_id, trade_version_id) REFERENCES public.trade_versions(trade_id, id);
ALTER TABLE ONLY public.sessions
    ADD CONSTRAINT sessions_user_id_fkey FOREIGN KEY (user_id) REFERENCES public.users(id);
ALTER TABLE ONLY public.studies
    ADD CONSTRAINT studies_decided_by_id_fkey FOREIGN KEY (decided_by_id) REFERENCES public.users(id);
ALTER TABLE ONLY public.studies
    ADD CONSTRAINT studies_desk_id_fkey FOREIGN KEY (desk_id) REFERENCES public.desks(id);
ALTER TABLE ONLY public.studies
    ADD CONSTRAINT studies_desk_id_underlying_id_fkey FOREIGN KEY (desk_id, underlying_id) REFERENCES public.underlyings(desk_id, id);
ALTER TABLE ONLY public.studies
    ADD CONSTRAINT studies_quote_id_fkey FOREIGN KEY (quote_id) REFERENCES public.quotes(id);
ALTER TABLE ONLY public.studies
    ADD CONSTRAINT studies_started_by_id_fkey FOREIGN KEY (started_by_id) REFERENCES public.users(id);
ALTER TABLE ONLY public.studies
    ADD CONSTRAINT studies_trade_id_fkey FOREIGN KEY (trade_id) REFERENCES public.trades(id);
ALTER TABLE ONLY public.studies
    ADD CONSTRAINT studies_trade_version_id_fkey FOREIGN KEY (trade_version_id) REFERENCES public.trade_versions(id);
ALTER TABLE ONLY public.study_rows
    ADD CONSTRAINT study_rows_study_id_fkey FOREIGN KEY (study_id) REFERENCES public.studies(id);
ALTER TABLE ONLY public.trade_versions
    ADD CONSTRAINT trade_versions_decided_by_id_fkey FOREIGN KEY (decided_by_id) REFERENCES public.users(id);
ALTER TABLE ONLY public.trade_versions
    ADD CONSTRAINT trade_versions_desk_id_trade_id_fkey FOREIGN KEY (desk_id, trade_id) REFERENCES public.trades(desk_id, id);
ALTER TABLE ONLY public.trade_versions
    ADD CONSTRAINT trade_versions_desk_id_underlying_id_fkey FOREIGN KEY (desk_id, underlying_id) REFERENCES public.underlyings(desk_id, id);
ALTER TABLE ONLY public.trade_versions
    ADD CONSTRAINT trade_versions_proposed_by_id_fkey FOREIGN KEY (proposed_by_id) REFERENCES public.users(id);
ALTER TABLE ONLY public.trade_versions
    ADD CONSTRAINT trade_versions_quote_id_fkey FOREIGN KEY (quote_id) REFERENCES public.quotes(id);
ALTER TABLE ONLY public.trades
    ADD CONSTRAINT trades_desk_id_book_id_fkey FOREIGN KEY (desk_id, book_id) REFERENCES public.books(desk_id, id);
ALTER TABLE ONLY public.trades
    ADD CONSTRAINT trades_desk_id_fkey FOREIGN KEY (desk_id) REFERENCES public.desks(id);
ALTER TABLE ONLY public.trades
    ADD CONSTRAINT trades_desk_id_underlying_id_fkey FOREIGN KEY (desk_id, underlying_id) REFERENCES public.underlyings(desk_id, id);
ALTER TABLE ONLY public.trades
    ADD CONSTRAINT trades_id_latest_version_id_fkey FOREIGN KEY (id, latest_version_id) REFERENCES public.trade_versions(trade_id, id) DEFERRABLE INITIALLY DEFERRED;
ALTER TABLE ONLY public.trades
    ADD CONSTRAINT trades_id_live_version_id_fkey FOREIGN KEY (id, live_version_id) REFERENCES public.trade_versions(trade_id, id) DEFERRABLE INITIALLY DEFERRED;
ALTER TABLE ONLY public.trades
    ADD CONSTRAINT trades_proposed_by_id_fkey FOREIGN KEY (proposed_by_id) REFERENCES public.users(id);
ALTER TABLE ONLY public.underlyings
    ADD CONSTRAINT underlyings_desk_id_fkey FOREIGN KEY (desk_id) REFERENCES public.desks(id);
ALTER TABLE ONLY public.valuation_runs
    ADD CONSTRAINT valuation_runs_cancelled_by_id_fkey FOREIGN KEY (cancelled_by_id) REFERENCES public.users(id);
ALTER TABLE ONLY public.valuation_runs
    ADD CONSTRAINT valuation_runs_desk_id_fkey FOREIGN KEY (desk_id) REFERENCES public.desks(id);
ALTER TABLE ONLY public.valuation_runs
    ADD CONSTRAINT valuation_runs_desk_id_policy_id_fkey FOREIGN KEY (desk_id, policy_id) REFERENCES public.pricing_policies(desk_id, id);
ALTER TABLE ONLY public.valuation_runs
    ADD CONSTRAINT valuation_runs_desk_id_rerun_of_id_fkey FOREIGN KEY (desk_id, rerun_of_id) REFERENCES public.valuation_runs(desk_id, id);
ALTER TABLE ONLY public.valuation_runs
    ADD CONSTRAINT valuation_runs_desk_id_snapshot_id_fkey FOREIGN KEY (desk_id, snapshot_id) REFERENCES public.market_snapshots(desk_id, id);
ALTER TABLE ONLY public.valuation_runs
    ADD CONSTRAINT valuation_runs_signed_off_by_id_fkey FOREIGN KEY (signed_off_by_id) REFERENCES public.users(id);
ALTER TABLE ONLY public.valuation_runs
    ADD CONSTRAINT valuation_runs_started_by_id_fkey FOREIGN KEY (started_by_id) REFERENCES public.users(id);
REVOKE USAGE ON SCHEMA public FROM PUBLIC;
GRANT ALL ON SCHEMA public TO owner;
GRANT USAGE ON SCHEMA public TO app;
REVOKE ALL ON FUNCTION public.append(chain_name text, bodies text[]) FROM PUBLIC;
GRANT ALL ON FUNCTION public.append(chain_name text, bodies text[]) TO app;
REVOKE ALL ON FUNCTION public.chain_hash(previous text, chain text, pos bigint, at text, body text) FROM PUBLIC;
REVOKE ALL ON FUNCTION public.guard_settled() FROM PUBLIC;
REVOKE ALL ON FUNCTION public.lock_chain(chain_name text) FROM PUBLIC;
GRANT ALL ON FUNCTION public.lock_chain(chain_name text) TO app;
REVOKE ALL ON FUNCTION public.refuse_change() FROM PUBLIC;
REVOKE ALL ON FUNCTION public.refuse_step_back() FROM PUBLIC;
REVOKE ALL ON FUNCTION public.start_chains() FROM PUBLIC;
GRANT SELECT,INSERT ON TABLE public.books TO app;
GRANT UPDATE(name) ON TABLE public.books TO app;
GRANT UPDATE(archived_at) ON TABLE public.books TO app;
GRANT SELECT,INSERT ON TABLE public.chain_anchors TO app;
GRANT SELECT ON TABLE public.chain_entries TO app;
GRANT SELECT ON TABLE public.chain_heads TO app;
GRANT SELECT,INSERT ON TABLE public.chain_verifications TO app;
GRANT UPDATE(status) ON TABLE public.chain_verifications TO app;
GRANT UPDATE(total) ON TABLE public.chain_verifications TO app;
GRANT UPDATE(checked) ON TABLE public.chain_verifications TO app;
GRANT UPDATE(anchors) ON TABLE public.chain_verifications TO app;
GRANT UPDATE(break_kind) ON TABLE public.chain_verifications TO app;
GRANT UPDATE(break_position) ON TABLE public.chain_verifications TO app;
GRANT UPDATE(finished_at) ON TABLE public.chain_verifications TO app;
GRANT SELECT,INSERT ON TABLE public.desks TO app;
GRANT UPDATE(last_quote_number) ON TABLE public.desks TO app;
GRANT UPDATE(last_trade_number) ON TABLE public.desks TO app;
GRANT UPDATE(last_run_number) ON TABLE public.desks TO app;
GRANT SELECT,INSERT ON TABLE public.exports TO app;
GRANT UPDATE(status) ON TABLE public.exports TO app;
GRANT UPDATE(done) ON TABLE public.exports TO app;
GRANT UPDATE(content) ON TABLE public.exports TO app;
GRANT UPDATE(sha256) ON TABLE public.exports TO app;
GRANT UPDATE(manifest) ON TABLE public.exports TO app;
GRANT UPDATE(ready_at) ON TABLE public.exports TO app;
GRANT SELECT,INSERT ON TABLE public.grants TO app;
GRANT SELECT,INSERT,DELETE ON TABLE public.idempotency_keys TO app;
GRANT SELECT,INSERT,DELETE ON TABLE public.market_quotes TO app;
GRANT SELECT,INSERT ON TABLE public.market_snapshots TO app;
GRANT UPDATE(date) ON TABLE public.market_snapshots TO app;
GRANT UPDATE(status) ON TABLE public.market_snapshots TO app;
GRANT UPDATE(approved_by_id) ON TABLE public.market_snapshots TO app;
GRANT UPDATE(approved_at) ON TABLE public.market_snapshots TO app;
GRANT UPDATE(version) ON TABLE public.market_snapshots TO app;
GRANT UPDATE(source) ON TABLE public.market_snapshots TO app;
GRANT UPDATE(saved_by_ids) ON TABLE public.market_snapshots TO app;
GRANT UPDATE(saved_at) ON TABLE public.market_snapshots TO app;
GRANT UPDATE(superseded_by_id) ON TABLE public.market_snapshots TO app;
GRANT SELECT,INSERT ON TABLE public.memberships TO app;
GRANT UPDATE(role) ON TABLE public.memberships TO app;
GRANT UPDATE(suspended_at) ON TABLE public.memberships TO app;
GRANT UPDATE(suspension_reason) ON TABLE public.memberships TO app;
GRANT UPDATE(version) ON TABLE public.memberships TO app;
GRANT SELECT,INSERT ON TABLE public.pricing_policies TO app;
GRANT UPDATE(status) ON TABLE public.pricing_policies TO app;
GRANT UPDATE(version) ON TABLE public.pricing_policies TO app;
GRANT UPDATE(primary_european) ON TABLE public.pricing_policies TO app;
GRANT UPDATE(check_european) ON TABLE public.pricing_policies TO app;
GRANT UPDATE(primary_american) ON TABLE public.pricing_policies TO app;
GRANT UPDATE(check_american) ON TABLE public.pricing_policies TO app;
GRANT UPDATE(sizes) ON TABLE public.pricing_policies TO app;
GRANT UPDATE(tolerance_share) ON TABLE public.pricing_policies TO app;
GRANT UPDATE(unit_tolerance) ON TABLE public.pricing_policies TO app;
GRANT UPDATE(money_tolerance) ON TABLE public.pricing_policies TO app;
GRANT UPDATE(reason) ON TABLE public.pricing_policies TO app;
GRANT UPDATE(saved_by_ids) ON TABLE public.pricing_policies TO app;
GRANT UPDATE(saved_at) ON TABLE public.pricing_policies TO app;
GRANT UPDATE(approved_by_id) ON TABLE public.pricing_policies TO app;
GRANT UPDATE(approved_at) ON TABLE public.pricing_policies TO app;
GRANT UPDATE(superseded_by_id) ON TABLE public.pricing_policies TO app;
GRANT SELECT,INSERT ON TABLE public.quotes TO app;
GRANT SELECT,INSERT ON TABLE public.run_books TO app;
GRANT SELECT,INSERT ON TABLE public.run_chunks TO app;
GRANT UPDATE(done_at) ON TABLE public.run_chunks TO app;
GRANT SELECT,INSERT ON TABLE public.run_exceptions TO app;
GRANT UPDATE(state) ON TABLE public.run_exceptions TO app;
GRANT UPDATE(answer_kind) ON TABLE public.run_exceptions TO app;
GRANT UPDATE(study_id) ON TABLE public.run_exceptions TO app;
GRANT UPDATE(override_value) ON TABLE public.run_exceptions TO app;
GRANT UPDATE(rerun_id) ON TABLE public.run_exceptions TO app;
GRANT UPDATE(reason) ON TABLE public.run_exceptions TO app;
GRANT UPDATE(answered_by_id) ON TABLE public.run_exceptions TO app;
GRANT UPDATE(answered_at) ON TABLE public.run_exceptions TO app;
GRANT SELECT ON TABLE public.schema_migrations TO app;
GRANT SELECT,INSERT,DELETE ON TABLE public.sessions TO app;
GRANT UPDATE(refresh_hash) ON TABLE public.sessions TO app;
GRANT UPDATE(stepped_up_at) ON TABLE public.sessions TO app;
GRANT UPDATE(rotated_at) ON TABLE public.sessions TO app;
GRANT UPDATE(ended_at) ON TABLE public.sessions TO app;
GRANT UPDATE(end_cause) ON TABLE public.sessions TO app;
GRANT SELECT,INSERT ON TABLE public.studies TO app;
GRANT UPDATE(orders) ON TABLE public.studies TO app;
GRANT UPDATE(status) ON TABLE public.studies TO app;
GRANT UPDATE(done) ON TABLE public.studies TO app;
GRANT UPDATE(version) ON TABLE public.studies TO app;
GRANT UPDATE(finished_at) ON TABLE public.studies TO app;
GRANT UPDATE(decided_by_id) ON TABLE public.studies TO app;
GRANT UPDATE(decided_at) ON TABLE public.studies TO app;
GRANT UPDATE(decision_comment) ON TABLE public.studies TO app;
GRANT SELECT,INSERT ON TABLE public.study_rows TO app;
GRANT SELECT,INSERT ON TABLE public.trade_versions TO app;
GRANT UPDATE(state) ON TABLE public.trade_versions TO app;
GRANT UPDATE(decided_by_id) ON TABLE public.trade_versions TO app;
GRANT UPDATE(decided_at) ON TABLE public.trade_versions TO app;
GRANT UPDATE(decision_reason) ON TABLE public.trade_versions TO app;
GRANT SELECT,INSERT ON TABLE public.trades TO app;
GRANT UPDATE(status) ON TABLE public.trades TO app;
GRANT UPDATE(live_version_id) ON TABLE public.trades TO app;
GRANT UPDATE(latest_version_id) ON TABLE public.trades TO app;
GRANT UPDATE(version) ON TABLE public.trades TO app;
GRANT UPDATE(expiry_at) ON TABLE public.trades TO app;
GRANT UPDATE(end_outcome) ON TABLE public.trades TO app;
GRANT UPDATE(end_date) ON TABLE public.trades TO app;
GRANT UPDATE(end_amount) ON TABLE public.trades TO app;
GRANT UPDATE(end_currency) ON TABLE public.trades TO app;
GRANT UPDATE(last_run_id) ON TABLE public.trades TO app;
GRANT UPDATE(last_snapshot_date) ON TABLE public.trades TO app;
GRANT UPDATE(last_value) ON TABLE public.trades TO app;
GRANT UPDATE(last_error) ON TABLE public.trades TO app;
GRANT UPDATE(last_verdict) ON TABLE public.trades TO app;
GRANT UPDATE(last_refuted) ON TABLE public.trades TO app;
GRANT UPDATE(last_total) ON TABLE public.trades TO app;
GRANT UPDATE(last_strip) ON TABLE public.trades TO app;
GRANT UPDATE(last_tolerance) ON TABLE public.trades TO app;
GRANT UPDATE(previous_value) ON TABLE public.trades TO app;
GRANT SELECT,INSERT ON TABLE public.underlyings TO app;
GRANT UPDATE(symbol) ON TABLE public.underlyings TO app;
GRANT UPDATE(name) ON TABLE public.underlyings TO app;
GRANT UPDATE(unit) ON TABLE public.underlyings TO app;
GRANT UPDATE(contract_size) ON TABLE public.underlyings TO app;
GRANT UPDATE(price_decimals) ON TABLE public.underlyings TO app;
GRANT UPDATE(tolerance) ON TABLE public.underlyings TO app;
GRANT UPDATE(archived_at) ON TABLE public.underlyings TO app;
GRANT SELECT,INSERT ON TABLE public.users TO app;
GRANT UPDATE(name) ON TABLE public.users TO app;
GRANT UPDATE(password_hash) ON TABLE public.users TO app;
GRANT SELECT,INSERT ON TABLE public.valuation_runs TO app;
GRANT UPDATE(status) ON TABLE public.valuation_runs TO app;
GRANT UPDATE(version) ON TABLE public.valuation_runs TO app;
GRANT UPDATE(done) ON TABLE public.valuation_runs TO app;
GRANT UPDATE(agree) ON TABLE public.valuation_runs TO app;
GRANT UPDATE(wide) ON TABLE public.valuation_runs TO app;
GRANT UPDATE(disagree) ON TABLE public.valuation_runs TO app;
GRANT UPDATE(one_route) ON TABLE public.valuation_runs TO app;
GRANT UPDATE(failed) ON TABLE public.valuation_runs TO app;
GRANT UPDATE(refuted) ON TABLE public.valuation_runs TO app;
GRANT UPDATE(totals) ON TABLE public.valuation_runs TO app;
GRANT UPDATE(finished_at) ON TABLE public.valuation_runs TO app;
GRANT UPDATE(cancelled_by_id) ON TABLE public.valuation_runs TO app;
GRANT UPDATE(cancelled_at) ON TABLE public.valuation_runs TO app;
GRANT UPDATE(signed_off_by_id) ON TABLE public.valuation_runs TO app;
GRANT UPDATE(signed_off_at) ON TABLE public.valuation_runs TO app;
GRANT UPDATE(sign_off_comment) ON TABLE public.valuation_runs TO app;
