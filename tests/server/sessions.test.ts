/** Sign-in, rotation of the refresh token, its theft, the throttle, and the second password. */
import { address, call, running, withServer } from './support/server';
import request, { type Response } from 'supertest';
import { sign } from 'jsonwebtoken';
import { Session } from '@/server/models/session';
import { keyNamed } from '@/server/keys';
import { removeOldSessions } from '@/server/services/sessions';
import * as people from '@/shared/contracts/people';
import * as sessions from '@/shared/contracts/sessions';
import { makeDesk, makeMember, makeSession, makeUser, password } from '../factories/people';

withServer();

const refreshPath = '/api/v1/sessions/refresh';

const signIn = (email: string, given = password) =>
  call(sessions.signIn, { body: { email, password: given } });

/** The refresh cookie of an answer, as a browser would send it back. */
function cookieOf(answer: Response): string {
  const [cookie] = answer.get('Set-Cookie') ?? [];
  return cookie.split(';')[0];
}

const refresh = (cookie: string) =>
  request(running()).post(refreshPath).set('Origin', address()).set('Cookie', cookie).send({});

test('signing in gives a token for this person and a cookie that no script sees', async () => {
  const desk = await makeDesk();
  const { user } = await makeMember(desk, 'analyst');
  const answer = await signIn(` ${user.email.toUpperCase()} `);
  expect(answer.status).toBe(201);
  expect(answer.body.me.user).toEqual({ id: user.id, name: user.name, email: user.email });
  expect(answer.body.me.desks).toMatchObject([{ id: desk.id, role: 'analyst', suspended: false }]);
  const [cookie] = answer.get('Set-Cookie') ?? [];
  expect(cookie).toMatch(/; Path=\/api\/v1\/sessions; .*HttpOnly; SameSite=Strict$/);
  expect(answer.get('Cache-Control')).toBe('no-store');
  const me = await call(sessions.getMe, { token: answer.body.accessToken });
  expect(me.body).toEqual(answer.body.me);
});

test('a wrong password and an unknown account get the very same answer', async () => {
  const user = await makeUser();
  const known = await signIn(user.email, 'not the password');
  const unknown = await signIn('nobody@tarnfield.example', 'not the password');
  const seen = ({ status, body, headers }: Response) => ({
    status,
    body: { ...body, requestId: null },
    headers: Object.keys(headers).sort(),
    remaining: headers.ratelimit,
  });
  expect(known.status).toBe(401);
  expect(seen(unknown)).toEqual(seen(known));
});

test('a refresh token works once, and the new one works on', async () => {
  const user = await makeUser();
  const first = cookieOf(await signIn(user.email));
  const second = await refresh(first);
  expect(second.status).toBe(200);
  expect(cookieOf(second)).not.toBe(first);
  expect((await refresh(cookieOf(second))).status).toBe(200);
});

test('a refresh token that comes twice ends the session for both holders', async () => {
  const user = await makeUser();
  const opened = await signIn(user.email);
  const stolen = cookieOf(opened);
  const renewed = await refresh(stolen);
  const replay = await refresh(stolen);
  expect({ status: replay.status, code: replay.body.code }).toEqual({
    status: 401,
    code: 'session-ended',
  });
  expect((await refresh(cookieOf(renewed))).body.code).toBe('session-ended');
  const me = await call(sessions.getMe, { token: renewed.body.accessToken });
  expect(me.body.code).toBe('session-ended');
  const row = await Session.findOne({ where: { userId: user.id }, rejectOnEmpty: true });
  expect(row.endCause).toBe('token-reused');
});

test('of two that bring one refresh token at once, one alone is served', async () => {
  const user = await makeUser();
  const cookie = cookieOf(await signIn(user.email));
  const answers = await Promise.all([refresh(cookie), refresh(cookie), refresh(cookie)]);
  expect(answers.map(({ status }) => status).sort()).toEqual([200, 401, 401]);
});

test('signing out ends the session at once, the access token with it', async () => {
  const user = await makeUser();
  const opened = await signIn(user.email);
  const answer = await request(running())
    .delete('/api/v1/sessions/current')
    .set('Origin', address())
    .set('Cookie', cookieOf(opened));
  expect(answer.body).toEqual({ ended: true });
  expect(answer.get('Set-Cookie')?.[0]).toMatch(
    /=; Path=\/api\/v1\/sessions; Expires=Thu, 01 Jan 1970/,
  );
  const me = await call(sessions.getMe, { token: opened.body.accessToken });
  expect(me.body.code).toBe('session-ended');
});

test.each(['', 'garbled', '00000000-0000-4000-8000-000000000000.secret', 'a.b.c'])(
  'a refresh token like “%s” opens nothing',
  async (token) => {
    expect((await refresh(`driftless_refresh_0=${token}`)).status).toBe(401);
  },
);

describe('requests that carry the cookie come from our own pages only', () => {
  const paths: ['post' | 'delete', string][] = [
    ['post', '/api/v1/sessions'],
    ['post', refreshPath],
    ['delete', '/api/v1/sessions/current'],
    ['post', '/api/v1/sessions/step-up'],
  ];
  const origins = [null, 'null', 'http://elsewhere.example', 'http://127.0.0.1', 'garbled'];
  const cases = paths.flatMap(([method, path]) =>
    origins.map((origin) => ({ method, path, origin })),
  );
  test.each(cases)('$method $path from $origin', async ({ method, path, origin }) => {
    const user = await makeUser();
    const sent = request(running())[method](path);
    if (origin !== null) void sent.set('Origin', origin);
    const answer = await sent.send({ email: user.email, password });
    expect({ status: answer.status, code: answer.body.code }).toEqual({
      status: 403,
      code: 'origin-refused',
    });
  });
});

describe('the throttle', () => {
  test('stops guessing at one account, known or not, and leaves others alone', async () => {
    const user = await makeUser();
    const bystander = await makeUser();
    for (const email of [user.email, 'nobody-at-all@tarnfield.example']) {
      const statuses: number[] = [];
      for (let attempt = 1; attempt <= 11; attempt += 1)
        statuses.push((await signIn(email, 'a guess at it')).status);
      expect(statuses).toEqual([...Array<number>(10).fill(401), 429]);
    }
    const right = await signIn(user.email);
    expect(right.body.code).toBe('too-many-attempts');
    expect(Number(right.get('Retry-After'))).toBeGreaterThan(0);
    expect((await signIn(bystander.email)).status).toBe(201);
  });

  test('does not count what succeeds', async () => {
    const user = await makeUser();
    for (let attempt = 1; attempt <= 12; attempt += 1)
      expect((await signIn(user.email)).status).toBe(201);
  });

  test('counts the second password as well', async () => {
    const user = await makeUser();
    const { token } = await makeSession(user);
    const guess = () => call(sessions.stepUp, { token, body: { password: 'a guess at it' } });
    for (let attempt = 1; attempt <= 10; attempt += 1) expect((await guess()).status).toBe(401);
    expect((await guess()).status).toBe(429);
  });
});

describe('access tokens', () => {
  const idle = async () => (await makeSession(await makeUser())).session.id;
  const cases: [string, () => Promise<string>][] = [
    ['garbled', async () => 'garbled'],
    ['signed with another key', async () => sign({ sid: await idle() }, 'another key')],
    ['unsigned', async () => sign({ sid: await idle() }, '', { algorithm: 'none' })],
    [
      'signed with the right key by another method',
      async () => sign({ sid: await idle() }, keyNamed('access-token'), { algorithm: 'HS512' }),
    ],
    [
      'past its time',
      async () => sign({ sid: await idle() }, keyNamed('access-token'), { expiresIn: -1 }),
    ],
    ['without a session', async () => sign({ sub: 'x' }, keyNamed('access-token'))],
  ];
  test.each(cases)('%s: not signed in', async (_case, token) => {
    const answer = await call(sessions.getMe, { token: await token() });
    expect({ status: answer.status, code: answer.body.code }).toEqual({
      status: 401,
      code: 'not-signed-in',
    });
  });

  test('say which session they belong to and nothing else', async () => {
    const { session, token } = await makeSession(await makeUser());
    const payload = JSON.parse(Buffer.from(token.split('.')[1], 'base64url').toString());
    expect(payload).toEqual({ sid: session.id, iat: expect.any(Number), exp: payload.iat + 600 });
  });
});

test('a session ends twelve hours after the password was given', async () => {
  const user = await makeUser();
  const opened = await signIn(user.email);
  const row = await Session.findOne({ where: { userId: user.id }, rejectOnEmpty: true });
  expect(row.expiresAt.getTime() - row.createdAt.getTime()).toBe(12 * 3_600_000);
  const past = new Date(Date.now() - 1);
  const created = new Date(Date.now() - 13 * 3_600_000);
  const { token } = await makeSession(user, { createdAt: created, expiresAt: past });
  expect((await call(sessions.getMe, { token })).body.code).toBe('session-ended');
  expect((await call(sessions.getMe, { token: opened.body.accessToken })).status).toBe(200);
});

describe('the second password', () => {
  test('opens binding acts for five minutes', async () => {
    const desk = await makeDesk();
    const { user } = await makeMember(desk, 'desk-head');
    const subject = await makeMember(desk, 'analyst');
    const { token } = await makeSession(user, { steppedUpAt: new Date(Date.now() - 301_000) });
    const act = {
      params: { deskId: desk.id, userId: subject.user.id },
      body: { reason: 'Away until further notice', version: 0 },
      token,
    };
    expect((await call(people.suspendMember, act)).body.code).toBe('step-up-required');
    const confirmed = await call(sessions.stepUp, { token, body: { password } });
    expect(confirmed.status).toBe(200);
    const lifeMs = Date.parse(confirmed.body.validUntil) - Date.now();
    expect(lifeMs).toBeGreaterThan(0);
    expect(lifeMs).toBeLessThanOrEqual(5 * 60_000);
    expect((await call(people.suspendMember, act)).status).toBe(200);
  });

  test('that is wrong opens nothing', async () => {
    const user = await makeUser();
    const { session, token } = await makeSession(user);
    const answer = await call(sessions.stepUp, { token, body: { password: 'not the password' } });
    expect({ status: answer.status, code: answer.body.code }).toEqual({
      status: 401,
      code: 'sign-in-failed',
    });
    const { steppedUpAt } = await session.reload();
    expect(steppedUpAt).toEqual(session.steppedUpAt);
  });
});

test('sessions long over are removed, others stay', async () => {
  const user = await makeUser();
  const daysAgo = (days: number) => new Date(Date.now() - days * 86_400_000);
  const old = await makeSession(user, { createdAt: daysAgo(92), expiresAt: daysAgo(91) });
  const recent = await makeSession(user, { createdAt: daysAgo(90), expiresAt: daysAgo(89) });
  await removeOldSessions();
  expect(await Session.findByPk(old.session.id)).toBeNull();
  expect(await Session.findByPk(recent.session.id)).not.toBeNull();
});
