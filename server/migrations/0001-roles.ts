import type { Client } from 'pg';
import type { Migration } from './migration';

/** Roles belong to the cluster, so that a database beside this one may make them at the same time. */
async function ensureRole(client: Client, name: string, options: string) {
  await client.query(`
    DO $ensure_role$
    BEGIN
      IF NOT EXISTS (SELECT FROM pg_roles WHERE rolname = '${name}') THEN
        CREATE ROLE ${name} ${options};
      END IF;
    EXCEPTION WHEN duplicate_object OR unique_violation THEN
      NULL;
    END
    $ensure_role$`);
}

/** The login must be able to act as a role to give it a schema; a superuser is already. */
const joinRole = (name: string) => `
  DO $join_role$
  BEGIN
    IF NOT pg_has_role(current_user, '${name}', 'MEMBER') THEN
      EXECUTE format('GRANT ${name} TO %I', current_user);
    END IF;
  END
  $join_role$`;

/**
 * `owner` owns the tables and nobody signs in as it; `app` serves requests, is no member of it and
 * makes nothing outside the queue's own schema. The queue would make its schema itself, but `app`
 * may not create one in the database, so schema and first table are laid here.
 */
export const roles: Migration = {
  name: '0001-roles',
  async up({ client, appPassword }) {
    await ensureRole(client, 'owner', 'NOLOGIN');
    await ensureRole(client, 'app', `LOGIN PASSWORD ${client.escapeLiteral(appPassword)}`);
    await client.query(joinRole('owner'));
    await client.query(joinRole('app'));
    await client.query(`
      REVOKE ALL ON SCHEMA public FROM PUBLIC;
      GRANT USAGE, CREATE ON SCHEMA public TO owner;
      GRANT USAGE ON SCHEMA public TO app;
      CREATE SCHEMA graphile_worker AUTHORIZATION app;
      SET LOCAL ROLE app;
      CREATE TABLE graphile_worker.migrations (
        id integer PRIMARY KEY,
        ts timestamptz NOT NULL DEFAULT now(),
        breaking boolean NOT NULL DEFAULT false
      );
      SET LOCAL ROLE owner;
      CREATE TABLE schema_migrations (
        name text PRIMARY KEY CHECK (name <> ''),
        run_at timestamptz NOT NULL DEFAULT now()
      );
      GRANT SELECT ON schema_migrations TO app`);
  },
};
