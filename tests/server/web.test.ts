/** What every answer has in common: headers, problems, pages, and health. */
import { indexHtml } from './support/environment';
import { call, running, withServer } from './support/server';
import { until } from './support/until';
import request from 'supertest';
import { startWorker, type Worker } from '@/server/worker';
import { getHealth } from '@/shared/contracts/health';
import { getMe } from '@/shared/contracts/sessions';
import { problemSchema } from '@/shared/errors';

withServer();

const get = (path: string) => request(running()).get(path);

describe('health', () => {
  let worker: Worker | null = null;
  afterAll(() => worker?.stop());

  test('says which part is not ready, and 200 once all are', async () => {
    const before = await call(getHealth);
    expect(before.status).toBe(503);
    expect(before.body).toMatchObject({
      status: 'waiting',
      parts: { database: 'ready', migrations: 'ready', web: 'ready', worker: 'waiting' },
      checkout: process.cwd(),
      version: expect.stringMatching(/^\d+\.\d+\.\d+$/),
    });
    worker = await startWorker();
    await until(async () => (await call(getHealth)).status === 200);
    expect((await call(getHealth)).body).toMatchObject({ status: 'ready' });
    await worker.stop();
    worker = null;
    await until(async () => (await call(getHealth)).status === 503);
  });
});

describe('a problem', () => {
  test('is a document with code, title, status and the request’s id', async () => {
    const answer = await call(getMe);
    expect(answer.type).toBe('application/problem+json');
    const problem = problemSchema.parse(answer.body);
    expect(problem).toMatchObject({
      type: 'urn:driftless:problem:not-signed-in',
      status: 401,
      code: 'not-signed-in',
    });
    expect(answer.get('X-Request-Id')).toBe(problem.requestId);
    expect(answer.get('Cache-Control')).toBe('no-store');
  });

  test.each(['/api/v1/nowhere', '/api/v2/me', '/api/v1/Me', '/api/v1/me/'])(
    'answers %s, which is not there',
    async (path) => {
      const answer = await get(path);
      expect([answer.status, answer.body.code]).toEqual([404, 'not-found']);
    },
  );

  test('answers a method that an address does not take, and says which it does', async () => {
    const answer = await request(running()).put('/api/v1/sessions/refresh');
    expect([answer.status, answer.body.code]).toEqual([405, 'method-not-allowed']);
    expect(answer.get('Allow')).toBe('POST');
  });
});

describe('the web export', () => {
  test.each(['/', '/desks/1/ticket', '/desks/1/quotes?verdict=wide'])(
    'is one page at %s',
    async (path) => {
      const answer = await get(path);
      expect([answer.status, answer.text]).toEqual([200, indexHtml]);
      expect(answer.get('Cache-Control')).toBe('no-cache');
    },
  );

  test('lets files with a hash in their name be kept, and others be asked for', async () => {
    const hashed = await get('/_expo/static/js/web/entry-0123456789abcdef.js');
    expect(hashed.get('Cache-Control')).toBe('public, max-age=31536000, immutable');
    const plain = await get('/favicon.svg');
    expect(plain.get('Cache-Control')).toBe('no-cache');
  });

  test('does not give the page in place of a file', async () => {
    for (const path of ['/missing.js', '/_expo/static/js/web/entry-old.js', '/../package.json'])
      expect((await get(path)).status).toBe(404);
  });
});

test('only our own files run: the policy of every page', async () => {
  const policy = (await get('/')).get('Content-Security-Policy') ?? '';
  const directives = Object.fromEntries(
    policy.split(';').map((part) => {
      const [name, ...values] = part.split(' ');
      return [name, values.join(' ')];
    }),
  );
  expect(directives).toEqual({
    'default-src': "'self'",
    'script-src': "'self' 'wasm-unsafe-eval'",
    'style-src': "'self' 'sha256-47DEQpj8HBSa+/TImW+5JCeuQeRkm5NMpJWZG3hSuFU='",
    'worker-src': "'self' blob:",
    'img-src': "'self' data:",
    'object-src': "'none'",
    'base-uri': "'self'",
    'form-action': "'self'",
    'frame-ancestors': "'none'",
  });
});

describe('the API’s own page', () => {
  test('is rendered without an inline style or script', async () => {
    const moved = await get('/api/docs');
    expect([moved.status, moved.get('Location')]).toEqual([302, '/api/docs/']);
    const page = await get('/api/docs/');
    expect(page.text).toContain('swagger-ui-bundle.js');
    expect(page.text).not.toMatch(/<style|style="|<script>/);
    expect((await get('/api/docs/swagger-ui.css')).status).toBe(200);
  });

  test('reads the document that is served beside it', async () => {
    const script = await get('/api/docs/swagger-ui-init.js');
    expect(script.text).toContain('/api/v1/openapi.json');
    const document = await get('/api/v1/openapi.json');
    expect(document.body.openapi).toBe('3.1.0');
  });
});
