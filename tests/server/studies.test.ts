/**
 * A study from the request to the signature: rows that come one by one, work that is done twice or
 * stopped half-way, and who may decide. What the rows say is the business of tests/pricing/study.
 */
import { call, withServer } from './support/server';
import { workOff } from './support/queue';
import { randomUUID } from 'node:crypto';
import { price } from '@/pricing/index';
import { ChainEntry } from '@/server/models/chain-entry';
import type { Desk } from '@/server/models/desk';
import { Study } from '@/server/models/study';
import { StudyRow } from '@/server/models/study-row';
import type { Underlying } from '@/server/models/underlying';
import { runNextRow } from '@/server/services/study-run';
import {
  cancelStudy,
  createStudy,
  getStudy,
  getStudyFile,
  listStudies,
  sendBackStudy,
  signOffStudy,
  type Study as StudyOnTheWire,
  type StudyDraft,
} from '@/shared/contracts/studies';
import { makeUnderlying } from '../factories/market';
import { makeDesk, makeMember, type TestMember } from '../factories/people';
import { makeQuote } from '../factories/quotes';
import { makeStudy, studyDraft } from '../factories/studies';

withServer();

let desk: Desk;
let underlying: Underlying;
let analyst: TestMember;
let officer: TestMember;
let other: TestMember;

beforeAll(async () => {
  desk = await makeDesk();
  underlying = await makeUnderlying(desk);
  analyst = await makeMember(desk, 'analyst');
  officer = await makeMember(desk, 'risk-officer');
  other = await makeMember(desk, 'risk-officer');
});

async function start(body: StudyDraft, token = analyst.token): Promise<StudyOnTheWire> {
  const answer = await call(createStudy, { params: { deskId: desk.id }, body, token });
  expect({ status: answer.status, issues: answer.body.issues }).toEqual({ status: 201 });
  return answer.body as StudyOnTheWire;
}

const at = (studyId: string) => ({ params: { deskId: desk.id, studyId } });

async function read(studyId: string): Promise<StudyOnTheWire> {
  const answer = await call(getStudy, { ...at(studyId), token: analyst.token });
  expect(answer.status).toBe(200);
  return answer.body as StudyOnTheWire;
}

const comment = 'The orders are those of the schemes.';

const refusal = async (sent: ReturnType<typeof call>) => {
  const { status, body } = await sent;
  return { status, code: body.code };
};

describe('a study of free terms', () => {
  it('is computed in the background, row by row, and ends with an order for each method', async () => {
    const started = await start(
      studyDraft(underlying, [
        { name: 'heat-crank-nicolson', rows: 4 },
        { name: 'heat-explicit', rows: 3 },
        { name: 'lattice-crr', rows: 3 },
      ]),
    );
    expect(started).toMatchObject({ status: 'queued', done: 0, total: 4 + 4 + 6 });
    expect(started.number).toMatch(/^S-\d{4,}$/);
    expect(started.reference.method.name).toBe('closed-form');

    await runNextRow(started.id);
    expect(await read(started.id)).toMatchObject({ status: 'running', done: 1 });

    await workOff();
    const finished = await read(started.id);
    expect(finished).toMatchObject({ status: 'finished', done: 14 });
    const [grid, explicit, tree] = finished.routes;
    expect(grid.fits).toMatchObject([{ series: 'all', points: 4, verdict: 'as-expected' }]);
    expect(explicit.rows.at(-1)).toMatchObject({ pastLimit: true, order: null });
    expect(explicit.rows.at(-1)?.warning).toMatch(/past ½/);
    expect(tree.fits.map(({ series }) => series)).toEqual(['odd', 'even']);
    for (const { rows } of finished.routes) {
      for (const row of rows) expect(row.milliseconds).toBeGreaterThan(0);
    }
  });

  it('holds the very bits that the engine gives for a row', async () => {
    const { id } = await start(studyDraft(underlying));
    await workOff();
    const { routes } = await read(id);
    const study = await Study.findByPk(id, { rejectOnEmpty: true });
    for (const { settings, value } of routes[0].rows) {
      expect(price({ ...study.request, method: settings })).toMatchObject({ ok: true, value });
    }
  });

  it('is refused with each wrong field named below its terms', async () => {
    const draft = studyDraft(underlying);
    if (draft.source.kind !== 'free') throw new Error('the factory gives free terms');
    const terms = { ...draft.source.terms, expiryDate: '2020-01-01', underlyingId: randomUUID() };
    const body = { ...draft, source: { ...draft.source, terms } };
    const answer = await call(createStudy, {
      params: { deskId: desk.id },
      body,
      token: analyst.token,
    });
    expect(answer.status).toBe(422);
    expect(answer.body.issues.map(({ path }: { path: string }) => path).sort()).toEqual([
      'source.terms.expiryDate',
      'source.terms.underlyingId',
    ]);
  });

  it.each([
    ['a method twice', [1, 2].map(() => ({ name: 'lattice-crr', rows: 3 }) as const)],
    ['no method', []],
    ['too few rows for an order', [{ name: 'lattice-crr', rows: 2 } as const]],
    ['a method without sizes', [{ name: 'closed-form', rows: 3 } as const]],
  ])('is refused with %s', async (_case, ladders) => {
    const body = studyDraft(underlying, ladders);
    const sent = call(createStudy, { params: { deskId: desk.id }, body, token: analyst.token });
    expect(await refusal(sent)).toEqual({ status: 422, code: 'validation-failed' });
  });
});

describe('a study of a quote', () => {
  it('takes its terms and is found by it', async () => {
    const quote = await makeQuote(desk, underlying, analyst.user);
    const source = { kind: 'quote', quoteId: quote.id } as const;
    const started = await start({ ...studyDraft(underlying), source });
    expect(started).toMatchObject({
      source: 'quote',
      quote: { id: quote.id, number: quote.number },
      expiryDate: quote.expiryDate,
      market: { spot: 212.4 },
    });
    const list = await call(listStudies, {
      params: { deskId: desk.id },
      query: { quoteId: quote.id },
      token: analyst.token,
    });
    expect(list.body.items.map(({ id }: { id: string }) => id)).toEqual([started.id]);
  });

  it('is refused for a quote of another desk', async () => {
    const elsewhere = await makeDesk();
    const theirs = await makeUnderlying(elsewhere);
    const quote = await makeQuote(elsewhere, theirs, analyst.user);
    const source = { kind: 'quote', quoteId: quote.id } as const;
    const body = { ...studyDraft(underlying), source };
    const sent = call(createStudy, { params: { deskId: desk.id }, body, token: analyst.token });
    expect(await refusal(sent)).toEqual({ status: 422, code: 'validation-failed' });
  });
});

describe('work that does not go straight', () => {
  it('doubles no row when a job is done twice, even at the same moment', async () => {
    const { id, total } = await start(studyDraft(underlying));
    await Promise.all([runNextRow(id), runNextRow(id), runNextRow(id)]);
    expect(await StudyRow.count({ where: { studyId: id } })).toBe(1);
    await workOff();
    expect(await StudyRow.count({ where: { studyId: id } })).toBe(total);
    await runNextRow(id);
    expect(await read(id)).toMatchObject({ status: 'finished', done: total });
  });

  it('stops when it is cancelled, and keeps the rows that it has', async () => {
    const { id } = await start(studyDraft(underlying));
    await runNextRow(id);
    const cancelled = await call(cancelStudy, { ...at(id), token: analyst.token });
    expect(cancelled.body).toMatchObject({ status: 'cancelled', done: 1 });
    await workOff();
    expect(await read(id)).toMatchObject({ status: 'cancelled', done: 1 });
    const again = call(cancelStudy, { ...at(id), token: analyst.token });
    expect(await refusal(again)).toEqual({ status: 409, code: 'wrong-state' });
  });

  it('drops the row that was being computed while it was cancelled', async () => {
    const { id } = await start(studyDraft(underlying));
    const computing = runNextRow(id);
    await call(cancelStudy, { ...at(id), token: analyst.token });
    await computing;
    const { status, done } = await read(id);
    expect(status).toBe('cancelled');
    expect(done).toBe(await StudyRow.count({ where: { studyId: id } }));
  });
});

describe('the decision', () => {
  it('is made by someone else, once, and sealed in the chain', async () => {
    const { id } = await makeStudy(desk, underlying, analyst.user);
    const body = { version: 0, comment };
    const answer = await call(signOffStudy, { ...at(id), body, token: officer.token });
    expect(answer.body).toMatchObject({
      status: 'signed-off',
      version: 1,
      decision: { by: { id: officer.user.id }, comment },
    });
    const entries = await ChainEntry.findAll({ where: { kind: 'sign-off' } });
    const bodies = entries.map((entry) => JSON.parse(entry.body) as Record<string, unknown>);
    expect(bodies.find(({ subject }) => (subject as { id: string }).id === id)).toMatchObject({
      event: 'study-signed-off',
      by: officer.user.id,
      reason: comment,
    });
    const again = call(sendBackStudy, { ...at(id), body, token: other.token });
    expect(await refusal(again)).toEqual({ status: 409, code: 'wrong-state' });
  });

  it('is not for whoever started the study', async () => {
    const { id } = await makeStudy(desk, underlying, officer.user);
    const body = { version: 0, comment };
    for (const endpoint of [signOffStudy, sendBackStudy]) {
      const sent = call(endpoint, { ...at(id), body, token: officer.token });
      expect(await refusal(sent)).toEqual({ status: 403, code: 'own-work' });
    }
  });

  it('needs a comment, a finished study and the version that was read', async () => {
    const { id } = await makeStudy(desk, underlying, analyst.user);
    const bare = call(sendBackStudy, {
      ...at(id),
      body: { version: 0, comment: ' ' },
      token: officer.token,
    });
    expect(await refusal(bare)).toEqual({ status: 422, code: 'validation-failed' });
    const stale = call(signOffStudy, {
      ...at(id),
      body: { version: 7, comment },
      token: officer.token,
    });
    expect(await refusal(stale)).toEqual({ status: 409, code: 'stale-version' });
    const unfinished = await makeStudy(desk, underlying, analyst.user, 'queued');
    const early = call(signOffStudy, {
      ...at(unfinished.id),
      body: { version: 0, comment },
      token: officer.token,
    });
    expect(await refusal(early)).toEqual({ status: 409, code: 'wrong-state' });
  });

  it('of two that come together is one, and the other gets a sentence', async () => {
    const { id } = await makeStudy(desk, underlying, analyst.user);
    const body = { version: 0, comment };
    const answers = await Promise.all([
      call(signOffStudy, { ...at(id), body, token: officer.token }),
      call(sendBackStudy, { ...at(id), body, token: other.token }),
    ]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
    const lost = answers.find(({ status }) => status === 409);
    expect(lost?.body).toMatchObject({ code: 'wrong-state', title: expect.stringMatching(/\.$/) });
  });
});

it('the rows are given as CSV, unrounded', async () => {
  const { id } = await makeStudy(desk, underlying, analyst.user);
  const answer = await call(getStudyFile, { ...at(id), token: other.token });
  expect(answer.body.fileName).toMatch(/^driftless-study-S-\d+\.csv$/);
  const lines = (answer.body.csv as string).trim().split('\r\n');
  expect(lines).toHaveLength(1 + 3);
  const [head, first] = lines.map((line) => line.split(','));
  const { routes } = await read(id);
  const cell = (name: string) => first[head.indexOf(name)];
  expect(Number(cell('value'))).toBe(routes[0].rows[0].value);
  expect(Number(cell('error'))).toBe(routes[0].rows[0].error);
  expect(cell('method')).toBe('heat-crank-nicolson');
});

it('the list is the desk’s own, newest first, by state', async () => {
  const theirs = await makeMember(await makeDesk(), 'analyst');
  const foreign = call(getStudy, {
    ...at((await makeStudy(desk, underlying, analyst.user)).id),
    token: theirs.token,
  });
  expect(await refusal(foreign)).toEqual({ status: 403, code: 'not-a-member' });
  const answer = await call(listStudies, {
    params: { deskId: desk.id },
    query: { status: 'signed-off' },
    token: analyst.token,
  });
  const items = answer.body.items as StudyOnTheWire[];
  expect(items.length).toBeGreaterThan(0);
  expect(items.every(({ status }) => status === 'signed-off')).toBe(true);
  const times = items.map(({ createdAt }) => Date.parse(createdAt));
  expect([...times].sort((a, b) => b - a)).toEqual(times);
});
