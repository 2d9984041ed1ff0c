/** The sign-off of a run: sealed, and the chain's heads signed with it. */
import { QueryTypes, type Transaction } from 'sequelize';
import type { Run as RunOnTheWire, RunSignOff } from '@/shared/contracts/runs';
import { AppError } from '@/shared/errors';
import { anchorHead } from '../chain/anchors';
import { appendRecord, chainOf } from '../chain/append';
import { sequelize } from '../database';
import { ValuationRun } from '../models/valuation-run';
import type { DeskActor } from './access';
import { makersOf } from './run-views';
import { lockRun, readRun, refuseState } from './runs';

const refuse = (code: string, message: string): never => {
  throw new AppError('wrong-state', [{ path: '', code, message }]);
};

/** Open ones, and those whose study was sent back after it had answered. */
async function refuseUnanswered({ id, number }: ValuationRun, transaction: Transaction) {
  const [{ open, sentBack }] = await sequelize.query<{ open: number; sentBack: number }>(
    `SELECT count(*) FILTER (WHERE exception.state = 'open')::integer AS open,
        count(*) FILTER (WHERE study.status = 'sent-back')::integer AS "sentBack"
      FROM run_exceptions exception LEFT JOIN studies study ON study.id = exception.study_id
      WHERE exception.run_id = $runId`,
    { bind: { runId: id }, type: QueryTypes.SELECT, transaction },
  );
  if (open > 0)
    refuse('open-exceptions', `Run ${number} waits for answers to ${open} of its exceptions.`);
  if (sentBack > 0)
    refuse(
      'study-sent-back',
      `What answers ${sentBack} of the exceptions of run ${number} was sent back; run it again.`,
    );
}

async function refuseWhileRepeated({ id, number }: ValuationRun, transaction: Transaction) {
  const where = { rerunOfId: id, status: ['queued', 'running'] };
  const rerun = await ValuationRun.findOne({ where, transaction });
  if (rerun)
    refuse(
      'run-again',
      `Someone was first: run ${number} is being run again as ${rerun.number}. Wait for its end.`,
    );
}

type AnswerCount = { kind: string; count: number };

const countAnswers = (runId: string, transaction: Transaction): Promise<AnswerCount[]> =>
  sequelize.query<AnswerCount>(
    `SELECT answer_kind AS kind, count(*)::integer AS count FROM run_exceptions
      WHERE run_id = $runId GROUP BY answer_kind ORDER BY answer_kind`,
    { bind: { runId }, type: QueryTypes.SELECT, transaction },
  );

export const signOffRun = (
  { desk, userId }: DeskActor,
  id: string,
  { version, comment }: RunSignOff,
): Promise<RunOnTheWire> =>
  sequelize.transaction(async (transaction) => {
    const run = await lockRun(desk, id, transaction);
    if (run.status !== 'finished') refuseState(run);
    if (run.version !== version) throw new AppError('stale-version');
    if ((await makersOf(run, transaction)).includes(userId)) throw new AppError('own-work');
    await refuseWhileRepeated(run, transaction);
    await refuseUnanswered(run, transaction);
    await run.update(
      {
        status: 'signed-off',
        signedOffById: userId,
        signedOffAt: new Date(),
        signOffComment: comment,
        version: version + 1,
      },
      { transaction },
    );
    const answers = await countAnswers(id, transaction);
    const answer = await readRun(desk, id, transaction);
    const { number, counts, totals, total, startedBy, snapshot, policy, engine } = answer;
    const anchor = await anchorHead(transaction, chainOf('valuations', desk.id), 'sign-off');
    await appendRecord(transaction, desk.id, {
      kind: 'sign-off',
      event: 'run-signed-off',
      subject: { type: 'valuation-run', id, version: answer.version },
      by: userId,
      reason: comment,
      details: {
        number,
        startedById: startedBy.id,
        snapshotId: snapshot.id,
        policyId: policy.id,
        engine,
        trades: total,
        counts,
        answers: Object.fromEntries(answers.map(({ kind, count }) => [kind, count])),
        totals: Object.fromEntries(totals.map(({ currency, total: sum }) => [currency, sum])),
        ...(anchor && { valuations: { position: Number(anchor.position), hash: anchor.hash } }),
      },
    });
    await anchorHead(transaction, chainOf('records', desk.id), 'sign-off');
    return answer;
  });
