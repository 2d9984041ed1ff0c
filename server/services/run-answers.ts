/** Answers to exceptions: a note by someone who had no hand in it, or a convergence study. */
import type { Transaction } from 'sequelize';
import Decimal from 'decimal.js';
import type { z } from 'zod';
import type {
  ExceptionalValuation,
  overrideSchema,
  studyAnswerSchema,
} from '@/shared/contracts/runs';
import { AppError } from '@/shared/errors';
import { appendRecord } from '../chain/append';
import { sequelize } from '../database';
import { RunException } from '../models/run-exception';
import { Study } from '../models/study';
import type { ValuationRun } from '../models/valuation-run';
import type { DeskActor } from './access';
import { makersOfException } from './run-exception-views';
import { findRunTrades, type RunTrade } from './run-trades';
import { readException } from './run-valuations';
import { lockRun, refuseState } from './runs';

type Key = { runId: string; exceptionId: string };

type Opened = { run: ValuationRun; exception: RunException; trade: RunTrade };

/** The run under lock, so that it is not signed off at the same moment. */
async function openException(
  { desk }: DeskActor,
  { runId, exceptionId }: Key,
  transaction: Transaction,
): Promise<Opened> {
  const run = await lockRun(desk, runId, transaction);
  const exception = await RunException.findOne({
    where: { deskId: desk.id, runId, id: exceptionId },
    transaction,
    lock: true,
  });
  if (!exception) throw new AppError('not-found');
  if (run.status !== 'running' && run.status !== 'finished') refuseState(run);
  if (exception.state === 'answered') {
    const message = 'Someone was first: this exception has its answer. Read it again.';
    throw new AppError('wrong-state', [{ path: '', code: 'answered', message }]);
  }
  const [trade] = await findRunTrades(desk.id, [exception.tradeVersionId], transaction);
  return { run, exception, trade };
}

const factsOf = ({ run, exception, trade }: Opened) => ({
  runId: run.id,
  runNumber: run.number,
  tradeId: trade.tradeId,
  tradeNumber: trade.tradeNumber,
  tradeVersionId: trade.tradeVersionId,
  exception: exception.kind,
  materiality: exception.materiality,
});

export const answerByOverride = (
  actor: DeskActor,
  key: Key,
  { value, reason }: z.infer<typeof overrideSchema>,
): Promise<ExceptionalValuation> =>
  sequelize.transaction(async (transaction) => {
    const { desk, userId } = actor;
    const opened = await openException(actor, key, transaction);
    const { run, exception, trade } = opened;
    if (makersOfException(run, trade).includes(userId)) throw new AppError('own-work');
    await exception.update(
      {
        state: 'answered',
        answerKind: 'override',
        overrideValue: value,
        reason,
        answeredById: userId,
        answeredAt: new Date(),
      },
      { transaction },
    );
    const answer = await readException(exception, transaction);
    await appendRecord(transaction, desk.id, {
      kind: 'override',
      event: 'exception-overridden',
      subject: { type: 'run-exception', id: exception.id },
      by: userId,
      reason,
      details: { ...factsOf(opened), value },
    });
    return answer;
  });

const refuseStudy = (code: string, message: string): never => {
  throw new AppError('validation-failed', [{ path: 'studyId', code, message }]);
};

const isSameOption = ({ terms }: Study, trade: RunTrade): boolean =>
  terms.underlyingId === trade.underlying.id &&
  terms.kind === trade.kind &&
  terms.exercise === trade.exercise &&
  terms.expiryDate === trade.expiryDate &&
  new Decimal(terms.strike).eq(trade.strike);

async function findStudy(deskId: string, id: string, trade: RunTrade, transaction: Transaction) {
  const study =
    (await Study.findOne({ where: { deskId, id }, transaction, lock: true })) ??
    refuseStudy('unknown-study', 'There is no such study on this desk; choose one from the list.');
  if (study.status !== 'finished' && study.status !== 'signed-off')
    refuseStudy('not-finished', `Study ${study.number} has no result that stands; choose another.`);
  if (!isSameOption(study, trade))
    refuseStudy(
      'other-terms',
      `Study ${study.number} is of another option than trade ${trade.tradeNumber}.`,
    );
  return study;
}

export const answerByStudy = (
  actor: DeskActor,
  key: Key,
  { studyId, reason }: z.infer<typeof studyAnswerSchema>,
): Promise<ExceptionalValuation> =>
  sequelize.transaction(async (transaction) => {
    const { desk, userId } = actor;
    const opened = await openException(actor, key, transaction);
    const { exception, trade } = opened;
    const study = await findStudy(desk.id, studyId, trade, transaction);
    await exception.update(
      {
        state: 'answered',
        answerKind: 'study',
        studyId,
        reason,
        answeredById: userId,
        answeredAt: new Date(),
      },
      { transaction },
    );
    const answer = await readException(exception, transaction);
    await appendRecord(transaction, desk.id, {
      kind: 'study',
      event: 'exception-studied',
      subject: { type: 'run-exception', id: exception.id },
      by: userId,
      reason,
      details: { ...factsOf(opened), studyId, studyNumber: study.number },
    });
    return answer;
  });
