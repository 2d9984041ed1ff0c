/** The rules of changing what a member may do, and the record that each change leaves. */
import { call, withServer } from './support/server';
import { tableState } from './support/table-state';
import { randomUUID } from 'node:crypto';
import type { Response } from 'supertest';
import type { Desk } from '@/server/models/desk';
import { Grant } from '@/server/models/grant';
import { IdempotencyKey } from '@/server/models/idempotency-key';
import { Membership } from '@/server/models/membership';
import * as people from '@/shared/contracts/people';
import { getMe } from '@/shared/contracts/sessions';
import { addDays, dateInZone } from '@/shared/dates';
import type { DeskRole } from '@/shared/permissions';
import {
  makeDesk,
  makeGrant,
  makeMember,
  makeMembership,
  suspended,
  type TestMember,
} from '../factories/people';

withServer();

let desk: Desk;
let head: TestMember;
let analyst: TestMember;

beforeEach(async () => {
  desk = await makeDesk();
  head = await makeMember(desk, 'desk-head');
  analyst = await makeMember(desk, 'analyst');
});

const reason = 'Said so in the morning meeting';
const today = () => dateInZone(Date.now(), desk.timeZone);

type Options = { by?: TestMember; of?: TestMember; version?: number };

const target = ({ by = head, of = analyst }: Options) => ({
  params: { deskId: desk.id, userId: of.user.id },
  token: by.token,
});

const setRole = (role: DeskRole, options: Options = {}) =>
  call(people.setRole, {
    ...target(options),
    body: { role, reason, version: options.version ?? 0 },
  });

type Change = { permission: string; effect: 'grant' | 'withdraw'; endsOn?: string | null };

const change = (given: Change, options: Options & { key?: string } = {}) =>
  call(people.changePermission, {
    ...target(options),
    body: { endsOn: null, ...given, reason, version: options.version ?? 0 },
    idempotencyKey: options.key,
  });

const suspend = (options: Options = {}) =>
  call(people.suspendMember, {
    ...target(options),
    body: { reason, version: options.version ?? 0 },
  });

const reinstate = (options: Options = {}) =>
  call(people.reinstateMember, {
    ...target(options),
    body: { reason, version: options.version ?? 0 },
  });

const end = (changeId: string, options: Options = {}) => {
  const { params, token } = target(options);
  return call(people.endPermissionChange, {
    params: { ...params, changeId },
    token,
    body: { reason, version: options.version ?? 0 },
  });
};

const seen = ({ status, body }: Response) => ({ status, code: body.code });
const refusal = (status: number, code: string) => ({ status, code });
const issueOf = ({ status, body }: Response) => [status, body.issues[0].path, body.issues[0].code];

test('a role is set, with a row that says who did it, when and why', async () => {
  const answer = await setRole('desk-head');
  expect(answer.status).toBe(200);
  expect(answer.body).toMatchObject({ role: 'desk-head', version: 1 });
  const rows = await Grant.findAll({ where: { deskId: desk.id } });
  expect(rows).toMatchObject([
    {
      kind: 'role-set',
      subjectId: analyst.user.id,
      madeById: head.user.id,
      role: 'desk-head',
      previousRole: 'analyst',
      reason,
    },
  ]);
});

test('a grant counts at the next request, and no longer after its last day', async () => {
  const { token, user } = analyst;
  const read = () => call(people.listAccessEvents, { params: { deskId: desk.id }, token });
  expect((await read()).status).toBe(403);
  await makeGrant(desk, user, 'read-audit-log', { endsOn: addDays(today(), -1) });
  expect((await read()).status).toBe(403);
  await makeGrant(desk, user, 'read-audit-log', { endsOn: today() });
  expect((await read()).status).toBe(200);
});

test('the last day is the desk’s own: it lasts longer west of it', async () => {
  const west = await makeDesk({ timeZone: 'Pacific/Pago_Pago' });
  const east = await makeDesk({ timeZone: 'Pacific/Kiritimati' });
  const day = dateInZone(Date.now(), 'Pacific/Pago_Pago');
  for (const [where, held] of [
    [west, true],
    [east, false],
  ] as const) {
    const member = await makeMember(where, 'analyst');
    await makeGrant(where, member.user, 'export-history', { endsOn: day });
    const me = await call(getMe, { token: member.token });
    expect(me.body.desks[0].permissions.includes('export-history')).toBe(held);
  }
});

test('a withdrawal takes a permission of the role, and its end gives it back', async () => {
  const withdrawn = await change({ permission: 'price', effect: 'withdraw' });
  expect(withdrawn.status).toBe(201);
  expect(withdrawn.body.permissions).not.toContain('price');
  const ended = await end(withdrawn.body.changes[0].id, { version: 1 });
  expect(ended.body).toMatchObject({ version: 2, changes: [] });
  expect(ended.body.permissions).toContain('price');
  const again = await end(withdrawn.body.changes[0].id, { version: 2 });
  expect(seen(again)).toEqual(refusal(404, 'not-found'));
});

test('a suspension refuses every request at once, and its end opens them again', async () => {
  const list = () =>
    call(people.listMembers, { params: { deskId: desk.id }, token: analyst.token });
  expect((await list()).status).toBe(200);
  const answer = await suspend();
  expect(answer.body).toMatchObject({ suspensionReason: reason, permissions: [], version: 1 });
  expect(seen(await list())).toEqual(refusal(403, 'suspended'));
  const me = await call(getMe, { token: analyst.token });
  expect(me.body.desks[0]).toMatchObject({ suspended: true, permissions: [] });
  expect(issueOf(await suspend({ version: 1 }))).toEqual([422, '', 'already-suspended']);
  expect((await reinstate({ version: 1 })).body.suspendedAt).toBeNull();
  expect((await list()).status).toBe(200);
  expect(issueOf(await reinstate({ version: 2 }))).toEqual([422, '', 'not-suspended']);
});

describe('nobody changes their own record', () => {
  test.each([
    ['role', () => setRole('analyst', { of: head })],
    ['permission', () => change({ permission: 'author-policy', effect: 'grant' }, { of: head })],
    ['change', () => end(randomUUID(), { of: head })],
    ['suspension', () => suspend({ of: head })],
    ['reinstatement', () => reinstate({ of: head })],
  ])('%s', async (_case, act) => {
    const before = await tableState();
    expect(seen(await act())).toEqual(refusal(403, 'own-record'));
    expect(await tableState()).toEqual(before);
  });
});

describe('control roles are the administrator’s', () => {
  test.each(['risk-officer', 'auditor'] as const)('%s is not touched', async (role) => {
    const member = await makeMember(desk, role);
    const before = await tableState();
    for (const act of [
      setRole('analyst', { of: member }),
      change({ permission: 'price', effect: 'withdraw' }, { of: member }),
      end(randomUUID(), { of: member }),
      suspend({ of: member }),
      reinstate({ of: member }),
    ])
      expect(seen(await act)).toEqual(refusal(403, 'control-role'));
    expect(await tableState()).toEqual(before);
  });

  test.each(['risk-officer', 'auditor'] as const)('%s is not given', async (role) => {
    expect(issueOf(await setRole(role))).toEqual([422, 'role', 'unknown-name']);
  });
});

describe('maker and checker stay two people', () => {
  const grant = (permission: string, version = 0, endsOn: string | null = null) =>
    change({ permission, effect: 'grant', endsOn }, { version });

  test('a grant that would join them is refused', async () => {
    const before = await tableState();
    expect(seen(await grant('approve-market-data'))).toEqual(refusal(409, 'segregation-broken'));
    expect(await tableState()).toEqual(before);
  });

  test('so is one that would join them once a withdrawal has ended', async () => {
    const lastDay = addDays(today(), 7);
    await change({ permission: 'enter-market-data', effect: 'withdraw', endsOn: lastDay });
    expect((await grant('approve-market-data', 1)).body.code).toBe('segregation-broken');
    expect((await grant('approve-market-data', 1, lastDay)).status).toBe(201);
  });

  test('and the end of a withdrawal, and a role, that would join them', async () => {
    const withdrawn = await change({ permission: 'enter-market-data', effect: 'withdraw' });
    await grant('approve-market-data', 1);
    const early = await end(withdrawn.body.changes[0].id, { version: 2 });
    expect(seen(early)).toEqual(refusal(409, 'segregation-broken'));
    expect(seen(await setRole('desk-head', { version: 2 }))).toEqual(
      refusal(409, 'segregation-broken'),
    );
  });
});

describe('a change that makes no sense is named at its field', () => {
  test.each<[string, Change, string, string]>([
    [
      'granted although held',
      { permission: 'price', effect: 'grant' },
      'permission',
      'already-held',
    ],
    [
      'withdrawn although not held',
      { permission: 'approve-trades', effect: 'withdraw' },
      'permission',
      'not-held',
    ],
    ['unknown', { permission: 'fly', effect: 'grant' }, 'permission', 'unknown-name'],
    [
      'ended before it begins',
      { permission: 'export-history', effect: 'grant', endsOn: '2020-02-29' },
      'endsOn',
      'past-date',
    ],
    [
      'ended on no day',
      { permission: 'export-history', effect: 'grant', endsOn: '2027-02-29' },
      'endsOn',
      'wrong-format',
    ],
  ])('%s', async (_case, given, path, code) => {
    expect(issueOf(await change(given))).toEqual([422, path, code]);
  });

  test('granted although withdrawn', async () => {
    await change({ permission: 'price', effect: 'withdraw' });
    const answer = await change({ permission: 'price', effect: 'grant' }, { version: 1 });
    expect(issueOf(answer)).toEqual([422, 'permission', 'withdrawn']);
  });

  test('the same role again', async () => {
    expect(issueOf(await setRole('analyst'))).toEqual([422, 'role', 'unchanged']);
  });

  test('no reason', async () => {
    const body = { role: 'desk-head', reason: '  so   ', version: 0 };
    const answer = await call(people.setRole, { ...target({}), body });
    expect(issueOf(answer)).toEqual([422, 'reason', 'out-of-range']);
  });
});

test('a change against an older version is refused', async () => {
  await setRole('desk-head');
  expect(seen(await suspend({ version: 0 }))).toEqual(refusal(409, 'stale-version'));
  expect(seen(await suspend({ version: 2 }))).toEqual(refusal(409, 'stale-version'));
});

test('someone who is no member of this desk is not found', async () => {
  const other = await makeMember(await makeDesk(), 'analyst');
  expect(seen(await suspend({ of: other }))).toEqual(refusal(404, 'not-found'));
});

test('a change of another member, or another desk, is not ended by its id', async () => {
  const other = await makeMember(desk, 'analyst');
  const { id } = await makeGrant(desk, other.user, 'export-history');
  expect(seen(await end(id))).toEqual(refusal(404, 'not-found'));
  const elsewhere = await makeDesk();
  await makeMembership(elsewhere, analyst.user, 'analyst');
  const foreign = await makeGrant(elsewhere, analyst.user, 'export-history');
  expect(seen(await end(foreign.id))).toEqual(refusal(404, 'not-found'));
});

describe('the last desk head who can act', () => {
  let deputy: TestMember;
  beforeEach(async () => {
    deputy = await makeMember(desk, 'analyst');
    await makeGrant(desk, deputy.user, 'manage-people');
  });

  const attempts: [string, () => PromiseLike<Response>, string][] = [
    ['is not demoted', () => setRole('analyst', { by: deputy, of: head }), 'role'],
    ['is not suspended', () => suspend({ by: deputy, of: head }), ''],
    [
      'keeps the desk’s people',
      () => change({ permission: 'manage-people', effect: 'withdraw' }, { by: deputy, of: head }),
      'permission',
    ],
  ];
  test.each(attempts)('%s', async (_case, act, path) => {
    await makeMember(desk, 'desk-head', suspended());
    expect(issueOf(await act())).toEqual([422, path, 'last-desk-head']);
  });

  test.each(attempts)('%s, unless there is another', async (_case, act) => {
    await makeMember(desk, 'desk-head');
    expect((await act()).status).toBeLessThan(300);
  });
});

test('of two heads who demote each other at once, one remains', async () => {
  const second = await makeMember(desk, 'desk-head');
  const answers = await Promise.all([
    setRole('analyst', { by: head, of: second }),
    setRole('analyst', { by: second, of: head }),
  ]);
  expect(answers.map(({ status }) => status).sort()).toEqual([200, 403]);
  expect(await Membership.count({ where: { deskId: desk.id, role: 'desk-head' } })).toBe(1);
});

test('of many changes against one version, one alone succeeds', async () => {
  const answers = await Promise.all(Array.from({ length: 6 }, () => suspend()));
  expect(answers.map(({ status }) => status).sort()).toEqual([200, 409, 409, 409, 409, 409]);
  expect(await Grant.count({ where: { deskId: desk.id } })).toBe(1);
});

test('a grant sent twice under one key is made once', async () => {
  const key = randomUUID();
  const given: Change = { permission: 'export-history', effect: 'grant' };
  const [first, second] = [await change(given, { key }), await change(given, { key })];
  expect(second.status).toBe(201);
  expect(second.body).toEqual(first.body);
  expect(await Grant.count({ where: { deskId: desk.id } })).toBe(1);
  const other = await change({ permission: 'read-audit-log', effect: 'grant' }, { key });
  expect(seen(other)).toEqual(refusal(409, 'idempotency-key-reused'));
  expect(await IdempotencyKey.count({ where: { userId: head.user.id } })).toBe(1);
});

test('the list of changes names people, permission and reason, newest first, of one member or all', async () => {
  await change({ permission: 'export-history', effect: 'grant', endsOn: addDays(today(), 3) });
  const other = await makeMember(desk, 'analyst');
  await suspend({ of: other });
  const list = (query = {}) =>
    call(people.listAccessEvents, { params: { deskId: desk.id }, query, token: head.token });
  const all = await list();
  expect(all.body.items.map(({ kind }: { kind: string }) => kind)).toEqual([
    'suspended',
    'permission-granted',
  ]);
  const one = await list({ userId: analyst.user.id });
  expect(one.body).toMatchObject({
    nextCursor: null,
    items: [
      {
        kind: 'permission-granted',
        permission: 'export-history',
        subject: { id: analyst.user.id, name: analyst.user.name },
        madeBy: { id: head.user.id, name: head.user.name },
        endsOn: addDays(today(), 3),
        reason,
      },
    ],
  });
});
