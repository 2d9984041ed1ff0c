/** The process itself: it becomes ready from an empty database, and ends when it is told to. */
import { createEmptyDatabase, dropDatabase, removeFolder } from './support/environment';
import { ended, freePort, isReady, startProcess } from './support/processes';
import { until } from './support/until';
import type { ChildProcess } from 'node:child_process';
import { createServer } from 'node:net';

jest.setTimeout(240_000);

beforeAll(async () => {
  await createEmptyDatabase();
});
afterAll(async () => {
  await dropDatabase();
  removeFolder();
});

async function startReady(): Promise<ChildProcess> {
  const port = await freePort();
  const child = startProcess(port);
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
  expect(await ended(startProcess(0, '--services=web,cooking'))).toBe(1);
});

test('it refuses a port that is taken', async () => {
  const holder = createServer();
  const port = await new Promise<number>((resolve) => {
    holder.listen(0, '127.0.0.1', () => {
      const bound = holder.address();
      if (bound !== null && typeof bound !== 'string') resolve(bound.port);
    });
  });
  expect(await ended(startProcess(port))).toBe(1);
  await new Promise((resolve) => holder.close(resolve));
});
