/** The environment, read once. A process with a wrong one says everything that is wrong and ends. */
import path from 'node:path';
import { z } from 'zod';

const databaseUrl = z.url({
  protocol: /^postgres(ql)?$/,
  error: 'must be a postgres:// address',
});

const envSchema = z.object({
  DATABASE_URL: databaseUrl.refine((text) => new URL(text).username === 'app', {
    error: 'must sign in as the role app, which owns no table',
  }),
  DATABASE_OWNER_URL: databaseUrl.refine((text) => new URL(text).username !== 'app', {
    error: 'must sign in as a role that may act as owner, never as app',
  }),
  HOST: z.string().min(1).default('127.0.0.1'),
  PORT: z.coerce.number({ error: 'must be a port' }).int().min(0).max(65_535).default(4600),
  DRIFTLESS_CHECKOUT: z.string().min(1).default(process.cwd()),
  DRIFTLESS_KEYS_DIR: z.string({ error: 'must name the folder of the keys' }).min(1),
  DRIFTLESS_WEB_DIR: z.string().min(1).optional(),
  LOG_LEVEL: z
    .enum(['fatal', 'error', 'warn', 'info', 'debug', 'trace', 'silent'], {
      error: 'must be a level: fatal, error, warn, info, debug, trace or silent',
    })
    .default('info'),
  PASSWORD_COST: z.coerce
    .number({ error: 'must be a whole number' })
    .int()
    .min(4)
    .max(15)
    .default(12),
});

export const envKeys = Object.keys(envSchema.shape);

export type Env = {
  /** Serves requests; the role `app`. */
  databaseUrl: string;
  /** Migrates; a role that may make roles, or is a member of `owner`. */
  databaseOwnerUrl: string;
  host: string;
  port: number;
  /** Folder that the service runs from; health names it. */
  checkoutDir: string;
  keysDir: string;
  /** The web export. */
  webDir: string;
  logLevel: z.infer<typeof envSchema>['LOG_LEVEL'];
  /** Binary logarithm of bcrypt's rounds. */
  passwordCost: number;
};

/** Throws one error that names every setting that is missing or wrong. */
export function parseEnv(source: Record<string, string | undefined>): Env {
  const parsed = envSchema.safeParse(source);
  if (!parsed.success) {
    const lines = parsed.error.issues.map(({ path: [key], message }) =>
      source[String(key)] === undefined
        ? `  ${String(key)} is not set`
        : `  ${String(key)} ${message}`,
    );
    throw new Error(`The environment is not complete:\n${lines.join('\n')}`);
  }
  const values = parsed.data;
  return {
    databaseUrl: values.DATABASE_URL,
    databaseOwnerUrl: values.DATABASE_OWNER_URL,
    host: values.HOST,
    port: values.PORT,
    checkoutDir: values.DRIFTLESS_CHECKOUT,
    keysDir: values.DRIFTLESS_KEYS_DIR,
    webDir: values.DRIFTLESS_WEB_DIR ?? path.join(values.DRIFTLESS_CHECKOUT, 'dist'),
    logLevel: values.LOG_LEVEL,
    passwordCost: values.PASSWORD_COST,
  };
}

function readEnv(): Env {
  try {
    return parseEnv(process.env);
  } catch (error) {
    process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
    process.exit(78); // EX_CONFIG of sysexits.h
  }
}

export const env = readEnv();
