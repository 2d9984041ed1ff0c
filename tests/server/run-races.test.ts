/** Two people at once, or a person and the work itself: one wins, the other gets a sentence. */
import { withServer } from './support/server';
import { runActs, sentenceOf, type Answer } from './support/runs';
import type { Desk } from '@/server/models/desk';
import { RunBook } from '@/server/models/run-book';
import type { Underlying } from '@/server/models/underlying';
import { runChunk } from '@/server/services/run-work';
import type { Run } from '@/shared/contracts/runs';
import { addDays } from '@/shared/dates';
import { makeApprovedClose, makeUnderlying } from '../factories/market';
import { makeDesk, makeMember, type TestMember } from '../factories/people';
import { makeFilledBook, makeFinishedRun, policyInForce, startRun } from '../factories/runs';

withServer();

let desk: Desk;
let underlying: Underlying;
let analyst: TestMember;
let officers: TestMember[];
let acts: ReturnType<typeof runActs>;

beforeAll(async () => {
  desk = await makeDesk();
  underlying = await makeUnderlying(desk);
  analyst = await makeMember(desk, 'analyst');
  officers = [await makeMember(desk, 'risk-officer'), await makeMember(desk, 'risk-officer')];
  acts = runActs(desk);
  await policyInForce(desk);
});

let days = 0;
const freshDay = () => addDays('2025-12-01', (days += 1));
const freshClose = () => makeApprovedClose(desk, underlying, freshDay());

async function finished(): Promise<Run> {
  const { id } = await makeFinishedRun(desk, underlying, { day: freshDay() });
  return acts.read(analyst, id);
}

/** One of the two was refused with a sentence that says who was first. */
function expectOneWinner(answers: readonly Answer<unknown>[], won: number): Answer<unknown> {
  const [lost, ...others] = answers.filter(({ status }) => status === 409);
  expect(others).toEqual([]);
  expect(answers.map(({ status }) => status).sort()).toEqual([won, 409].sort());
  expect(sentenceOf(lost)).toMatch(/^Someone was first: run R-\d+ /);
  return lost;
}

/** Each contest is run several times, as either may come first. */
const rounds = [1, 2, 3, 4];

test.each(rounds)('two runs on one book, round %i', async () => {
  const snapshot = await freshClose();
  const shared = await makeFilledBook(desk, underlying);
  const own = await makeFilledBook(desk, underlying);
  const start = (who: TestMember, bookIds: string[]) =>
    acts.start(who, { bookIds, snapshotId: snapshot.id });
  const answers = await Promise.all([
    start(analyst, [shared.id]),
    start(officers[0], [own.id, shared.id]),
  ]);
  const lost = expectOneWinner(answers, 201);
  expect(sentenceOf(lost)).toContain(`is valuing book ${shared.code}`);
  expect(await RunBook.count({ where: { bookId: shared.id } })).toBe(1);
});

test('the database itself refuses a book in two active runs', async () => {
  const snapshot = await freshClose();
  const book = await makeFilledBook(desk, underlying);
  const run = await startRun(desk, { books: [book], snapshot });
  const other = await startRun(desk, { books: [await makeFilledBook(desk, underlying)], snapshot });
  const row = { runId: other.id, bookId: book.id, deskId: desk.id, isActive: true, trades: 1 };
  await expect(RunBook.create(row)).rejects.toMatchObject({
    name: 'SequelizeUniqueConstraintError',
  });
  // Nor can a book say that its run is over while it is not, or the other way round.
  await expect(RunBook.create({ ...row, isActive: false })).rejects.toMatchObject({
    name: 'SequelizeForeignKeyConstraintError',
  });
  await acts.cancel(analyst, run.id);
  const rows = await RunBook.findAll({ where: { runId: run.id } });
  expect(rows.map(({ isActive }) => isActive)).toEqual([false]);
});

test.each(rounds)('two sign-offs, round %i', async () => {
  const run = await finished();
  const answers = await Promise.all(officers.map((officer) => acts.signOff(officer, run)));
  const lost = expectOneWinner(answers, 200);
  expect(sentenceOf(lost)).toBe(`Someone was first: run ${run.number} was signed off.`);
});

test.each(rounds)('sign-off against re-run, round %i', async () => {
  const run = await finished();
  const [signed, again] = await Promise.all([
    acts.signOff(officers[0], run),
    acts.rerun(analyst, run.id),
  ]);
  const after = await acts.read(analyst, run.id);
  expectOneWinner([signed, again], signed.status === 200 ? 200 : 201);
  expect([after.status, after.reruns.length]).toEqual(
    signed.status === 200 ? ['signed-off', 0] : ['finished', 1],
  );
});

test.each(rounds)('two re-runs, round %i', async () => {
  const run = await finished();
  const answers = await Promise.all([acts.rerun(analyst, run.id), acts.rerun(analyst, run.id)]);
  expectOneWinner(answers, 201);
});

test.each(rounds)('cancellation against the last chunk, round %i', async () => {
  const snapshot = await freshClose();
  const run = await startRun(desk, {
    books: [await makeFilledBook(desk, underlying, 3)],
    snapshot,
  });
  const working = runChunk(run.id, 1);
  const answer = await acts.cancel(analyst, run.id);
  await working;
  const after = await acts.read(analyst, run.id);
  if (answer.status === 200) expect([after.status, after.done]).toEqual(['cancelled', 0]);
  else {
    expect(sentenceOf(answer)).toBe(`Someone was first: run ${run.number} has finished.`);
    expect([after.status, after.done]).toEqual(['finished', after.total]);
  }
});
