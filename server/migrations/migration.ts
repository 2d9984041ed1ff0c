import type { Client } from 'pg';

/** The role `app` as its address names it; the first migration makes it where it is absent. */
export type MigrationContext = { client: Client; appPassword: string };

/**
 * One step of the schema. Forward only, and never edited once it has landed. Every step runs as
 * the role `owner`, inside the transaction that all pending steps share.
 */
export type Migration = {
  name: string;
  up: (context: MigrationContext) => Promise<void>;
};
