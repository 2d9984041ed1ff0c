import { existsSync } from 'node:fs';
import path from 'node:path';
import { ConnectionError, QueryTypes } from 'sequelize';
import type { z } from 'zod';
import { version } from '@/package.json';
import { engineVersion } from '@/pricing/index';
import type { healthSchema } from '@/shared/contracts/health';
import { sequelize } from '../database';
import { env } from '../env';
import { migrations } from '../migrations';
import { workerName } from '../queue/name';

export type Health = z.infer<typeof healthSchema>;

type DatabaseParts = { database: boolean; migrations: boolean; worker: boolean };

async function readDatabaseParts(): Promise<DatabaseParts> {
  const [{ present }] = await sequelize.query<{ present: boolean }>(
    "SELECT to_regclass('public.schema_migrations') IS NOT NULL AS present",
    { type: QueryTypes.SELECT },
  );
  if (!present) return { database: true, migrations: false, worker: false };
  const [{ taken, workers }] = await sequelize.query<{ taken: number; workers: number }>(
    `SELECT (SELECT count(*)::integer FROM schema_migrations WHERE name IN (:names)) AS taken,
            (SELECT count(*)::integer FROM pg_stat_activity
              WHERE datname = current_database() AND application_name = :workerName) AS workers`,
    {
      type: QueryTypes.SELECT,
      replacements: { names: migrations.map(({ name }) => name), workerName },
    },
  );
  return { database: true, migrations: taken === migrations.length, worker: workers > 0 };
}

async function findDatabaseParts(): Promise<DatabaseParts> {
  try {
    return await readDatabaseParts();
  } catch (error) {
    // Not there yet, or gone: that is what health is asked for.
    if (error instanceof ConnectionError)
      return { database: false, migrations: false, worker: false };
    throw error;
  }
}

export async function readHealth(): Promise<Health> {
  const web = existsSync(path.join(env.webDir, 'index.html'));
  const ready = { ...(await findDatabaseParts()), web };
  const state = (isReady: boolean) => (isReady ? 'ready' : 'waiting');
  return {
    status: state(Object.values(ready).every(Boolean)),
    parts: {
      database: state(ready.database),
      migrations: state(ready.migrations),
      web: state(ready.web),
      worker: state(ready.worker),
    },
    checkout: env.checkoutDir,
    version,
    engine: engineVersion,
  };
}
