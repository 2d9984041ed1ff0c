/** Exceptions and their answers, and who may sign a run off when. */
import { withServer } from './support/server';
import { comment, reason, runActs, sentenceOf, told } from './support/runs';
import { randomUUID } from 'node:crypto';
import { ChainAnchor } from '@/server/models/chain-anchor';
import { ChainEntry } from '@/server/models/chain-entry';
import type { Desk } from '@/server/models/desk';
import { RunException } from '@/server/models/run-exception';
import { Study } from '@/server/models/study';
import type { Underlying } from '@/server/models/underlying';
import { recordBodySchema, type RecordBody } from '@/shared/contracts/chain-bodies';
import { addDays } from '@/shared/dates';
import { makeApprovedClose, makeUnderlying } from '../factories/market';
import { makeDesk, makeMember, makeUser, type TestMember } from '../factories/people';
import {
  makeException,
  makeFilledBook,
  makeFinishedRun,
  policyInForce,
  startRun,
  workOffRun,
} from '../factories/runs';
import { makeStudy } from '../factories/studies';
import { makeBook, makeTrade } from '../factories/trades';

withServer();

let desk: Desk;
let underlying: Underlying;
/** No route is as good as this one asks for. */
let strict: Underlying;
let analyst: TestMember;
let officer: TestMember;
let other: TestMember;
let acts: ReturnType<typeof runActs>;

beforeAll(async () => {
  desk = await makeDesk();
  underlying = await makeUnderlying(desk);
  strict = await makeUnderlying(desk, { tolerance: 1e-13 });
  analyst = await makeMember(desk, 'analyst');
  officer = await makeMember(desk, 'risk-officer');
  other = await makeMember(desk, 'risk-officer');
  acts = runActs(desk);
  await policyInForce(desk);
});

let days = 0;
const freshDay = () => addDays('2025-12-01', (days += 1));

async function finished(of = underlying, starter = analyst) {
  const { id } = await makeFinishedRun(desk, of, { day: freshDay(), starter: starter.user });
  return acts.read(analyst, id);
}

async function withException() {
  const run = await finished();
  const { id } = await makeException(run);
  return { run, key: { runId: run.id, exceptionId: id } };
}

async function recordsOf(subjectId: string): Promise<RecordBody[]> {
  const entries = await ChainEntry.findAll({ where: { subjectId }, order: ['position'] });
  return entries.map(({ body }) => recordBodySchema.parse(JSON.parse(body)));
}

describe('exceptions', () => {
  it('come first and are weighed in money, as the routes themselves lie apart', async () => {
    const run = await finished(strict);
    expect(run).toMatchObject({ exceptions: 1, openExceptions: 1, counts: { agree: 0 } });
    const { items } = await acts.exceptions(analyst, run.id);
    const [{ exception, primary, check, verdict, terms, strip }] = items;
    if (!primary.result.ok || !check.result.ok) throw new Error('both routes give a value here');
    const distance = Math.abs(primary.result.value - check.result.value);
    expect(exception.kind).toBe(verdict === 'disagree' ? 'disagree' : 'wide');
    expect(Number(exception.materiality)).toBeCloseTo(
      distance * Number(terms.quantity) * Number(terms.contractSize),
      9,
    );
    expect(strip.map(({ value }) => value)).toEqual([primary.result.value, check.result.value]);
    const all = await acts.valuations(analyst, run.id);
    expect(all.items.map((row) => row.exception?.id)).toEqual([exception.id]);
  });

  it('are listed open first, then by gravity, then by size, in pages without a gap', async () => {
    const snapshot = await makeApprovedClose(desk, underlying, freshDay());
    const book = await makeFilledBook(desk, underlying, 6);
    const run = await startRun(desk, { books: [book], snapshot });
    await workOffRun(run.id);
    const { items } = await acts.valuations(analyst, run.id);
    const kinds = [
      ['wide', '5'],
      ['disagree', '1'],
      ['disagree', '20'],
      ['failure', null],
      ['wide', '70.25'],
    ] as const;
    for (const [index, [kind, materiality]] of kinds.entries()) {
      const { trade, tradeVersionId } = items[index];
      const key = { deskId: desk.id, runId: run.id, tradeId: trade.id, tradeVersionId };
      await RunException.create({ ...key, kind, materiality });
    }
    const listed: unknown[] = [];
    let cursor: string | null = null;
    do {
      const query: Record<string, string> = { limit: '2', ...(cursor === null ? {} : { cursor }) };
      const page = await acts.exceptions(analyst, run.id, query);
      listed.push(...page.items.map(({ exception: { materiality } }) => materiality));
      cursor = page.nextCursor;
    } while (cursor !== null);
    expect(listed).toEqual([null, '20', '1', '70.25', '5']);
    const first = await acts.exceptions(analyst, run.id, { kind: 'failure' });
    const key = { runId: run.id, exceptionId: first.items[0].exception.id };
    await acts.override(officer, key);
    const open = await acts.exceptions(analyst, run.id, { state: 'open' });
    expect(open.items).toHaveLength(4);
    const last = (await acts.exceptions(analyst, run.id)).items.at(-1);
    expect(last?.exception).toMatchObject({ id: key.exceptionId, state: 'answered' });
    const rows = await acts.valuations(analyst, run.id);
    expect(rows.items.map(({ exception }) => exception?.kind ?? 'none')).toEqual([
      'failure',
      'disagree',
      'disagree',
      'wide',
      'wide',
      'none',
    ]);
  });
});

describe('a note', () => {
  it('puts a value beside the model’s, which stays, and is sealed', async () => {
    const { run, key } = await withException();
    const answer = await acts.override(officer, key, '12.75');
    expect(answer.status).toBe(200);
    expect(answer.body.exception).toMatchObject({
      state: 'answered',
      answer: { kind: 'override', by: { id: officer.user.id }, value: '12.75', reason },
    });
    const [before] = (await acts.valuations(analyst, run.id)).items;
    expect(answer.body.primary).toEqual(before.primary);
    const [record] = await recordsOf(key.exceptionId);
    expect(record).toMatchObject({
      kind: 'override',
      by: officer.user.id,
      reason,
      details: { runId: run.id, value: '12.75', exception: 'wide' },
    });
    expect(told(await acts.override(other, key))).toEqual([409, 'wrong-state']);
  });

  it('is not for whoever started the run or touched the trade', async () => {
    const { key } = await withException();
    expect(told(await acts.override(analyst, key))).toEqual([403, 'own-work']);
    const book = await makeBook(desk);
    const head = await makeMember(desk, 'desk-head');
    const version = { tradedAt: new Date('2025-06-02T10:05:00Z') };
    await makeTrade(book, underlying, await makeUser(), { approver: head.user, version });
    const snapshot = await makeApprovedClose(desk, underlying, freshDay());
    const run = await startRun(desk, { books: [book], snapshot });
    await workOffRun(run.id);
    const { id } = await makeException(run);
    const answer = await acts.override(head, { runId: run.id, exceptionId: id });
    expect(told(answer)).toEqual([403, 'own-work']);
  });

  it('is refused for an exception of another run', async () => {
    const [one, two] = [await withException(), await withException()];
    const key = { ...one.key, exceptionId: two.key.exceptionId };
    expect(told(await acts.override(officer, key))).toEqual([404, 'not-found']);
  });
});

describe('a study', () => {
  it('answers when it is of the same option, and is named in the answer', async () => {
    const { key } = await withException();
    const study = await makeStudy(desk, underlying, analyst.user);
    const answer = await acts.study(analyst, key, study.id);
    expect(answer.body.exception.answer).toMatchObject({
      kind: 'study',
      study: { id: study.id },
      reason,
    });
    const [record] = await recordsOf(key.exceptionId);
    expect(record).toMatchObject({ kind: 'study', details: { studyId: study.id } });
  });

  it('is refused when it is of another option, unfinished or unknown', async () => {
    const { key } = await withException();
    const elsewhere = await makeStudy(desk, strict, analyst.user);
    const queued = await makeStudy(desk, underlying, analyst.user, 'queued');
    const codes = [];
    for (const id of [elsewhere.id, queued.id, randomUUID()])
      codes.push((await acts.study(analyst, key, id)).body.issues[0].code);
    expect(codes).toEqual(['other-terms', 'not-finished', 'unknown-study']);
  });
});

describe('a re-run', () => {
  it('answers what then agrees, and leaves open what does not', async () => {
    const { run, key } = await withException();
    const started = await acts.rerun(officer, run.id);
    expect(started.body).toMatchObject({ status: 'queued', rerunOf: { id: run.id } });
    await workOffRun(started.body.id);
    const [{ exception }] = (await acts.exceptions(analyst, run.id)).items;
    expect(exception).toMatchObject({
      id: key.exceptionId,
      answer: { kind: 'rerun', by: { id: officer.user.id }, run: { id: started.body.id } },
    });
    expect((await acts.read(analyst, run.id)).reruns).toMatchObject([{ status: 'finished' }]);

    const doubtful = await finished(strict);
    const again = await acts.rerun(officer, doubtful.id);
    await workOffRun(again.body.id);
    expect(await acts.read(analyst, doubtful.id)).toMatchObject({ openExceptions: 1 });
  });
});

describe('the sign-off', () => {
  it('is sealed with what was found, and signs both chains', async () => {
    const { run, key } = await withException();
    await acts.override(other, key, '1');
    const answer = await acts.signOff(officer, run);
    expect(answer.body).toMatchObject({
      status: 'signed-off',
      version: run.version + 1,
      signOff: { by: { id: officer.user.id }, comment },
    });
    const [record] = await recordsOf(run.id);
    const anchors = await ChainAnchor.findAll({
      where: { purpose: 'sign-off' },
      order: [['signedAt', 'DESC']],
      limit: 2,
    });
    const sealed = anchors.find(({ chain }) => chain === `valuations/${desk.id}`);
    expect(record).toMatchObject({
      kind: 'sign-off',
      event: 'run-signed-off',
      by: officer.user.id,
      reason: comment,
      details: {
        number: run.number,
        trades: 1,
        counts: { agree: 1 },
        answers: { override: 1 },
        valuations: { position: Number(sealed?.position), hash: sealed?.hash },
      },
    });
    expect(anchors.map(({ chain }) => chain).sort()).toEqual([
      `records/${desk.id}`,
      `valuations/${desk.id}`,
    ]);
    // What is settled stays.
    expect(told(await acts.rerun(analyst, run.id))).toEqual([409, 'wrong-state']);
    expect(told(await acts.signOff(other, run))).toEqual([409, 'wrong-state']);
    expect(told(await acts.cancel(analyst, run.id))).toEqual([409, 'wrong-state']);
  });

  it('waits for every exception', async () => {
    const { run } = await withException();
    const answer = await acts.signOff(officer, run);
    expect(told(answer)).toEqual([409, 'wrong-state']);
    expect(sentenceOf(answer)).toBe(`Run ${run.number} waits for answers to 1 of its exceptions.`);
  });

  it('does not rest on a study that was sent back', async () => {
    const { run, key } = await withException();
    const study = await makeStudy(desk, underlying, analyst.user);
    await acts.study(analyst, key, study.id);
    await Study.update(
      {
        status: 'sent-back',
        decidedById: other.user.id,
        decidedAt: new Date(),
        decisionComment: comment,
      },
      { where: { id: study.id } },
    );
    const answer = await acts.signOff(officer, run);
    expect(answer.body.issues[0].code).toBe('study-sent-back');
  });

  it('is not for whoever started the run, touched its trades or overrode a value', async () => {
    const own = await finished(underlying, officer);
    expect(told(await acts.signOff(officer, own))).toEqual([403, 'own-work']);
    const { run, key } = await withException();
    await acts.override(officer, key, '1');
    expect(told(await acts.signOff(officer, run))).toEqual([403, 'own-work']);
    expect((await acts.read(analyst, run.id)).makerIds).toContain(officer.user.id);

    const book = await makeBook(desk);
    const version = { tradedAt: new Date('2025-06-02T10:05:00Z') };
    await makeTrade(book, underlying, officer.user, { approver: await makeUser(), version });
    const snapshot = await makeApprovedClose(desk, underlying, freshDay());
    const started = await startRun(desk, { books: [book], snapshot });
    await workOffRun(started.id);
    const touched = await acts.read(analyst, started.id);
    expect(told(await acts.signOff(officer, touched))).toEqual([403, 'own-work']);
    expect((await acts.signOff(other, touched)).status).toBe(200);
  });

  it('needs a finished run and the version that was read', async () => {
    const snapshot = await makeApprovedClose(desk, underlying, freshDay());
    const books = [await makeFilledBook(desk, underlying)];
    const run = await startRun(desk, { books, snapshot });
    const early = await acts.signOff(officer, run);
    expect(sentenceOf(early)).toBe(`Someone was first: run ${run.number} waits to be worked off.`);
    await workOffRun(run.id);
    expect(told(await acts.signOff(officer, run))).toEqual([409, 'stale-version']);
  });
});
