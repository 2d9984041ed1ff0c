/** Verifying through the service: started by a request, done by a worker, read again. */
import { asSuperuser } from './support/environment';
import { workOff } from './support/queue';
import { call, withServer } from './support/server';
import { chainOf } from '@/server/chain/append';
import { keyIdOf, readPublicKey } from '@/server/chain/signature';
import { ChainEntry } from '@/server/models/chain-entry';
import type { Desk } from '@/server/models/desk';
import {
  getChains,
  getVerification,
  startVerification,
  type Chain,
  type Verification,
} from '@/shared/contracts/chain';
import { changePermission } from '@/shared/contracts/people';
import { makeDesk, makeMember, type TestMember } from '../factories/people';
import { recordBody, storeRecord } from '../factories/valuations';

withServer();

let desk: Desk;
let auditor: TestMember;

beforeEach(async () => {
  desk = await makeDesk();
  auditor = await makeMember(desk, 'auditor');
  for (let count = 0; count < 3; count += 1)
    await storeRecord(desk, recordBody({ details: { count } }));
});

async function start(held: { position: number; hash: string } | null = null) {
  const answer = await call(startVerification, {
    params: { deskId: desk.id },
    body: { chain: 'records', held },
    token: auditor.token,
  });
  expect(answer.status).toBe(201);
  const verification: Verification = answer.body;
  return verification;
}

async function read(verificationId: string): Promise<Verification> {
  const params = { deskId: desk.id, verificationId };
  return (await call(getVerification, { params, token: auditor.token })).body;
}

async function readRecords(): Promise<Chain> {
  const answer = await call(getChains, { params: { deskId: desk.id }, token: auditor.token });
  expect(answer.status).toBe(200);
  const { publicKey, chains } = answer.body;
  expect(keyIdOf(readPublicKey(publicKey.pem))).toBe(publicKey.keyId);
  return chains.find(({ kind }: Chain) => kind === 'records');
}

test('an intact chain: queued, then finished without a break', async () => {
  const queued = await start();
  expect(queued).toMatchObject({ status: 'queued', total: 3, checked: 0, firstBreak: null });
  await workOff();
  expect(await read(queued.id)).toMatchObject({
    status: 'finished',
    total: 3,
    checked: 3,
    anchors: 0,
    firstBreak: null,
    startedBy: { id: auditor.user.id },
  });
  expect((await readRecords()).verifications.map(({ id }) => id)).toEqual([queued.id]);
});

test('a row that was changed: the finished verification names it', async () => {
  await asSuperuser(
    `ALTER TABLE chain_entries DISABLE TRIGGER ALL;
     UPDATE chain_entries SET body = replace(body, '"count":1', '"count":9')
       WHERE chain = '${chainOf('records', desk.id)}';
     ALTER TABLE chain_entries ENABLE TRIGGER ALL`,
  );
  const { id } = await start();
  await workOff();
  expect(await read(id)).toMatchObject({
    status: 'finished',
    checked: 1,
    firstBreak: { kind: 'hash', position: 2 },
  });
});

test('a hash that someone kept is compared besides', async () => {
  const { hash, position } = await readRecords();
  const fits = await start({ position, hash });
  const differs = await start({ position, hash: 'f'.repeat(64) });
  await workOff();
  expect((await read(fits.id)).firstBreak).toBeNull();
  expect((await read(differs.id)).firstBreak).toEqual({ kind: 'held-hash', position });
});

test('asked twice while the work is under way, it is done once', async () => {
  const [first, second] = [await start(), await start()];
  expect(second.id).toBe(first.id);
  await workOff();
  expect((await start()).id).not.toBe(first.id);
});

test('a verification of another desk is not found', async () => {
  const { id } = await start();
  const other = await makeDesk();
  const { token } = await makeMember(other, 'auditor');
  const params = { deskId: other.id, verificationId: id };
  const answer = await call(getVerification, { params, token });
  expect(answer.status).toBe(404);
});

test('a change of what someone may do is sealed into the records, without an address', async () => {
  const { user, token } = await makeMember(desk, 'desk-head');
  const { user: analyst } = await makeMember(desk, 'analyst');
  const answer = await call(changePermission, {
    params: { deskId: desk.id, userId: analyst.id },
    body: { ...(changePermission.bodyExample as object), version: 0 },
    token,
  });
  expect(answer.status).toBe(201);
  const entries = await ChainEntry.findAll({
    where: { chain: chainOf('records', desk.id), kind: 'permission-change' },
  });
  expect(entries).toHaveLength(1);
  expect(JSON.parse(entries[0].body)).toMatchObject({
    event: 'permission-granted',
    subject: { type: 'member', id: analyst.id },
    by: user.id,
    reason: 'Prepares the quarterly file',
    details: { permission: 'export-history' },
  });
  expect(entries[0].body).not.toContain('@');
});
