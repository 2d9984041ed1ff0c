/** The demonstration: complete after one run, left alone by the next, begun anew after a kill. */
import {
  asSuperuser,
  createEmptyDatabase,
  dropDatabase,
  removeFolder,
  testEnvironment,
} from './support/environment';
import { until } from './support/until';
import { spawn, type ChildProcess } from 'node:child_process';
import path from 'node:path';
import signIns from '@/server/seed/sign-ins.json';

jest.setTimeout(240_000);

const root = path.join(__dirname, '..', '..');

function startSeed(): ChildProcess {
  const args = ['--require', 'tsx/cjs', path.join(root, 'server', 'seed.ts')];
  return spawn(process.execPath, args, {
    cwd: root,
    env: { ...process.env, ...testEnvironment },
    stdio: ['ignore', 'inherit', 'inherit'],
  });
}

const ended = (child: ChildProcess) =>
  new Promise<number | null>((resolve) => child.once('close', resolve));

async function count(sql: string): Promise<number> {
  const [{ found }] = await asSuperuser<{ found: number }>(
    `SELECT count(*)::integer AS found FROM ${sql}`,
  );
  return found;
}

beforeAll(async () => {
  await createEmptyDatabase();
});
afterAll(async () => {
  await dropDatabase();
  removeFolder();
});

test('a run that is killed half-way is taken back and begun anew', async () => {
  const killed = startSeed();
  const isUnderWay = async () => {
    const [{ present }] = await asSuperuser<{ present: boolean }>(
      "SELECT to_regclass('public.underlyings') IS NOT NULL AS present",
    );
    return present && (await count('underlyings')) > 0;
  };
  await until(isUnderWay);
  killed.kill('SIGKILL');
  await ended(killed);
  expect(await count('users')).toBeGreaterThan(0);

  expect(await ended(startSeed())).toBe(0);
  const people = new Set(signIns.map(({ email }) => email));
  expect(await count('users')).toBe(people.size + 1);
  expect(await count('memberships')).toBe(signIns.length);
  expect(await count('desks')).toBe(2);
});

test('what it writes is what the screens need', async () => {
  for (const desk of ['Commodities', 'Treasury']) {
    const ofDesk = `WHERE desk_id = (SELECT id FROM desks WHERE name = '${desk}')`;
    expect(await count(`underlyings ${ofDesk}`)).toBeGreaterThanOrEqual(4);
    expect(await count(`quotes ${ofDesk}`)).toBeGreaterThanOrEqual(12);
    const closes = `market_snapshots ${ofDesk}`;
    expect(await count(`${closes} AND status = 'approved'`)).toBeGreaterThanOrEqual(40);
    expect(await count(`${closes} AND status = 'draft'`)).toBe(1);
    expect(await count(`${closes} AND status = 'superseded'`)).toBe(1);
    const policies = `pricing_policies ${ofDesk}`;
    expect(await count(`${policies} AND status = 'approved'`)).toBe(1);
    expect(await count(`${policies} AND status = 'draft'`)).toBe(1);
    const trades = `trades ${ofDesk}`;
    expect(await count(`${trades} AND status = 'returned'`)).toBe(1);
    expect(await count(`${trades} AND status = 'proposed'`)).toBe(4);
    const runs = `valuation_runs ${ofDesk}`;
    expect(await count(`${runs} AND status = 'signed-off'`)).toBeGreaterThanOrEqual(35);
    expect(await count(`${runs} AND status = 'finished'`)).toBe(1);
  }
  expect(await count('trades')).toBe(200);
  const exceptions = 'run_exceptions';
  expect(await count(`${exceptions} WHERE kind = 'disagree' AND state = 'open'`)).toBe(1);
  expect(await count(`${exceptions} WHERE answer_kind = 'study'`)).toBeGreaterThanOrEqual(1);
  expect(await count(`${exceptions} WHERE override_value IS NOT NULL`)).toBeGreaterThanOrEqual(1);
  expect(await count("studies WHERE status = 'finished'")).toBeGreaterThanOrEqual(1);
  expect(await count('memberships WHERE suspended_at IS NOT NULL')).toBe(1);
  expect(await count('grants WHERE ends_on > current_date')).toBeGreaterThanOrEqual(1);
  expect(await count("quotes WHERE verdict = 'wide'")).toBeGreaterThanOrEqual(1);
  expect(await count("quotes WHERE verdict = 'agree'")).toBeGreaterThanOrEqual(40);
  expect(await count("quotes WHERE verdict = 'disagree' OR refuted")).toBe(0);
});

test('a second run changes nothing', async () => {
  const before = await count('quotes');
  expect(await ended(startSeed())).toBe(0);
  expect(await count('quotes')).toBe(before);
});
