/** Someone who may do anything to the database: what they did is named, with its place. */
import { asSuperuser } from '../support/environment';
import { withOwnDatabase } from '../support/server';
import { anchorHead } from '@/server/chain/anchors';
import { chainOf, type ChainKind } from '@/server/chain/append';
import { verifyChain, type HeldPlace } from '@/server/chain/verify';
import { sequelize } from '@/server/database';
import { ChainEntry } from '@/server/models/chain-entry';
import { makeUnderlying } from '../../factories/market';
import { makeDesk } from '../../factories/people';
import {
  recordBody,
  storeRecord,
  storeValuations,
  valuationPair,
} from '../../factories/valuations';

withOwnDatabase();

const nothing = async () => undefined;
const verify = (chain: string, held: HeldPlace | null = null) => verifyChain(chain, held, nothing);

/** A chain of ten entries, its head signed after the sixth unless told otherwise. */
async function makeChain(kind: ChainKind = 'records', signedAfter: number | null = 6) {
  const desk = await makeDesk();
  const chain = chainOf(kind, desk.id);
  const underlying = kind === 'valuations' ? await makeUnderlying(desk) : null;
  for (let count = 1; count <= 10; count += 1) {
    if (underlying) await storeValuations(desk, [valuationPair(underlying)[0]]);
    else await storeRecord(desk, recordBody({ details: { price: 212.4 + count } }));
    if (count === signedAfter)
      await sequelize.transaction((transaction) => anchorHead(transaction, chain, 'sign-off'));
  }
  return chain;
}

/** The triggers fire for everyone, so whoever wants to tamper drops the guard first. */
const tamper = (sql: string) =>
  asSuperuser(`
    BEGIN;
    ALTER TABLE chain_entries DISABLE TRIGGER ALL;
    ALTER TABLE chain_heads DISABLE TRIGGER ALL;
    ALTER TABLE chain_anchors DISABLE TRIGGER ALL;
    ${sql};
    ALTER TABLE chain_entries ENABLE TRIGGER ALL;
    ALTER TABLE chain_heads ENABLE TRIGGER ALL;
    ALTER TABLE chain_anchors ENABLE TRIGGER ALL;
    COMMIT`);

/** Hashes everything behind a place anew, so that the chain fits together again. */
const sealAgain = (chain: string, from: number) => `
  DO $seal$
  DECLARE
    entry record;
    sealed text := coalesce((SELECT hash FROM chain_entries
      WHERE chain = '${chain}' AND position = ${from - 1}), repeat('0', 64));
  BEGIN
    FOR entry IN SELECT * FROM chain_entries
        WHERE chain = '${chain}' AND position >= ${from} ORDER BY position LOOP
      UPDATE chain_entries SET previous = sealed,
        hash = chain_hash(sealed, chain, position, at, body)
        WHERE chain = entry.chain AND position = entry.position;
      sealed := chain_hash(sealed, entry.chain, entry.position, entry.at, entry.body);
    END LOOP;
    UPDATE chain_heads SET hash = sealed, position = (SELECT max(position) FROM chain_entries
      WHERE chain = '${chain}'), at = (SELECT max(at) FROM chain_entries WHERE chain = '${chain}')
      WHERE chain = '${chain}';
  END
  $seal$`;

const where = (chain: string, position: number) =>
  `WHERE chain = '${chain}' AND position = ${position}`;

test.each(['valuations', 'records'] as const)('%s that nobody touched are whole', async (kind) => {
  const chain = await makeChain(kind);
  expect(await verify(chain)).toEqual({ checked: 10, total: 10, anchors: 1, firstBreak: null });
});

test('an empty chain is whole', async () => {
  const desk = await makeDesk();
  const found = await verify(chainOf('records', desk.id));
  expect(found).toEqual({ checked: 0, total: 0, anchors: 0, firstBreak: null });
});

test('one digit of a value', async () => {
  const chain = await makeChain('valuations');
  await tamper(
    `UPDATE chain_entries SET body = replace(body, '"spot":212.4', '"spot":212.5') ${where(chain, 4)}`,
  );
  expect(await verify(chain)).toMatchObject({
    checked: 3,
    firstBreak: { kind: 'hash', position: 4 },
  });
});

test('the time of an entry', async () => {
  const chain = await makeChain();
  await tamper(`UPDATE chain_entries SET at = '2020-01-01T00:00:00.000000Z' ${where(chain, 5)}`);
  expect((await verify(chain)).firstBreak).toEqual({ kind: 'hash', position: 5 });
});

test('a digit whose hash was made to fit', async () => {
  const chain = await makeChain();
  await tamper(`
    UPDATE chain_entries SET body = replace(body, '215.4', '215.5') ${where(chain, 3)};
    UPDATE chain_entries SET hash = chain_hash(previous, chain, position, at, body)
      ${where(chain, 3)}`);
  expect((await verify(chain)).firstBreak).toEqual({ kind: 'previous', position: 4 });
});

test('one row removed', async () => {
  const chain = await makeChain();
  await tamper(`DELETE FROM chain_entries ${where(chain, 7)}`);
  expect((await verify(chain)).firstBreak).toEqual({ kind: 'missing', position: 7 });
});

test('one row removed and the rest moved up', async () => {
  const chain = await makeChain();
  await tamper(`
    DELETE FROM chain_entries ${where(chain, 7)};
    UPDATE chain_entries SET position = position - 1 WHERE chain = '${chain}' AND position > 7`);
  expect((await verify(chain)).firstBreak).toEqual({ kind: 'previous', position: 7 });
});

test('two rows exchanged', async () => {
  const chain = await makeChain();
  await tamper(`
    UPDATE chain_entries SET position = 100 ${where(chain, 8)};
    UPDATE chain_entries SET position = 8 ${where(chain, 9)};
    UPDATE chain_entries SET position = 9 ${where(chain, 100)}`);
  expect((await verify(chain)).firstBreak).toEqual({ kind: 'previous', position: 8 });
});

test('a head that was moved back', async () => {
  const chain = await makeChain();
  await tamper(`UPDATE chain_heads SET position = 9 WHERE chain = '${chain}'`);
  expect((await verify(chain)).firstBreak).toEqual({ kind: 'head', position: 10 });
});

test('everything rewritten so that it fits together: the signed head names it', async () => {
  const chain = await makeChain();
  await tamper(`
    UPDATE chain_entries SET body = replace(body, '213.4', '213.5') ${where(chain, 1)};
    ${sealAgain(chain, 1)}`);
  expect((await verify(chain)).firstBreak).toEqual({ kind: 'anchor-hash', position: 6 });
});

test('a rewritten chain whose signed head was rewritten too: its signature names it', async () => {
  const chain = await makeChain();
  await tamper(`
    UPDATE chain_entries SET body = replace(body, '213.4', '213.5') ${where(chain, 1)};
    ${sealAgain(chain, 1)};
    UPDATE chain_anchors SET hash = (SELECT hash FROM chain_entries ${where(chain, 6)})
      WHERE chain = '${chain}'`);
  expect((await verify(chain)).firstBreak).toEqual({ kind: 'signature', position: 6 });
});

test('the tail cut off', async () => {
  const chain = await makeChain();
  await tamper(`DELETE FROM chain_entries WHERE chain = '${chain}' AND position > 8`);
  expect((await verify(chain)).firstBreak).toEqual({ kind: 'missing', position: 9 });
});

test('the tail cut off and the head moved with it: the signed head names it', async () => {
  const chain = await makeChain();
  await tamper(`
    DELETE FROM chain_entries WHERE chain = '${chain}' AND position > 4;
    ${sealAgain(chain, 4)}`);
  expect((await verify(chain)).firstBreak).toEqual({ kind: 'cut', position: 5 });
});

test('rewritten, and every signed head removed: a hash kept outside names it', async () => {
  const chain = await makeChain();
  const kept = await ChainEntry.findOne({ where: { chain, position: 8 }, rejectOnEmpty: true });
  const held = { position: 8, hash: kept.hash };
  expect((await verify(chain, held)).firstBreak).toBeNull();
  await tamper(`
    DELETE FROM chain_anchors WHERE chain = '${chain}';
    UPDATE chain_entries SET body = replace(body, '213.4', '213.5') ${where(chain, 1)};
    ${sealAgain(chain, 1)}`);
  expect((await verify(chain)).firstBreak).toBeNull();
  expect((await verify(chain, held)).firstBreak).toEqual({ kind: 'held-hash', position: 8 });
});

test('the break is found behind the first page as well', async () => {
  const desk = await makeDesk();
  const chain = chainOf('records', desk.id);
  await asSuperuser(`SELECT append($1, $2) FROM generate_series(1, 3)`, [
    chain,
    Array.from({ length: 900 }, () => JSON.stringify(recordBody({ details: { price: 1 } }))),
  ]);
  const seen: number[] = [];
  const onProgress = async ({ checked }: { checked: number }) => void seen.push(checked);
  expect((await verifyChain(chain, null, onProgress)).firstBreak).toBeNull();
  expect(seen).toEqual([1000, 2000, 2700]);
  await tamper(
    `UPDATE chain_entries SET body = replace(body, '"price":1', '"price":2') ${where(chain, 2345)}`,
  );
  expect((await verify(chain)).firstBreak).toEqual({ kind: 'hash', position: 2345 });
});
