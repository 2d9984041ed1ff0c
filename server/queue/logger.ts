import { Logger } from 'graphile-worker';
import { log } from '../log';

const levels = { error: 'error', warning: 'warn', info: 'debug', debug: 'trace' } as const;

/** The queue speaks through the service's own log, one level lower: it says a lot in health. */
export const logger = new Logger((scope) => (level, message, meta) => {
  log[levels[level]]({ ...scope, ...meta }, message);
});
