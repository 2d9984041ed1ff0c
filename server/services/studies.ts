/** Convergence studies: started here, computed in the background, signed off by someone else. */
import type { Transaction } from 'sequelize';
import type { Contract, LadderStep, Market } from '@/pricing/contract';
import { checkRequest, engineVersion } from '@/pricing/index';
import { planLadder, theoreticalOrder } from '@/pricing/study';
import type {
  Study as StudyOnTheWire,
  StudyDraft,
  StudyLadder,
  StudyStatus,
} from '@/shared/contracts/studies';
import { AppError } from '@/shared/errors';
import { pricingRequestOf } from '@/shared/quote-terms';
import { appendRecord } from '../chain/append';
import { sequelize } from '../database';
import { Desk } from '../models/desk';
import { Study, type PlannedLadder } from '../models/study';
import { StudyRow } from '../models/study-row';
import { addJob } from '../queue/add-job';
import type { DeskActor } from './access';
import { after, pageOf } from './page';
import { ticketIssue } from './quote-issues';
import { findReference } from './study-threads';
import { subjectOf } from './study-subject';
import { studyOf, summaryOf, withNames } from './study-views';
import type { WriteOnce } from './write-once';

type Request = { contract: Contract; market: Market };

function planned({ contract, market }: Request, ladder: StudyLadder, index: number): PlannedLadder {
  const { name, firstSize, rows } = ladder;
  const order = theoreticalOrder(name, contract.exercise);
  const steps: LadderStep[] =
    order === null ? [] : planLadder(name, contract, market, { firstSize, rows });
  if (order !== null) return { name, theoreticalOrder: order, steps };
  const message = 'The closed form has no sizes to refine; choose another method.';
  const issue = { path: `ladders.${index}.name`, code: 'nothing-to-refine', message };
  throw new AppError('validation-failed', [issue]);
}

/** Numbered under the desk's lock; studies are never deleted, so that the count is the last one. */
async function nextOrdinal(desk: Desk, transaction: Transaction): Promise<number> {
  await Desk.findByPk(desk.id, { transaction, lock: true, rejectOnEmpty: true });
  return (await Study.count({ where: { deskId: desk.id }, transaction })) + 1;
}

/** The reference comes first: a study whose errors nothing can be measured against is refused. */
export async function createStudy(
  actor: DeskActor,
  draft: StudyDraft,
  writeOnce: WriteOnce,
): Promise<StudyOnTheWire> {
  const { desk, userId } = actor;
  const subject = await subjectOf(desk, draft);
  const checked = checkRequest(pricingRequestOf(subject.terms, desk));
  if (!checked.ok) throw new AppError('cannot-price', checked.issues.map(ticketIssue));
  const { contract, market } = checked.request;
  const ladders = draft.ladders.map((ladder, index) =>
    planned({ contract, market }, ladder, index),
  );
  const reference = await findReference({ contract, market });
  if ('ok' in reference) throw new AppError('cannot-price', [ticketIssue(reference)]);
  return writeOnce(async (transaction) => {
    const { id } = await Study.create(
      {
        ...subject,
        deskId: desk.id,
        ordinal: await nextOrdinal(desk, transaction),
        underlyingId: subject.terms.underlyingId,
        request: { contract, market },
        reference,
        ladders,
        engine: engineVersion,
        total: ladders.reduce((sum, { steps }) => sum + steps.length, 0),
        startedById: userId,
      },
      { transaction },
    );
    await addJob(transaction, 'run-study', { studyId: id });
    return readStudy(desk, id, transaction);
  });
}

async function readStudy(desk: Desk, id: string, transaction?: Transaction) {
  const study = await Study.findOne({
    where: { deskId: desk.id, id },
    include: withNames,
    transaction,
  });
  if (!study) throw new AppError('not-found');
  const rows = await StudyRow.findAll({ where: { studyId: id }, transaction });
  return studyOf(study, rows);
}

export const getStudy = (desk: Desk, id: string): Promise<StudyOnTheWire> => readStudy(desk, id);

export async function listStudies(
  desk: Desk,
  query: {
    cursor?: string;
    limit: number;
    status?: StudyStatus;
    quoteId?: string;
    tradeId?: string;
  },
) {
  const { cursor, limit, status, quoteId, tradeId } = query;
  const rows = await Study.findAll({
    where: {
      deskId: desk.id,
      ...(status === undefined ? {} : { status }),
      ...(quoteId === undefined ? {} : { quoteId }),
      ...(tradeId === undefined ? {} : { tradeId }),
      ...after('createdAt', cursor),
    },
    include: withNames,
    order: [
      ['createdAt', 'DESC'],
      ['id', 'DESC'],
    ],
    limit: limit + 1,
    subQuery: false,
  });
  return pageOf(rows, limit, summaryOf, ({ createdAt, id }) => ({ at: createdAt, id }));
}

/** Reads a study for a change; others who would change it wait. */
async function lockStudy(desk: Desk, id: string, transaction: Transaction): Promise<Study> {
  const where = { deskId: desk.id, id };
  const study = await Study.findOne({ where, transaction, lock: true });
  if (!study) throw new AppError('not-found');
  return study;
}

/** A row that is being computed at this moment is dropped; the rows before it stay. */
export const cancelStudy = ({ desk }: DeskActor, id: string): Promise<StudyOnTheWire> =>
  sequelize.transaction(async (transaction) => {
    const study = await lockStudy(desk, id, transaction);
    if (study.status !== 'queued' && study.status !== 'running') throw new AppError('wrong-state');
    await study.update({ status: 'cancelled', version: study.version + 1 }, { transaction });
    return readStudy(desk, id, transaction);
  });

type Decision = { version: number; comment: string };

const decide = (
  { desk, userId }: DeskActor,
  id: string,
  status: 'signed-off' | 'sent-back',
  { version, comment }: Decision,
): Promise<StudyOnTheWire> =>
  sequelize.transaction(async (transaction) => {
    const study = await lockStudy(desk, id, transaction);
    if (study.startedById === userId) throw new AppError('own-work');
    if (study.status !== 'finished') throw new AppError('wrong-state');
    if (study.version !== version) throw new AppError('stale-version');
    await study.update(
      {
        status,
        version: version + 1,
        decidedById: userId,
        decidedAt: new Date(),
        decisionComment: comment,
      },
      { transaction },
    );
    const answer = await readStudy(desk, id, transaction);
    await appendRecord(transaction, desk.id, {
      kind: status === 'signed-off' ? 'sign-off' : 'study',
      event: `study-${status}`,
      subject: { type: 'study', id, version: study.version },
      by: userId,
      reason: comment,
      details: { number: study.number, engine: study.engine, orders: study.orders },
    });
    return answer;
  });

export const signOffStudy = (actor: DeskActor, id: string, decision: Decision) =>
  decide(actor, id, 'signed-off', decision);

export const sendBackStudy = (actor: DeskActor, id: string, decision: Decision) =>
  decide(actor, id, 'sent-back', decision);
