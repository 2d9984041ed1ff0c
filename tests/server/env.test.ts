import { removeFolder, testEnvironment } from './support/environment';
import { spawnSync } from 'node:child_process';
import { readFileSync } from 'node:fs';
import path from 'node:path';
import { envKeys, parseEnv } from '@/server/env';

afterAll(removeFolder);

const root = path.join(__dirname, '..', '..');

test('an environment that is complete is read', () => {
  const env = parseEnv(testEnvironment);
  expect(env).toMatchObject({
    databaseUrl: testEnvironment.DATABASE_URL,
    host: '127.0.0.1',
    port: 0,
    passwordCost: 4,
  });
});

test('what is left out and has a usual value takes it', () => {
  const { DATABASE_URL, DATABASE_OWNER_URL, DRIFTLESS_KEYS_DIR } = testEnvironment;
  const env = parseEnv({ DATABASE_URL, DATABASE_OWNER_URL, DRIFTLESS_KEYS_DIR });
  expect(env).toMatchObject({ port: 4600, logLevel: 'info', passwordCost: 12 });
});

test.each([
  ['DATABASE_URL', undefined, 'is not set'],
  ['DATABASE_URL', 'mysql://app@localhost/x', 'must be a postgres:// address'],
  ['DATABASE_URL', 'postgres://postgres@localhost/x', 'must sign in as the role app'],
  ['DATABASE_OWNER_URL', 'postgres://app@localhost/x', 'never as app'],
  ['DRIFTLESS_KEYS_DIR', undefined, 'is not set'],
  ['PORT', 'http', 'PORT must be a port'],
  ['PORT', '70000', 'PORT'],
  ['LOG_LEVEL', 'loud', 'LOG_LEVEL must be a level'],
  ['PASSWORD_COST', '3', 'PASSWORD_COST'],
])('%s = %s is refused by name', (key, value, words) => {
  expect(() => parseEnv({ ...testEnvironment, [key]: value })).toThrow(words);
});

test('the process does not start with a wrong environment, and says all that is wrong', () => {
  const args = ['--require', 'tsx/cjs', path.join(root, 'server', 'main.ts')];
  const env: NodeJS.ProcessEnv = { NODE_ENV: 'test', PORT: 'x' };
  const { status, stderr } = spawnSync(process.execPath, args, {
    cwd: root,
    encoding: 'utf8',
    env,
  });
  expect(status).toBe(78);
  for (const key of ['DATABASE_URL', 'DATABASE_OWNER_URL', 'DRIFTLESS_KEYS_DIR', 'PORT'])
    expect(stderr).toContain(key);
}, 60_000);

test('the example names the same settings, and would start', () => {
  const lines = readFileSync(path.join(root, '.env.example'), 'utf8').split('\n');
  const pairs = lines.flatMap((line) => {
    const match = /^([A-Z_]+)=(.*)$/.exec(line);
    return match ? [[match[1], match[2]] as const] : [];
  });
  expect(pairs.map(([key]) => key).sort()).toEqual([...envKeys].sort());
  expect(() => parseEnv(Object.fromEntries(pairs))).not.toThrow();
});
