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
import { seedLargeTrade } from './seed/large-trade';
import { seedPolicies } from './seed/policies';
import { seedQuotes, type Listed } from './seed/quotes';
import { seedRuns } from './seed/runs';
import { commodityBooks, seedTrades, treasuryBooks, type BookPlan } from './seed/trades';
import { commodities, treasury, type SeedUnderlying } from './seed/underlyings';
import { writeDemonstration } from './seed/unfinished';
import { createDesk } from './services/firm';
import { closePasswordThreads } from './services/passwords';
import { closePricingThreads } from './services/pricing';
import { closeValuationThreads } from './services/run-threads';
import { closeStudyThreads } from './services/study-threads';
import { createUnderlying } from './services/underlyings';

async function list(desk: Desk, underlyings: readonly SeedUnderlying[]): Promise<Listed[]> {
  const listed: Listed[] = [];
  for (const underlying of underlyings) {
    const { market, ...draft } = underlying;
    listed.push({ id: await createUnderlying(desk, draft), underlying });
  }
  return listed;
}

type DeskPlan = {
  desk: { name: string; timeZone: string; expiryCutoff: string };
  underlyings: readonly SeedUnderlying[];
  books: readonly BookPlan[];
  /** Accounts, by what they do; the first of the makers also enters the closes. */
  makers: readonly string[];
  proposers: readonly string[];
  approvers: readonly string[];
  starter: string;
  patternCount: number;
  tradeCount: number;
  largeTrade?: { symbol: string; bookCode: string };
};

const checkers = ['risk-officer', 'second-risk-officer'];

const plans: readonly DeskPlan[] = [
  {
    desk: { name: 'Commodities', timeZone: 'Europe/Berlin', expiryCutoff: '17:30' },
    underlyings: commodities,
    books: commodityBooks,
    makers: ['analyst', 'second-analyst', 'desk-head'],
    proposers: ['analyst', 'second-analyst'],
    approvers: ['desk-head', 'second-desk-head'],
    starter: 'second-desk-head',
    patternCount: 4,
    tradeCount: 139,
    largeTrade: { symbol: 'FREIGHT-Q1', bookCode: 'FREIGHT-EQ' },
  },
  {
    desk: { name: 'Treasury', timeZone: 'Europe/Berlin', expiryCutoff: '14:00' },
    underlyings: treasury,
    books: treasuryBooks,
    makers: ['treasury-analyst', 'treasury-desk-head'],
    proposers: ['treasury-analyst'],
    approvers: ['treasury-desk-head'],
    starter: 'treasury-desk-head',
    patternCount: 3,
    tradeCount: 60,
  },
];

async function fillDesk(desk: Desk, people: People, plan: DeskPlan) {
  const actors = (accounts: readonly string[]) =>
    Promise.all(accounts.map((account) => actorOn(desk, personNamed(people, account))));
  const listed = await list(desk, plan.underlyings);
  const [makers, proposers, approvers] = await Promise.all(
    [plan.makers, plan.proposers, plan.approvers].map(actors),
  );
  const [signer, answerer] = await actors(checkers);
  const [starter] = await actors([plan.starter]);
  await seedPolicies(listed, signer, answerer);
  await seedCloses({ listed, maker: makers[0], checker: signer, seed: desk.name });
  await seedQuotes(makers, listed, plan.patternCount);
  await seedTrades({ books: plan.books, proposers, approvers, count: plan.tradeCount });
  const large = listed.find(({ underlying }) => underlying.symbol === plan.largeTrade?.symbol);
  if (large && plan.largeTrade) {
    const { bookCode } = plan.largeTrade;
    const [[proposer], [approver]] = [proposers, approvers];
    await seedLargeTrade({ listed: large, bookCode, proposer, approver });
  }
  await seedRuns({ starter, answerer, signer });
}

async function write() {
  const desks: Desk[] = [];
  for (const { desk } of plans) desks.push(await createDesk(desk));
  const people = await seedPeople(desks);
  for (const [index, plan] of plans.entries()) await fillDesk(desks[index], people, plan);
  await seedChanges(desks[0], people);
}

async function seed() {
  try {
    const isNew = await writeDemonstration(write);
    log.info(isNew ? 'demonstration data written' : 'the database has users; nothing to write');
  } finally {
    await Promise.all([
      closePasswordThreads(),
      closePricingThreads(),
      closeStudyThreads(),
      closeValuationThreads(),
    ]);
    await sequelize.close();
  }
}

seed().catch((error) => {
  log.fatal({ err: error }, 'the demonstration data could not be written');
  process.exitCode = 1;
});
