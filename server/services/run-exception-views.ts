import type { Includeable } from 'sequelize';
import type { ExceptionAnswer, RunException as ExceptionOnTheWire } from '@/shared/contracts/runs';
import type { RunException } from '../models/run-exception';
import { Study } from '../models/study';
import { User } from '../models/user';
import { ValuationRun } from '../models/valuation-run';
import type { RunTrade } from './run-trades';

export const withAnswer: Includeable[] = [
  { model: Study, as: 'study', attributes: ['id', 'number'] },
  { model: ValuationRun, as: 'rerun', attributes: ['id', 'number'] },
  { model: User, as: 'answeredBy', attributes: ['id', 'name'] },
];

/** The table sees to it that an answer has all of its parts. */
function answerOf(exception: RunException): ExceptionAnswer | null {
  const { answeredBy, answeredAt, study, rerun, reason } = exception;
  if (!answeredBy || !answeredAt) return null;
  const made = {
    by: { id: answeredBy.id, name: answeredBy.name },
    at: answeredAt.toISOString(),
  };
  if (rerun) return { kind: 'rerun', ...made, run: { id: rerun.id, number: rerun.number } };
  if (reason === null) throw new Error('An answer was read without its reason.');
  if (study)
    return { kind: 'study', ...made, study: { id: study.id, number: study.number }, reason };
  return { kind: 'override', ...made, value: exception.overrideValue, reason };
}

/** Whoever may not answer by a note. */
export const makersOfException = (
  { startedById }: ValuationRun,
  { touchedByIds }: Pick<RunTrade, 'touchedByIds'>,
): string[] => [...new Set([startedById, ...touchedByIds])];

export const exceptionView = (
  exception: RunException,
  run: ValuationRun,
  trade: RunTrade,
): ExceptionOnTheWire => ({
  id: exception.id,
  kind: exception.kind,
  state: exception.state,
  materiality: exception.materiality,
  makerIds: makersOfException(run, trade),
  answer: answerOf(exception),
});
