import { testEnvironment } from './environment';
import { runOnce } from 'graphile-worker';
import { logger } from '@/server/queue/logger';
import { taskList } from '@/server/queue/task-list';

/** Does every job that waits, as a worker would, and comes back when the queue is empty. */
export const workOff = (): Promise<void> =>
  runOnce({
    connectionString: testEnvironment.DATABASE_URL,
    taskList,
    logger,
    noHandleSignals: true,
  });
