import type { Migration } from './migration';

/**
 * Files made of the history. The bytes themselves are kept, because the manifest signs these and
 * no others: made again by a later version of a library they might differ in one.
 */
export const exportFiles: Migration = {
  name: '0015-exports',
  async up({ client }) {
    await client.query(`
      CREATE TABLE exports (
        id uuid PRIMARY KEY,
        desk_id uuid NOT NULL REFERENCES desks,
        format text NOT NULL CHECK (format IN ('csv', 'xlsx')),
        filter jsonb NOT NULL CHECK (jsonb_typeof(filter) = 'object'),
        up_to_position bigint NOT NULL CHECK (up_to_position >= 0),
        status text NOT NULL CHECK (status IN ('queued', 'running', 'ready')),
        total integer NOT NULL CHECK (total >= 0),
        done integer NOT NULL CHECK (done >= 0),
        content bytea CHECK (octet_length(content) <= 33554432),
        sha256 text CHECK (sha256 ~ '^[0-9a-f]{64}$'),
        manifest jsonb CHECK (jsonb_typeof(manifest) = 'object'),
        created_by_id uuid NOT NULL REFERENCES users,
        created_at timestamptz(3) NOT NULL,
        ready_at timestamptz(3),
        CHECK ((content IS NOT NULL) = (status = 'ready')),
        CHECK ((content IS NULL) = (sha256 IS NULL)),
        CHECK ((content IS NULL) = (manifest IS NULL)),
        CHECK ((content IS NULL) = (ready_at IS NULL))
      );
      CREATE INDEX exports_desk_id ON exports (desk_id, created_at DESC, id DESC);
      GRANT SELECT, INSERT ON exports TO app;
      GRANT UPDATE (status, done, content, sha256, manifest, ready_at) ON exports TO app`);
  },
};
