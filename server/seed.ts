/**
 * Demonstration data, all invented: the Tarnfield Cooperative hedges grain, freight and currency.
 * Everything is made through the services, by people who may do it; nothing happens in a database
 * that has users already.
 */
import { sequelize } from './database';
import { log } from './log';
import type { Desk } from './models/desk';
import { seedCloses } from './seed/closes';
import { actorOn, personNamed, seedChanges, seedPeople, type People } from './seed/people';
import { seedPolicies } from './seed/policies';
import { seedQuotes, type Listed } from './seed/quotes';
import { commodityBooks, seedTrades, treasuryBooks } from './seed/trades';
import { commodities, treasury, type SeedUnderlying } from './seed/underlyings';
import { writeDemonstration } from './seed/unfinished';
import { createDesk } from './services/firm';
import { closePasswordThreads } from './services/passwords';
import { closePricingThreads } from './services/pricing';
import { createUnderlying } from './services/underlyings';

async function list(desk: Desk, underlyings: readonly SeedUnderlying[]): Promise<Listed[]> {
  const listed: Listed[] = [];
  for (const underlying of underlyings) {
    const { market, ...draft } = underlying;
    listed.push({ id: await createUnderlying(desk, draft), underlying });
  }
  return listed;
}

async function fillDesk(
  desk: Desk,
  people: People,
  underlyings: readonly SeedUnderlying[],
  accounts: { makers: string[]; checkers: [string, string] },
  patternCount: number,
) {
  const makers = accounts.makers.map((account) => personNamed(people, account));
  const listed = await list(desk, underlyings);
  const actors = await Promise.all(makers.map((maker) => actorOn(desk, maker)));
  const [checker, second] = await Promise.all(
    accounts.checkers.map((account) => actorOn(desk, personNamed(people, account))),
  );
  await seedPolicies(listed, checker, second);
  await seedCloses({ listed, maker: actors[0], checker, seed: desk.name });
  await seedQuotes(actors, listed, patternCount);
}

async function write() {
  const grain = await createDesk({
    name: 'Commodities',
    timeZone: 'Europe/Berlin',
    expiryCutoff: '17:30',
  });
  const money = await createDesk({
    name: 'Treasury',
    timeZone: 'Europe/Berlin',
    expiryCutoff: '14:00',
  });
  const people = await seedPeople([grain, money]);
  const checkers: [string, string] = ['risk-officer', 'second-risk-officer'];
  const grainMakers = ['analyst', 'second-analyst', 'desk-head'];
  await fillDesk(grain, people, commodities, { makers: grainMakers, checkers }, 4);
  const moneyMakers = ['treasury-analyst', 'treasury-desk-head'];
  await fillDesk(money, people, treasury, { makers: moneyMakers, checkers }, 3);
  const actorsOn = (desk: Desk, accounts: readonly string[]) =>
    Promise.all(accounts.map((account) => actorOn(desk, personNamed(people, account))));
  await seedTrades({
    books: commodityBooks,
    proposers: await actorsOn(grain, ['analyst', 'second-analyst']),
    approvers: await actorsOn(grain, ['desk-head', 'second-desk-head']),
    count: 140,
  });
  await seedTrades({
    books: treasuryBooks,
    proposers: await actorsOn(money, ['treasury-analyst']),
    approvers: await actorsOn(money, ['treasury-desk-head']),
    count: 60,
  });
  await seedChanges(grain, people);
}

async function seed() {
  try {
    const isNew = await writeDemonstration(write);
    log.info(isNew ? 'demonstration data written' : 'the database has users; nothing to write');
  } finally {
    await Promise.all([closePasswordThreads(), closePricingThreads()]);
    await sequelize.close();
  }
}

seed().catch((error) => {
  log.fatal({ err: error }, 'the demonstration data could not be written');
  process.exitCode = 1;
});
