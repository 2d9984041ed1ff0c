/** The session's rules against a server that is played by a function. */
import type * as Api from '@/hooks/api';
import { type ApiError } from '@/shared/api-client';
import { endpoints } from '@/shared/contracts';

const analyst = { id: '00000000-0000-4000-8000-000000000001', name: 'Analyst' };
const other = { id: '00000000-0000-4000-8000-000000000002', name: 'Desk head' };
const deskId = '00000000-0000-4000-8000-00000000000a';

const meOf = (user: typeof analyst) => ({
  user: { ...user, email: 'a@tarnfield.example' },
  desks: [],
});

type Answer = { status: number; body: unknown };
type Request = { route: string; token: string | undefined; body: unknown };

const ok = (body: unknown): Answer => ({ status: 200, body });
const problem = (status: number, code: string): Answer => ({
  status,
  body: { type: 'about:blank', title: code, status, code, requestId: 'r1', issues: [] },
});

let handlers: Record<string, (request: Request) => Answer>;
let requests: Request[];
let api: typeof Api;
let tokens: number;
let signedIn: typeof analyst | null;

const session = (user: typeof analyst) => {
  signedIn = user;
  tokens += 1;
  return ok({ accessToken: `token-${tokens}`, expiresInSeconds: 600, me: meOf(user) });
};

async function fakeFetch(url: string, init: RequestInit): Promise<Response> {
  const headers = init.headers as Record<string, string>;
  const request: Request = {
    route: `${init.method} ${url.replace('/api/v1', '')}`,
    token: headers.authorization?.replace('Bearer ', ''),
    body: init.body === undefined ? undefined : JSON.parse(String(init.body)),
  };
  requests.push(request);
  const handler = handlers[request.route];
  if (!handler) throw new Error(`The test plays no ${request.route}.`);
  const { status, body } = handler(request);
  return { ok: status < 400, status, json: async () => body } as Response;
}

const routes = () => requests.map(({ route }) => route);
const people = `GET /desks/${deskId}/people`;
const listPeople = () => api.call(endpoints.listMembers, { params: { deskId } });

/** Settles what is under way, until the session asks for something. */
async function untilAsked(prompt: Api.Prompt): Promise<void> {
  if (api.readSession().prompt === prompt) return;
  await new Promise<void>((resolve) => {
    const stop = api.subscribeSession(() => {
      if (api.readSession().prompt !== prompt) return;
      stop();
      resolve();
    });
  });
}

async function failureOf(work: Promise<unknown>): Promise<string> {
  try {
    await work;
  } catch (error) {
    // The class is that of the freshly loaded module, so only its shape is compared.
    return (error as ApiError).code;
  }
  throw new Error('It was expected to fail.');
}

beforeEach(async () => {
  localStorage.setItem('driftless.signed-in', 'true');
  requests = [];
  tokens = 0;
  signedIn = analyst;
  handlers = {
    'POST /sessions/refresh': () => (signedIn ? session(signedIn) : problem(401, 'not-signed-in')),
    'POST /sessions': () => session(analyst),
    'DELETE /sessions/current': () => ok({ ended: true }),
    'GET /me': () => ok(meOf(analyst)),
    'POST /sessions/step-up': () => ok({ validUntil: '2026-12-01T12:00:00Z' }),
    [people]: () => ok({ members: [] }),
  };
  global.fetch = fakeFetch as typeof fetch;
  jest.resetModules();
  api = await import('@/hooks/api');
});

test('the cookie brings the session back, and its token goes with each call', async () => {
  await api.restoreSession();
  expect(api.readSession()).toMatchObject({ status: 'signed-in', me: { user: analyst } });
  await listPeople();
  expect(requests.at(-1)).toMatchObject({ route: people, token: 'token-1' });
});

test('a browser in which nobody has signed in does not ask for a session', async () => {
  localStorage.clear();
  await api.restoreSession();
  expect(api.readSession()).toMatchObject({ status: 'signed-out', me: null });
  expect(requests).toEqual([]);
});

test('without a cookie the person is signed out, which is no failure', async () => {
  signedIn = null;
  await api.restoreSession();
  expect(api.readSession()).toMatchObject({ status: 'signed-out', me: null });
});

test('a server that does not answer leaves it open who is signed in', async () => {
  global.fetch = () => Promise.reject(new TypeError('Failed to fetch'));
  expect(await failureOf(api.restoreSession())).toBe('no-connection');
  expect(api.readSession().status).toBe('unknown');
});

test('calls that meet an ended token share one refresh and are sent once more', async () => {
  await api.restoreSession();
  handlers[people] = ({ token }) =>
    token === 'token-1' ? problem(401, 'session-ended') : ok({ members: [] });
  await Promise.all([listPeople(), listPeople(), listPeople()]);
  expect(routes().filter((route) => route === 'POST /sessions/refresh')).toHaveLength(2);
  expect(
    requests.filter(({ route, token }) => route === people && token === 'token-2'),
  ).toHaveLength(3);
});

test('a call that is refused again after the refresh is not sent a third time', async () => {
  await api.restoreSession();
  handlers[people] = () => problem(401, 'session-ended');
  expect(await failureOf(listPeople())).toBe('session-ended');
  expect(routes().filter((route) => route === people)).toHaveLength(2);
});

test('when the session is over, the call waits for a new sign-in and is then sent', async () => {
  await api.restoreSession();
  handlers[people] = ({ token }) =>
    token === 'token-1' ? problem(401, 'session-ended') : ok({ members: [] });
  signedIn = null;
  const answer = listPeople();
  await untilAsked('sign-in-again');
  // Whoever was signed in is still known, so that the open screen stays.
  expect(api.readSession().me?.user).toMatchObject(analyst);
  await api.signIn({ email: 'a@tarnfield.example', password: 'secret' });
  expect(await answer).toEqual({ members: [] });
  expect(api.readSession().prompt).toBeNull();
});

test('when the person closes the dialog, the call fails with what the server said', async () => {
  await api.restoreSession();
  handlers[people] = () => problem(401, 'session-ended');
  signedIn = null;
  const failure = failureOf(listPeople());
  await untilAsked('sign-in-again');
  api.dismissPrompt();
  expect(await failure).toBe('session-ended');
  expect(api.readSession()).toMatchObject({ status: 'signed-in', prompt: null });
});

test('what one person sent is never repeated in the name of another', async () => {
  await api.restoreSession();
  handlers[people] = () => problem(401, 'session-ended');
  signedIn = other;
  expect(await failureOf(listPeople())).toBe('session-ended');
  expect(routes().filter((route) => route === people)).toHaveLength(1);
  expect(api.readSession().me?.user).toMatchObject(other);
});

test('a binding act waits for the password and is then sent once more', async () => {
  await api.restoreSession();
  let confirmed = false;
  handlers['POST /sessions/step-up'] = ({ body }) => {
    expect(body).toEqual({ password: 'secret' });
    confirmed = true;
    return ok({ validUntil: '2026-12-01T12:00:00Z' });
  };
  handlers[people] = () => (confirmed ? ok({ members: [] }) : problem(403, 'step-up-required'));
  const answer = listPeople();
  await untilAsked('confirm-password');
  await api.confirmPassword('secret');
  expect(await answer).toEqual({ members: [] });
});

test('a wrong password leaves the question open', async () => {
  await api.restoreSession();
  handlers[people] = () => problem(403, 'step-up-required');
  handlers['POST /sessions/step-up'] = () => problem(401, 'sign-in-failed');
  const failure = failureOf(listPeople());
  await untilAsked('confirm-password');
  expect(await failureOf(api.confirmPassword('wrong'))).toBe('sign-in-failed');
  expect(api.readSession().prompt).toBe('confirm-password');
  api.dismissPrompt();
  expect(await failure).toBe('step-up-required');
});

test('a refusal reads the permissions again, so that what is offered follows', async () => {
  await api.restoreSession();
  handlers[people] = () => problem(403, 'not-permitted');
  handlers['GET /me'] = () => ok({ ...meOf(analyst), desks: [] });
  expect(await failureOf(listPeople())).toBe('not-permitted');
  expect(routes().at(-1)).toBe('GET /me');
});

test('signing out forgets the person; without an answer nobody is signed out', async () => {
  await api.restoreSession();
  const working = global.fetch;
  global.fetch = () => Promise.reject(new TypeError('Failed to fetch'));
  expect(await failureOf(api.signOut())).toBe('no-connection');
  expect(api.readSession().status).toBe('signed-in');
  global.fetch = working;
  await api.signOut();
  expect(api.readSession()).toMatchObject({ status: 'signed-out', me: null });
});

test('tabs use the cookie one at a time', async () => {
  const locked: string[] = [];
  Object.defineProperty(navigator, 'locks', {
    configurable: true,
    value: {
      request: (name: string, work: () => Promise<unknown>) => {
        locked.push(name);
        return work();
      },
    },
  });
  await api.restoreSession();
  await api.signOut();
  expect(locked).toEqual(['driftless-session', 'driftless-session']);
  Reflect.deleteProperty(navigator, 'locks');
});

test('each intention has a key of its own, a UUID of version 4', () => {
  const keys = new Set(Array.from({ length: 100 }, () => api.newIdempotencyKey()));
  expect(keys.size).toBe(100);
  // RFC 9562, section 5.4.
  for (const key of keys)
    expect(key).toMatch(/^[0-9a-f]{8}-[0-9a-f]{4}-4[0-9a-f]{3}-[89ab][0-9a-f]{3}-[0-9a-f]{12}$/);
});
