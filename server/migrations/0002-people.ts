import type { Migration } from './migration';

/**
 * Who there is, what they may do, and since when. Times carry milliseconds, as the service's own
 * clock does, so that a page's cursor names a row exactly.
 */
export const people: Migration = {
  name: '0002-people',
  async up({ client }) {
    await client.query(`
      CREATE TABLE users (
        id uuid PRIMARY KEY,
        email text NOT NULL UNIQUE CHECK (email = lower(email) AND email LIKE '%_@_%'),
        name text NOT NULL CHECK (name <> ''),
        password_hash text NOT NULL CHECK (password_hash <> ''),
        created_at timestamptz(3) NOT NULL
      );

      CREATE TABLE desks (
        id uuid PRIMARY KEY,
        name text NOT NULL UNIQUE CHECK (name <> ''),
        time_zone text NOT NULL CHECK (time_zone <> ''),
        expiry_cutoff text NOT NULL CHECK (expiry_cutoff ~ '^([01][0-9]|2[0-3]):[0-5][0-9]$'),
        last_quote_number integer NOT NULL DEFAULT 0 CHECK (last_quote_number >= 0),
        created_at timestamptz(3) NOT NULL
      );

      CREATE TABLE memberships (
        id uuid PRIMARY KEY,
        desk_id uuid NOT NULL REFERENCES desks,
        user_id uuid NOT NULL REFERENCES users,
        role text NOT NULL CHECK (role IN ('analyst', 'desk-head', 'risk-officer', 'auditor')),
        member_since date NOT NULL,
        suspended_at timestamptz(3),
        suspension_reason text CHECK (suspension_reason <> ''),
        version integer NOT NULL DEFAULT 0 CHECK (version >= 0),
        UNIQUE (desk_id, user_id),
        CHECK ((suspended_at IS NULL) = (suspension_reason IS NULL))
      );
      CREATE INDEX memberships_user_id ON memberships (user_id);

      -- Append-only: what a person may do follows from the role and from the rows in force here.
      CREATE TABLE grants (
        id uuid PRIMARY KEY,
        desk_id uuid NOT NULL REFERENCES desks,
        subject_id uuid NOT NULL,
        kind text NOT NULL CHECK (kind IN ('role-set', 'permission-granted',
          'permission-withdrawn', 'change-ended', 'suspended', 'reinstated')),
        permission text CHECK (permission <> ''),
        role text CHECK (role IN ('analyst', 'desk-head', 'risk-officer', 'auditor')),
        previous_role text
          CHECK (previous_role IN ('analyst', 'desk-head', 'risk-officer', 'auditor')),
        ends_on date,
        ended_grant_id uuid UNIQUE,
        reason text NOT NULL CHECK (reason <> ''),
        made_by_id uuid NOT NULL REFERENCES users,
        made_at timestamptz(3) NOT NULL,
        UNIQUE (desk_id, id),
        FOREIGN KEY (desk_id, subject_id) REFERENCES memberships (desk_id, user_id),
        FOREIGN KEY (desk_id, ended_grant_id) REFERENCES grants (desk_id, id),
        CHECK (made_by_id <> subject_id),
        CHECK ((role IS NOT NULL) = (kind = 'role-set')),
        CHECK (previous_role IS NULL OR kind = 'role-set'),
        CHECK ((permission IS NOT NULL)
          = (kind IN ('permission-granted', 'permission-withdrawn', 'change-ended'))),
        CHECK ((ended_grant_id IS NOT NULL) = (kind = 'change-ended')),
        CHECK (ends_on IS NULL OR kind IN ('permission-granted', 'permission-withdrawn'))
      );
      CREATE INDEX grants_desk_id_made_at ON grants (desk_id, made_at DESC, id DESC);
      CREATE INDEX grants_desk_id_subject_id ON grants (desk_id, subject_id, made_at DESC, id DESC);

      CREATE TABLE sessions (
        id uuid PRIMARY KEY,
        user_id uuid NOT NULL REFERENCES users,
        refresh_hash text NOT NULL CHECK (refresh_hash ~ '^[0-9a-f]{64}$'),
        stepped_up_at timestamptz(3) NOT NULL,
        created_at timestamptz(3) NOT NULL,
        rotated_at timestamptz(3) NOT NULL,
        expires_at timestamptz(3) NOT NULL CHECK (expires_at > created_at),
        ended_at timestamptz(3),
        end_cause text CHECK (end_cause IN ('signed-out', 'token-reused')),
        CHECK ((ended_at IS NULL) = (end_cause IS NULL))
      );
      CREATE INDEX sessions_user_id ON sessions (user_id);
      CREATE INDEX sessions_expires_at ON sessions (expires_at);

      CREATE TABLE idempotency_keys (
        user_id uuid NOT NULL REFERENCES users,
        endpoint text NOT NULL CHECK (endpoint <> ''),
        key uuid NOT NULL,
        request_hash text NOT NULL CHECK (request_hash ~ '^[0-9a-f]{64}$'),
        answer jsonb NOT NULL,
        created_at timestamptz(3) NOT NULL,
        PRIMARY KEY (user_id, endpoint, key)
      );
      CREATE INDEX idempotency_keys_created_at ON idempotency_keys (created_at);

      GRANT SELECT, INSERT ON users, desks, memberships, grants, sessions, idempotency_keys TO app;
      GRANT UPDATE (name, password_hash) ON users TO app;
      GRANT UPDATE (last_quote_number) ON desks TO app;
      GRANT UPDATE (role, suspended_at, suspension_reason, version) ON memberships TO app;
      GRANT UPDATE (refresh_hash, stepped_up_at, rotated_at, ended_at, end_cause) ON sessions TO app;
      GRANT DELETE ON sessions, idempotency_keys TO app`);
  },
};
