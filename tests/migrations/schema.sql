CREATE SCHEMA public;
COMMENT ON SCHEMA public IS 'standard public schema';
CREATE TABLE public.desks (
    id uuid NOT NULL,
    name text NOT NULL,
    time_zone text NOT NULL,
    expiry_cutoff text NOT NULL,
    last_quote_number integer DEFAULT 0 NOT NULL,
    created_at timestamp(3) with time zone NOT NULL,
    CONSTRAINT desks_expiry_cutoff_check CHECK ((expiry_cutoff ~ '^([01][0-9]|2[0-3]):[0-5][0-9]$'::text)),
    CONSTRAINT desks_last_quote_number_check CHECK ((last_quote_number >= 0)),
    CONSTRAINT desks_name_check CHECK ((name <> ''::text)),
    CONSTRAINT desks_time_zone_check CHECK ((time_zone <> ''::text))
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
    CONSTRAINT market_snapshots_check CHECK ((approved_by_id <> entered_by_id)),
    CONSTRAINT market_snapshots_check1 CHECK (((approved_by_id IS NULL) = (approved_at IS NULL))),
    CONSTRAINT market_snapshots_check2 CHECK (((approved_at IS NULL) = (status = 'draft'::text))),
    CONSTRAINT market_snapshots_status_check CHECK ((status = ANY (ARRAY['draft'::text, 'approved'::text, 'superseded'::text])))
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
ALTER TABLE ONLY public.desks
    ADD CONSTRAINT desks_name_key UNIQUE (name);
ALTER TABLE ONLY public.desks
    ADD CONSTRAINT desks_pkey PRIMARY KEY (id);
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
ALTER TABLE ONLY public.quotes
    ADD CONSTRAINT quotes_desk_id_number_key UNIQUE (desk_id, number);
ALTER TABLE ONLY public.quotes
    ADD CONSTRAINT quotes_pkey PRIMARY KEY (id);
ALTER TABLE ONLY public.schema_migrations
    ADD CONSTRAINT schema_migrations_pkey PRIMARY KEY (name);
ALTER TABLE ONLY public.sessions
    ADD CONSTRAINT sessions_pkey PRIMARY KEY (id);
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
CREATE INDEX grants_desk_id_made_at ON public.grants USING btree (desk_id, made_at DESC, id DESC);
CREATE INDEX grants_desk_id_subject_id ON public.grants USING btree (desk_id, subject_id, made_at DESC, id DESC);
CREATE INDEX idempotency_keys_created_at ON public.idempotency_keys USING btree (created_at);
CREATE UNIQUE INDEX market_snapshots_approved ON public.market_snapshots USING btree (desk_id, date) WHERE (status = 'approved'::text);
CREATE INDEX memberships_user_id ON public.memberships USING btree (user_id);
CREATE INDEX quotes_desk_id_created_at ON public.quotes USING btree (desk_id, created_at DESC, id DESC);
CREATE INDEX sessions_expires_at ON public.sessions USING btree (expires_at);
CREATE INDEX sessions_user_id ON public.sessions USING btree (user_id);
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
    ADD CONSTRAINT market_snapshots_entered_by_id_fkey FOREIGN KEY (entered_by_id) REFERENCES public.users(id);
ALTER TABLE ONLY public.memberships
    ADD CONSTRAINT memberships_desk_id_fkey FOREIGN KEY (desk_id) REFERENCES public.desks(id);
ALTER TABLE ONLY public.memberships
    ADD CONSTRAINT memberships_user_id_fkey FOREIGN KEY (user_id) REFERENCES public.users(id);
ALTER TABLE ONLY public.quotes
    ADD CONSTRAINT quotes_created_by_id_fkey FOREIGN KEY (created_by_id) REFERENCES public.users(id);
ALTER TABLE ONLY public.quotes
    ADD CONSTRAINT quotes_desk_id_fkey FOREIGN KEY (desk_id) REFERENCES public.desks(id);
ALTER TABLE ONLY public.quotes
    ADD CONSTRAINT quotes_desk_id_snapshot_id_fkey FOREIGN KEY (desk_id, snapshot_id) REFERENCES public.market_snapshots(desk_id, id);
ALTER TABLE ONLY public.quotes
    ADD CONSTRAINT quotes_desk_id_underlying_id_fkey FOREIGN KEY (desk_id, underlying_id) REFERENCES public.underlyings(desk_id, id);
ALTER TABLE ONLY public.sessions
    ADD CONSTRAINT sessions_user_id_fkey FOREIGN KEY (user_id) REFERENCES public.users(id);
ALTER TABLE ONLY public.underlyings
    ADD CONSTRAINT underlyings_desk_id_fkey FOREIGN KEY (desk_id) REFERENCES public.desks(id);
REVOKE USAGE ON SCHEMA public FROM PUBLIC;
GRANT ALL ON SCHEMA public TO owner;
GRANT USAGE ON SCHEMA public TO app;
GRANT SELECT,INSERT ON TABLE public.desks TO app;
GRANT UPDATE(last_quote_number) ON TABLE public.desks TO app;
GRANT SELECT,INSERT ON TABLE public.grants TO app;
GRANT SELECT,INSERT,DELETE ON TABLE public.idempotency_keys TO app;
GRANT SELECT,INSERT ON TABLE public.market_quotes TO app;
GRANT SELECT,INSERT ON TABLE public.market_snapshots TO app;
GRANT UPDATE(status) ON TABLE public.market_snapshots TO app;
GRANT UPDATE(approved_by_id) ON TABLE public.market_snapshots TO app;
GRANT UPDATE(approved_at) ON TABLE public.market_snapshots TO app;
GRANT SELECT,INSERT ON TABLE public.memberships TO app;
GRANT UPDATE(role) ON TABLE public.memberships TO app;
GRANT UPDATE(suspended_at) ON TABLE public.memberships TO app;
GRANT UPDATE(suspension_reason) ON TABLE public.memberships TO app;
GRANT UPDATE(version) ON TABLE public.memberships TO app;
GRANT SELECT,INSERT ON TABLE public.quotes TO app;
GRANT SELECT ON TABLE public.schema_migrations TO app;
GRANT SELECT,INSERT,DELETE ON TABLE public.sessions TO app;
GRANT UPDATE(refresh_hash) ON TABLE public.sessions TO app;
GRANT UPDATE(stepped_up_at) ON TABLE public.sessions TO app;
GRANT UPDATE(rotated_at) ON TABLE public.sessions TO app;
GRANT UPDATE(ended_at) ON TABLE public.sessions TO app;
GRANT UPDATE(end_cause) ON TABLE public.sessions TO app;
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
