/** The whole server on a database of the test file's own, and requests to it. */
import { createEmptyDatabase, dropDatabase, removeFolder, testEnvironment } from './environment';
import { randomUUID } from 'node:crypto';
import { createServer, type Server } from 'node:http';
import request, { type Test } from 'supertest';
import { sequelize } from '@/server/database';
import { migrate } from '@/server/migrate';
import { closeExportThreads } from '@/server/services/export-file';
import { closePasswordThreads } from '@/server/services/passwords';
import { closePricingThreads } from '@/server/services/pricing';
import { closeValuationThreads } from '@/server/services/run-threads';
import { closeStudyThreads } from '@/server/services/study-threads';
import { close, createApp } from '@/server/web';
import { apiBase, type Endpoint } from '@/shared/endpoint';

let server: Server | null = null;

/** Threads compile as they start, which a busy machine makes long. */
const patienceMs = 120_000;

export function withOwnDatabase() {
  jest.setTimeout(patienceMs);
  beforeAll(async () => {
    await createEmptyDatabase();
    await migrate(testEnvironment.DATABASE_OWNER_URL, testEnvironment.DATABASE_URL);
  });
  afterAll(async () => {
    await Promise.all([
      closePasswordThreads(),
      closePricingThreads(),
      closeExportThreads(),
      closeStudyThreads(),
      closeValuationThreads(),
    ]);
    await sequelize.close();
    await dropDatabase();
    removeFolder();
  });
}

export function withServer() {
  withOwnDatabase();
  beforeAll(async () => {
    const started = createServer(createApp());
    await new Promise<void>((resolve) => started.listen(0, '127.0.0.1', resolve));
    server = started;
  });
  afterAll(async () => {
    if (server) await close(server);
  });
}

export function running(): Server {
  if (!server) throw new Error('withServer() was not called in this file.');
  return server;
}

export function address(): string {
  const bound = running().address();
  if (bound === null || typeof bound === 'string') throw new Error('The server has no port.');
  return `http://127.0.0.1:${bound.port}`;
}

export type Call = {
  params?: Readonly<Record<string, string>>;
  query?: Readonly<Record<string, string | number>>;
  body?: unknown;
  token?: string | null;
  idempotencyKey?: string;
};

const methods = { GET: 'get', POST: 'post', PUT: 'put', DELETE: 'delete' } as const;

export const pathOf = (endpoint: Endpoint, params: Call['params'] = {}) =>
  `${apiBase}${endpoint.path.replace(/:(\w+)/g, (_, name: string) => params[name])}`;

/** Sends what a browser on the tool's own page would send. */
export function call(endpoint: Endpoint, input: Call = {}): Test {
  const { params, query = {}, body, token, idempotencyKey } = input;
  const sent = request(running())
    [methods[endpoint.method]](pathOf(endpoint, params))
    .set('Origin', address())
    .query(query);
  if (token) void sent.set('Authorization', `Bearer ${token}`);
  if (endpoint.idempotent) void sent.set('Idempotency-Key', idempotencyKey ?? randomUUID());
  if (endpoint.method !== 'GET') void sent.send((body ?? {}) as object);
  return sent;
}
