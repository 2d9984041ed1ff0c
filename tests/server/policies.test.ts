/** Pricing policies: one in force, four eyes, and the tolerance that quotes are judged by. */
import { asSuperuser } from './support/environment';
import { policyActs } from './support/market-data';
import { call, withServer } from './support/server';
import { randomUUID } from 'node:crypto';
import { sequelize } from '@/server/database';
import { ChainEntry } from '@/server/models/chain-entry';
import type { Desk } from '@/server/models/desk';
import type { Underlying } from '@/server/models/underlying';
import { methodSummaries, routesFor } from '@/pricing/index';
import { activePolicy, toleranceOf } from '@/server/services/policies';
import { policyMethods } from '@/shared/contracts/policies';
import { createQuote } from '@/shared/contracts/quotes';
import { listUnderlyings } from '@/shared/contracts/underlyings';
import { makeUnderlying } from '../factories/market';
import { makeDesk, makeMember, type TestMember } from '../factories/people';
import { quoteDraft } from '../factories/quotes';

withServer();

let desk: Desk;
let wheat: Underlying;
let officer: TestMember;
let second: TestMember;
let analyst: TestMember;
let acts: ReturnType<typeof policyActs>;

beforeEach(async () => {
  desk = await makeDesk();
  wheat = await makeUnderlying(desk);
  officer = await makeMember(desk, 'risk-officer');
  second = await makeMember(desk, 'risk-officer');
  analyst = await makeMember(desk, 'analyst');
  acts = policyActs(desk);
});

const draft = () => ({
  primaryEuropean: 'closed-form',
  checkEuropean: 'heat-crank-nicolson',
  primaryAmerican: 'heat-crank-nicolson',
  checkAmerican: 'lattice-symmetric',
  refinement: { by: 'tolerance', share: 0.2 },
  unitTolerance: { [wheat.id]: 0.004 },
  moneyTolerance: { EUR: '1.00' },
  reason: 'First policy of the desk',
});

async function inForce(changes: object = {}) {
  const { body } = await acts.write(officer, { ...draft(), ...changes });
  const answer = await acts.approve(second, body);
  expect([answer.status, answer.body.issues]).toEqual([200, undefined]);
  return answer.body;
}

test('the routes to choose from are the engine’s own', () => {
  const market = { spot: 100, rate: 0.03, yield: 0.01, volatility: 0.2 };
  for (const exercise of ['european', 'american'] as const) {
    const contract = { payoff: 'vanilla', exercise, kind: 'put', strike: 100, expiry: 1 } as const;
    const allowed: readonly string[] = policyMethods[exercise];
    expect(routesFor(contract, market)).toEqual(allowed.slice(0, 3));
    const known = methodSummaries.map(({ name }) => name);
    for (const name of allowed) expect(known).toContain(name);
  }
});

test('a policy is written by one and put in force by another; the one before is superseded', async () => {
  const first = await inForce();
  expect(first).toMatchObject({
    number: 1,
    status: 'approved',
    approvedBy: { id: second.user.id },
  });
  const next = await inForce({
    refinement: { by: 'sizes', sizes: { 'lattice-crr': { steps: 500 } } },
  });
  expect(await acts.list(analyst)).toMatchObject([
    {
      id: next.id,
      number: 2,
      status: 'approved',
      refinement: { sizes: { 'lattice-crr': { steps: 500 } } },
    },
    { id: first.id, number: 1, status: 'superseded', unitTolerance: first.unitTolerance },
  ]);
  expect((await activePolicy(desk.id))?.id).toBe(next.id);
});

test('approval is sealed in the desk’s records', async () => {
  const policy = await inForce();
  const [entry] = await ChainEntry.findAll({ where: { subjectId: policy.id } });
  expect(JSON.parse(entry.body)).toMatchObject({
    kind: 'policy',
    event: 'approved',
    by: second.user.id,
    subject: { type: 'pricing-policy', id: policy.id, version: 1 },
    details: { number: 1, unitTolerance: { [wheat.id]: 0.004 }, moneyTolerance: { EUR: '1.00' } },
  });
});

test('nobody puts in force what they wrote or saved', async () => {
  const { body } = await acts.write(officer, draft());
  expect((await acts.approve(officer, body)).body.code).toBe('own-work');
  const saved = await acts.save(second, body, { ...draft(), reason: 'A word was put right' });
  expect(saved.body).toMatchObject({ version: 1, makerIds: [officer.user.id, second.user.id] });
  expect((await acts.approve(second, saved.body)).body.code).toBe('own-work');
  expect((await acts.approve(await makeMember(desk, 'risk-officer'), saved.body)).status).toBe(200);
});

test('of two approvals one wins, and a change of an older version is refused', async () => {
  const { body } = await acts.write(officer, draft());
  const third = await makeMember(desk, 'risk-officer');
  const answers = await Promise.all([acts.approve(second, body), acts.approve(third, body)]);
  expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
  const lost = answers.find(({ status }) => status === 409);
  expect(lost?.body.issues[0].message).toBe('Someone was first: policy 1 is no draft any more.');
  expect((await acts.save(officer, body, draft())).body.code).toBe('wrong-state');
});

test('a second draft waits for the first', async () => {
  await acts.write(officer, draft());
  const answer = await acts.write(second, draft());
  expect([answer.status, answer.body.issues[0].message]).toEqual([
    409,
    'Policy 1 is a draft already; change that one.',
  ]);
});

test('says everything that is wrong, at its place', async () => {
  const stranger = randomUUID();
  const wrongShape = await acts.write(officer, {
    ...draft(),
    primaryAmerican: 'closed-form',
    checkEuropean: 'heat-explicit',
    refinement: { by: 'sizes', sizes: { 'lattice-crr': { steps: 9_999 } } },
    moneyTolerance: { EUR: '0' },
  });
  expect(wrongShape.body.issues.map(({ path }) => path)).toEqual([
    'checkEuropean',
    'primaryAmerican',
    'refinement.sizes.lattice-crr.steps',
    'moneyTolerance.EUR',
  ]);
  const itself = await acts.write(officer, { ...draft(), checkEuropean: 'closed-form' });
  expect(itself.body.issues).toMatchObject([
    { path: 'checkEuropean', message: 'A route cannot check itself; choose another.' },
  ]);
  const unknown = await acts.write(officer, {
    ...draft(),
    unitTolerance: { [stranger]: 0.1 },
    moneyTolerance: { USD: '10' },
  });
  expect(unknown.body.issues.map(({ path }) => path)).toEqual([
    `unitTolerance.${stranger}`,
    'moneyTolerance.USD',
  ]);
});

test('an approved policy is not changed by the role that serves', async () => {
  const { id } = await inForce();
  const refusal = /is refused|permission denied/;
  for (const sql of [
    "UPDATE pricing_policies SET reason = 'Something else' WHERE id = $id",
    "UPDATE pricing_policies SET unit_tolerance = '{}' WHERE id = $id",
    'DELETE FROM pricing_policies WHERE id = $id',
  ])
    await expect(sequelize.query(sql, { bind: { id } })).rejects.toThrow(refusal);
  await expect(
    asSuperuser("UPDATE pricing_policies SET reason = 'Something else' WHERE id = $1", [id]),
  ).rejects.toThrow(refusal);
});

describe('the tolerance', () => {
  const size = { quantity: '10', contractSize: '50' };

  test('is the underlying’s own until a policy is in force', async () => {
    await acts.write(officer, draft());
    expect(toleranceOf(await activePolicy(desk.id), wheat, size)).toBe(wheat.tolerance);
  });

  test('is the stricter of the one per unit and the one in money', async () => {
    await inForce();
    const policy = await activePolicy(desk.id);
    // 1.00 EUR over 500 units; the policy asks 0.004 per unit besides.
    expect(toleranceOf(policy, wheat, size)).toBe(0.002);
    expect(toleranceOf(policy, wheat, { ...size, quantity: '1' })).toBe(0.004);
  });

  test('is the one that quotes are judged by, and that the ticket is told', async () => {
    await inForce();
    const params = { deskId: desk.id };
    const { body } = await call(listUnderlyings, { params, token: analyst.token });
    expect(body.underlyings).toMatchObject([{ tolerance: 0.004, moneyTolerance: '1.00' }]);
    const terms = { ...quoteDraft(wheat), ...size };
    const quote = await call(createQuote, { params, token: analyst.token, body: terms });
    expect([quote.status, quote.body.tolerance]).toEqual([201, 0.002]);
  });

  test('of an underlying that the policy leaves out stays its own', async () => {
    await inForce({ unitTolerance: {}, moneyTolerance: {} });
    expect(toleranceOf(await activePolicy(desk.id), wheat, size)).toBe(wheat.tolerance);
  });
});
