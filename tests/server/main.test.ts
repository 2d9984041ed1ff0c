/** The process itself: it becomes ready from an empty database, and ends when it is told to. */
import {
  createEmptyDatabase,
  dropDatabase,
  removeFolder,
  testEnvironment,
} from './support/environment';
import { until } from './support/until';
import { fork, type ChildProcess } from 'node:child_process';
import { createServer } from 'node:net';
import path from 'node:path';

jest.setTimeout(240_000);

const root = path.join(__dirname, '..', '..');

beforeAll(async () => {
  await createEmptyDatabase();
});
afterAll(async () => {
  await dropDatabase();
  removeFolder();
});

const freePort = () =>
  new Promise<number>((resolve) => {
    const probe = createServer().listen(0, '127.0.0.1', () => {
      const bound = probe.address();
      if (bound === null || typeof bound === 'string') throw new Error('No port was given.');
      probe.close(() => resolve(bound.port));
    });
  });

const start = (port: number, ...args: string[]): ChildProcess =>
  fork(path.join(root, 'server', 'main.ts'), args, {
    cwd: root,
    env: { ...process.env, ...testEnvironment, PORT: String(port) },
    execArgv: ['--require', 'tsx/cjs'],
    stdio: ['ignore', 'inherit', 'inherit', 'ipc'],
  });

const ended = (child: ChildProcess) =>
  new Promise<number | null>((resolve) => child.once('exit', resolve));

async function isReady(port: number): Promise<boolean> {
  try {
    return (await fetch(`http://127.0.0.1:${port}/api/v1/health`)).ok;
  } catch {
    // Not listening yet.
    return false;
  }
}

async function startReady(): Promise<ChildProcess> {
  const port = await freePort();
  const child = start(port);
  await until(async () => child.exitCode !== null || isReady(port));
  return child;
}

test.each(['SIGTERM', 'SIGINT'] as const)(
  'it becomes ready, and ends in order on %s',
  async (signal) => {
    const child = await startReady();
    child.kill(signal);
    expect(await ended(child)).toBe(0);
  },
);

test('it ends when its launcher is gone', async () => {
  const child = await startReady();
  child.disconnect();
  expect(await ended(child)).toBe(0);
});

test('it refuses a service that is none', async () => {
  expect(await ended(start(0, '--services=web,cooking'))).toBe(1);
});

test('it refuses a port that is taken', async () => {
  const holder = createServer();
  const port = await new Promise<number>((resolve) => {
    holder.listen(0, '127.0.0.1', () => {
      const bound = holder.address();
      if (bound !== null && typeof bound !== 'string') resolve(bound.port);
    });
  });
  expect(await ended(start(port))).toBe(1);
  await new Promise((resolve) => holder.close(resolve));
});
