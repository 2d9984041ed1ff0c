import type { Task } from 'graphile-worker';
import { removeOldSessions } from '../../services/sessions';
import { removeExpiredKeys } from '../../services/write-once';

/** Removes technical rows that have served their time; business records are never deleted. */
export const housekeeping: Task = async (_payload, { logger }) => {
  const keys = await removeExpiredKeys();
  const sessions = await removeOldSessions();
  logger.debug('technical rows removed', { keys, sessions });
};
