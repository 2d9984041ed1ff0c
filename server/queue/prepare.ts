import { runMigrations } from 'graphile-worker';
import { logger } from './logger';

/**
 * Lays the queue's own tables, as the role that owns its schema. A worker would do so as it starts,
 * but requests put jobs in before any worker has ever run.
 */
export const prepareQueue = (appUrl: string): Promise<void> =>
  runMigrations({ connectionString: appUrl, logger });
