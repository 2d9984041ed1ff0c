/**
 * Every endpoint with a valid body, called as everyone there is: the exact answer, and not one row
 * changed when the answer is no. A new endpoint is covered as soon as it stands in `endpoints`; it
 * has to say here how its path is filled only when the path names a new kind of record.
 */
import { call, pathOf, running, withServer } from './support/server';
import { tableState } from './support/table-state';
import { randomUUID } from 'node:crypto';
import request from 'supertest';
import type { Desk } from '@/server/models/desk';
import type { Underlying } from '@/server/models/underlying';
import { endpoints, type EndpointName } from '@/shared/contracts';
import { addDays } from '@/shared/dates';
import type { Endpoint } from '@/shared/endpoint';
import { deskRoles, permissions, roleHas, type Permission } from '@/shared/permissions';
import { makeExport, makeVerification } from '../factories/chains';
import { makeApprovedClose, makeUnderlying } from '../factories/market';
import { makeDraftClose, makeDraftPolicy, nextPolicyNumber } from '../factories/market-drafts';
import {
  makeDesk,
  makeGrant,
  makeMember,
  makeSession,
  makeUser,
  password,
  suspended,
  type TestMember,
} from '../factories/people';
import { makeQuote, quoteDraft } from '../factories/quotes';
import { makeStudy, studyDraft } from '../factories/studies';
import { makeBook, makeTrade, proposal } from '../factories/trades';
import {
  makeException,
  makeFilledBook,
  makeFinishedRun,
  policyInForce,
  startRun,
} from '../factories/runs';
import { storeValuations, valuationPair } from '../factories/valuations';

withServer();

type Body = Record<string, unknown>;
type Prepared = { params: Record<string, string>; body: unknown };

let desk: Desk;
let underlying: Underlying;
let members: Record<(typeof deskRoles)[number], TestMember>;
let outsider: TestMember;
let away: TestMember;

beforeAll(async () => {
  desk = await makeDesk();
  underlying = await makeUnderlying(desk);
  await makeApprovedClose(desk, underlying, '2026-11-30');
  members = {
    analyst: await makeMember(desk, 'analyst'),
    'desk-head': await makeMember(desk, 'desk-head'),
    'risk-officer': await makeMember(desk, 'risk-officer'),
    auditor: await makeMember(desk, 'auditor'),
  };
  away = await makeMember(desk, 'desk-head', suspended());
  outsider = await makeMember(await makeDesk(), 'desk-head');
});

const withUnderlying = (body: unknown) => ({
  ...(body as Body),
  ...quoteDraft(underlying),
});

let bookCount = 0;

let dayCount = 0;

/** A day of last winter that has no close yet. */
const freshDay = () => addDays('2025-12-01', (dayCount += 1));

const withOwnClose = (body: unknown) => ({
  ...(body as Body),
  date: freshDay(),
  quotes: [
    {
      underlyingId: underlying.id,
      market: { spot: 212.4, rate: 0.026, carry: 'future', volatility: 0.245 },
    },
  ],
});

/** An American option of last spring, proposed and approved by people who do nothing else here. */
async function liveTrade(): Promise<string> {
  const approver = await makeUser();
  return (await makeTrade(await makeBook(desk), underlying, await makeUser(), { approver })).id;
}

/** A run of someone who does nothing else here; its only trade is the put that studies are of. */
const finishedRun = () => makeFinishedRun(desk, underlying, { day: freshDay() });

/** Read by many and changed by nobody. */
let readRun: Promise<{ runId: string; exceptionId: string }> | null = null;

async function runWithException() {
  const run = await finishedRun();
  return { runId: run.id, exceptionId: (await makeException(run)).id };
}

async function runParams({ method, path }: Endpoint): Promise<Record<string, string>> {
  if (method === 'GET') return (readRun ??= runWithException());
  if (path.includes(':exceptionId')) return runWithException();
  if (!path.endsWith('/cancel')) return { runId: (await finishedRun()).id };
  const snapshot = await makeApprovedClose(desk, underlying, freshDay());
  const books = [await makeFilledBook(desk, underlying)];
  return { runId: (await startRun(desk, { books, snapshot })).id };
}

/** Endpoints whose record must be in a certain state, or whose example needs a record's id. */
const special: Partial<Record<EndpointName, (prepared: Prepared) => Promise<Prepared>>> = {
  async createQuote({ params, body }) {
    return { params, body: withUnderlying(body) };
  },
  async createBook({ params, body }) {
    return { params, body: { ...(body as Body), code: `B${(bookCount += 1)}` } };
  },
  async proposeTrade({ params }) {
    const quote = await makeQuote(desk, underlying, members.analyst.user);
    return { params, body: proposal(quote.id, (await makeBook(desk)).id) };
  },
  async closeTrade({ params, body }) {
    return { params: { ...params, tradeId: await liveTrade() }, body };
  },
  async recordExpiry({ params, body }) {
    return { params: { ...params, tradeId: await liveTrade() }, body };
  },
  async createSnapshot({ params, body }) {
    return { params, body: withOwnClose(body) };
  },
  async saveSnapshot({ params, body }) {
    return { params, body: withOwnClose(body) };
  },
  async restateSnapshot({ params, body }) {
    const { id } = await makeApprovedClose(desk, underlying, freshDay());
    return { params: { ...params, snapshotId: id }, body };
  },
  async createPolicy({ params, body }) {
    await nextPolicyNumber(desk);
    return { params, body };
  },
  async createStudy({ params }) {
    return { params, body: studyDraft(underlying) };
  },
  async cancelStudy({ params, body }) {
    const { id } = await makeStudy(desk, underlying, await makeUser(), 'queued');
    return { params: { ...params, studyId: id }, body };
  },
  async createRun({ params }) {
    await policyInForce(desk);
    const book = await makeFilledBook(desk, underlying);
    const snapshot = await makeApprovedClose(desk, underlying, freshDay());
    return { params, body: { bookIds: [book.id], snapshotId: snapshot.id } };
  },
  async signOffRun({ params, body }) {
    return { params, body: { ...(body as Body), version: 1 } };
  },
  async answerByStudy({ params, body }) {
    const study = await makeStudy(desk, underlying, await makeUser());
    return { params, body: { ...(body as Body), studyId: study.id } };
  },
  async reinstateMember({ params, body }) {
    const { user } = await makeMember(desk, 'analyst', suspended());
    return { params: { ...params, userId: user.id }, body };
  },
  async setRole({ params, body }) {
    return { params, body: { ...(body as Body), role: 'desk-head' } };
  },
};

/** Records that a path may name, made afresh for each call. */
async function paramsFor(endpoint: Endpoint): Promise<Record<string, string>> {
  const params: Record<string, string> = { deskId: desk.id };
  if (endpoint.path.includes(':userId')) {
    const { user } = await makeMember(desk, 'analyst');
    params.userId = user.id;
    params.changeId = (await makeGrant(desk, user, 'export-history')).id;
    // The grant is for ending it; granting another must not find it there.
    if (!endpoint.path.includes(':changeId')) {
      const other = await makeMember(desk, 'analyst');
      params.userId = other.user.id;
    }
  }
  if (endpoint.path.includes(':tradeId'))
    params.tradeId = (await makeTrade(await makeBook(desk), underlying, await makeUser())).id;
  if (endpoint.path.includes(':quoteId'))
    params.quoteId = (await makeQuote(desk, underlying, members.analyst.user)).id;
  if (endpoint.path.includes(':snapshotId'))
    params.snapshotId = (await makeDraftClose(desk, [underlying], await makeUser(), freshDay())).id;
  if (endpoint.path.includes(':policyId'))
    params.policyId = (await makeDraftPolicy(desk, await makeUser())).id;
  if (endpoint.path.includes(':studyId'))
    params.studyId = (await makeStudy(desk, underlying, await makeUser())).id;
  if (endpoint.path.includes(':runId')) Object.assign(params, await runParams(endpoint));
  if (endpoint.path.includes(':date')) params.date = '2026-12-01';
  if (endpoint.path.includes(':position')) {
    const [{ position }] = await storeValuations(desk, [...valuationPair(underlying)]);
    params.position = String(position);
  }
  if (endpoint.path.includes(':verificationId'))
    params.verificationId = (await makeVerification(desk, members.auditor.user)).id;
  if (endpoint.path.includes(':exportId'))
    params.exportId = (await makeExport(desk, members.auditor.user)).id;
  return params;
}

async function prepare(name: EndpointName): Promise<Prepared> {
  const endpoint: Endpoint = endpoints[name];
  const plain = { params: await paramsFor(endpoint), body: endpoint.bodyExample };
  return (await special[name]?.(plain)) ?? plain;
}

const names = Object.keys(endpoints) as EndpointName[];
const isPermission = (access: string): access is Permission =>
  permissions.some((permission) => permission === access);
const deskNames = names.filter((name) => isPermission(endpoints[name].access));
const sessionNames = names.filter((name) => endpoints[name].access === 'session');

async function expectRefusal(
  endpoint: Endpoint,
  { params, body }: Prepared,
  token: string | null,
  expected: { status: number; code: string },
) {
  const before = await tableState();
  const answer = await call(endpoint, { params, body, token });
  expect({ status: answer.status, code: answer.body.code }).toEqual(expected);
  expect(answer.type).toBe('application/problem+json');
  expect(await tableState()).toEqual(before);
}

describe.each(deskNames)('%s', (name) => {
  const endpoint: Endpoint = endpoints[name];

  test.each(deskRoles)('as %s', async (role) => {
    const prepared = await prepare(name);
    const { token } = members[role];
    if (roleHas(role, endpoint.access as Permission)) {
      const answer = await call(endpoint, { ...prepared, token });
      expect({
        status: answer.status,
        problem: answer.status < 400 ? undefined : answer.body.code,
        issues: answer.body.issues,
      }).toEqual({
        status: endpoint.successStatus,
      });
    } else await expectRefusal(endpoint, prepared, token, { status: 403, code: 'not-permitted' });
  });

  test('signed out', async () => {
    const expected = { status: 401, code: 'not-signed-in' };
    await expectRefusal(endpoint, await prepare(name), null, expected);
  });

  test('with a session that has ended', async () => {
    const { user } = await makeMember(desk, 'desk-head');
    const { token } = await makeSession(user, { endedAt: new Date(), endCause: 'signed-out' });
    const expected = { status: 401, code: 'session-ended' };
    await expectRefusal(endpoint, await prepare(name), token, expected);
  });

  test('suspended', async () => {
    const expected = { status: 403, code: 'suspended' };
    await expectRefusal(endpoint, await prepare(name), away.token, expected);
  });

  test('as a member of another desk', async () => {
    const expected = { status: 403, code: 'not-a-member' };
    await expectRefusal(endpoint, await prepare(name), outsider.token, expected);
  });

  test.each([
    ['that does not exist', randomUUID()],
    ['that is no id', 'elsewhere'],
  ])('on a desk %s', async (_case, deskId) => {
    const { params, body } = await prepare(name);
    const prepared = { params: { ...params, deskId }, body };
    const expected = { status: 403, code: 'not-a-member' };
    await expectRefusal(endpoint, prepared, members['desk-head'].token, expected);
  });

  test('refuses before it looks at the body', async () => {
    const { params } = await prepare(name);
    const method = endpoint.method.toLowerCase() as 'get' | 'post' | 'put' | 'delete';
    const sent = request(running())[method](pathOf(endpoint, params));
    void sent.set('Authorization', `Bearer ${outsider.token}`);
    if (endpoint.method !== 'GET') void sent.type('json').send('{"unfinished": ');
    const answer = await sent;
    expect({ status: answer.status, code: answer.body.code }).toEqual({
      status: 403,
      code: 'not-a-member',
    });
  });
});

describe.each(deskNames.filter((name) => endpoints[name].stepUp))('%s', (name) => {
  test('asks for the password again', async () => {
    const endpoint: Endpoint = endpoints[name];
    const role = deskRoles.find((one) => roleHas(one, endpoint.access as Permission));
    const { user } = await makeMember(desk, role ?? 'desk-head');
    const steppedUpAt = new Date(Date.now() - 6 * 60_000);
    const { token } = await makeSession(user, { steppedUpAt });
    const expected = { status: 403, code: 'step-up-required' };
    await expectRefusal(endpoint, await prepare(name), token, expected);
  });
});

describe.each(sessionNames)('%s', (name) => {
  const endpoint: Endpoint = endpoints[name];
  const everyone = [...deskRoles, 'suspended', 'without a desk'] as const;

  async function tokenOf(who: (typeof everyone)[number]) {
    if (who === 'suspended') return away.token;
    if (who !== 'without a desk') return members[who].token;
    return (await makeSession(await makeUser())).token;
  }

  test.each(everyone)('%s', async (who) => {
    const answer = await call(endpoint, { ...(await prepare(name)), token: await tokenOf(who) });
    expect(answer.status).toBe(endpoint.successStatus);
  });

  test('signed out', async () => {
    const expected = { status: 401, code: 'not-signed-in' };
    await expectRefusal(endpoint, await prepare(name), null, expected);
  });
});

/** Nobody is anybody here: no cookie is sent, and no account has the example's address. */
const publicAnswers: Record<string, number> = {
  getHealth: 503,
  signIn: 401,
  refreshSession: 401,
  signOut: 200,
};

describe('public endpoints', () => {
  test('are the agreed ones', () => {
    const found = names.filter((name) => endpoints[name].access === 'public');
    expect(found.sort()).toEqual(Object.keys(publicAnswers).sort());
  });

  test.each(Object.entries(publicAnswers))('%s answers %i', async (name, status) => {
    const endpoint = endpoints[name as EndpointName];
    const before = await tableState();
    const answer = await call(endpoint, { body: endpoint.bodyExample });
    expect(answer.status).toBe(status);
    expect(await tableState()).toEqual(before);
  });
});

test('the example of a password is the one that the members here have', () => {
  expect(endpoints.stepUp.bodyExample).toEqual({ password });
});
