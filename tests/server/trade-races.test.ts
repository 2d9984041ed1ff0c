/** Two people at once: one wins, the other is told what became of the trade. */
import { withServer } from './support/server';
import { tradeActs, type Answer } from './support/trades';
import type { Book } from '@/server/models/book';
import type { Desk } from '@/server/models/desk';
import type { Underlying } from '@/server/models/underlying';
import type { Trade } from '@/shared/contracts/trades';
import { makeUnderlying } from '../factories/market';
import { makeDesk, makeMember, type TestMember } from '../factories/people';
import { makeBook, makeTrade } from '../factories/trades';

withServer();

let desk: Desk;
let underlying: Underlying;
let book: Book;
let analyst: TestMember;
let heads: TestMember[];

beforeAll(async () => {
  desk = await makeDesk();
  underlying = await makeUnderlying(desk);
  book = await makeBook(desk);
  analyst = await makeMember(desk, 'analyst');
  heads = [await makeMember(desk, 'desk-head'), await makeMember(desk, 'desk-head')];
});

type Issue = { message: string };
const sentenceOf = ({ body }: Answer) => (body.issues as unknown as Issue[])[0].message;

async function race(
  contest: (trade: Trade, acts: ReturnType<typeof tradeActs>) => Promise<Answer>[],
) {
  const acts = tradeActs(desk);
  const { id } = await makeTrade(book, underlying, analyst.user);
  const trade = await acts.read(analyst, id);
  const answers = await Promise.all(contest(trade, acts));
  const lost = answers.filter(({ status }) => status === 409);
  return { answers, lost, after: await acts.read(analyst, id) };
}

/** Each contest is run several times, as either may come first. */
const rounds = [1, 2, 3, 4];

test.each(rounds)('two approvals, round %i', async () => {
  const { answers, lost, after } = await race((trade, acts) => [
    acts.approve(heads[0], trade),
    acts.approve(heads[1], trade),
  ]);
  expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
  expect(lost[0].body.code).toBe('stale-version');
  expect(sentenceOf(lost[0])).toBe(
    `Someone was first: trade ${after.number} now is live, and nothing of it waits.`,
  );
  expect(after.events.map(({ event }) => event)).toEqual(['proposed', 'approved']);
  expect(after.version).toBe(1);
});

test.each(rounds)('approval against return, round %i', async () => {
  const { answers, after } = await race((trade, acts) => [
    acts.approve(heads[0], trade),
    acts.return(heads[1], trade),
  ]);
  expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
  const won = answers[0].status === 200 ? 'approved' : 'returned';
  expect(after.versions[0].state).toBe(won);
});

test.each(rounds)('approval against amendment, round %i', async () => {
  const { answers, lost, after } = await race((trade, acts) => [
    acts.approve(heads[0], trade),
    acts.amend(analyst, trade),
  ]);
  expect(lost).toHaveLength(1);
  const approved = answers[0].status === 200;
  expect(after.status).toBe(approved ? 'live' : 'proposed');
  expect(after.versions.map(({ state }) => state)).toEqual(
    approved ? ['approved'] : ['proposed', 'superseded'],
  );
  expect(sentenceOf(lost[0])).toMatch(/^Someone was first: trade T-\d+ now /);
});

test('nobody approves terms that they have not seen', async () => {
  const acts = tradeActs(desk);
  const { id } = await makeTrade(book, underlying, analyst.user);
  const seen = await acts.read(heads[0], id);
  await acts.amend(analyst, seen);
  const answer = await acts.approve(heads[0], seen);
  expect([answer.status, answer.body.code]).toEqual([409, 'stale-version']);
});
