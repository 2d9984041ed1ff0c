import pino from 'pino';
import { env } from './env';

/** A database's error carries its statement and values: people's data, which no log may hold. */
function errorOf(error: unknown) {
  if (!(error instanceof Error)) return error;
  const { name, message, stack } = error;
  return { type: name, message, stack, ...('code' in error ? { code: error.code } : {}) };
}

export const log = pino({ level: env.logLevel, base: undefined, serializers: { err: errorOf } });
