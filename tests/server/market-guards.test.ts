/** What was approved stays as it is, whoever asks the database to change it. */
import { asSuperuser } from './support/environment';
import { closeActs, dayBefore, quotesOf } from './support/market-data';
import { withServer } from './support/server';
import { sequelize } from '@/server/database';
import type { Desk } from '@/server/models/desk';
import type { Underlying } from '@/server/models/underlying';
import type { Snapshot } from '@/shared/contracts/market-data';
import { makeUnderlying } from '../factories/market';
import { makeDesk, makeMember, type TestMember } from '../factories/people';

withServer();

let desk: Desk;
let wheat: Underlying;
let analyst: TestMember;
let officer: TestMember;
let acts: ReturnType<typeof closeActs>;

beforeEach(async () => {
  desk = await makeDesk();
  wheat = await makeUnderlying(desk);
  analyst = await makeMember(desk, 'analyst');
  officer = await makeMember(desk, 'risk-officer');
  acts = closeActs(desk);
});

async function approved(): Promise<Snapshot> {
  const draft = { date: dayBefore(desk, 1), quotes: quotesOf([wheat]) };
  return (await acts.approve(officer, (await acts.enter(analyst, draft)).body)).body;
}

describe('as the role that serves', () => {
  const refusal = /is refused|permission denied/;
  const attempt = (sql: string, id: string) => sequelize.query(sql, { bind: { id } });

  test.each([
    "UPDATE market_snapshots SET date = '2020-01-01' WHERE id = $id",
    "UPDATE market_snapshots SET status = 'draft', approved_by_id = NULL, approved_at = NULL WHERE id = $id",
    "UPDATE market_snapshots SET status = 'superseded', superseded_by_id = $id, date = '2020-01-01' WHERE id = $id",
    'UPDATE market_snapshots SET entered_by_id = entered_by_id WHERE id = $id',
    'DELETE FROM market_snapshots WHERE id = $id',
    'UPDATE market_quotes SET spot = 1 WHERE snapshot_id = $id',
    'DELETE FROM market_quotes WHERE snapshot_id = $id',
    'INSERT INTO market_quotes SELECT * FROM market_quotes WHERE snapshot_id = $id',
  ])('an approved close stays: %s', async (sql) => {
    const close = await approved();
    await expect(attempt(sql, close.id)).rejects.toThrow(refusal);
    expect(await acts.read(officer, close.id)).toEqual(close);
  });

  test.each(['market_snapshots', 'market_quotes', 'pricing_policies'])(
    '%s is not emptied, by its owner either',
    async (table) => {
      await expect(sequelize.query(`TRUNCATE ${table} CASCADE`)).rejects.toThrow(refusal);
      await expect(asSuperuser(`TRUNCATE ${table} CASCADE`)).rejects.toThrow(refusal);
    },
  );

  test('a close cannot begin as an approved one', async () => {
    await expect(
      sequelize.query(
        `INSERT INTO market_snapshots (id, desk_id, date, status, entered_by_id, entered_at,
           approved_by_id, approved_at)
         VALUES (gen_random_uuid(), $desk, '2026-01-05', 'approved', $maker, now(), $by, now())`,
        { bind: { desk: desk.id, maker: analyst.user.id, by: officer.user.id } },
      ),
    ).rejects.toThrow(refusal);
  });
});
