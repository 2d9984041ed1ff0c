/** Runs as lists and pages show them. */
import { QueryTypes, type Includeable, type Transaction } from 'sequelize';
import Decimal from 'decimal.js';
import type { Run, RunStatus, RunSummary, RunTotal } from '@/shared/contracts/runs';
import { sequelize } from '../database';
import { PricingPolicy } from '../models/pricing-policy';
import { User } from '../models/user';
import { ValuationRun } from '../models/valuation-run';
import { findTouchers } from './run-trades';

const person = (as: string): Includeable => ({ model: User, as, attributes: ['id', 'name'] });

export const withNames: Includeable[] = [
  { model: PricingPolicy, as: 'policy', attributes: ['id', 'number'] },
  { model: ValuationRun, as: 'rerunOf', attributes: ['id', 'number'] },
  person('startedBy'),
  person('cancelledBy'),
  person('signedOffBy'),
];

export const isActive = (status: RunStatus): boolean => status === 'queued' || status === 'running';

type Facts = Pick<RunSummary, 'books' | 'exceptions' | 'openExceptions'>;

/** What several runs have in tables of their own, read at once. */
export async function factsOfRuns(
  runIds: readonly string[],
  transaction?: Transaction,
): Promise<(runId: string) => Facts> {
  const rows = await sequelize.query<Facts & { runId: string }>(
    `SELECT run.id AS "runId",
      (SELECT json_agg(json_build_object('id', book.id, 'code', book.code, 'name', book.name)
          ORDER BY book.code)
        FROM run_books JOIN books book ON book.id = book_id WHERE run_id = run.id) AS books,
      (SELECT count(*)::integer FROM run_exceptions WHERE run_id = run.id) AS exceptions,
      (SELECT count(*)::integer FROM run_exceptions WHERE run_id = run.id AND state = 'open')
        AS "openExceptions"
    FROM valuation_runs run WHERE run.id = ANY ($runIds::uuid[])`,
    { bind: { runIds }, type: QueryTypes.SELECT, transaction },
  );
  const byId = new Map(rows.map(({ runId, ...facts }) => [runId, facts]));
  return (runId) => {
    const facts = byId.get(runId);
    if (!facts) throw new Error(`Run ${runId} is gone.`);
    return facts;
  };
}

const personOf = ({ id, name }: User) => ({ id, name });
const namedOf = ({ id, number }: ValuationRun) => ({ id, number });

export function summaryOf(run: ValuationRun, facts: Facts): RunSummary {
  const { policy, rerunOf, startedBy, cancelledBy, signedOffBy } = run;
  const { cancelledAt, signedOffAt, signOffComment } = run;
  if (!policy || !startedBy) throw new Error('A run was read without what it points to.');
  return {
    ...namedOf(run),
    status: run.status,
    version: run.version,
    snapshot: { id: run.snapshotId, date: run.snapshotDate },
    policy: { id: policy.id, number: policy.number },
    books: facts.books,
    valuedAt: run.valuedAt.toISOString(),
    total: run.total,
    done: run.done,
    leftOut: run.leftOut,
    counts: {
      agree: run.agree,
      wide: run.wide,
      disagree: run.disagree,
      oneRoute: run.oneRoute,
      failed: run.failed,
      refuted: run.refuted,
    },
    exceptions: facts.exceptions,
    openExceptions: facts.openExceptions,
    rerunOf: rerunOf ? namedOf(rerunOf) : null,
    startedBy: personOf(startedBy),
    startedAt: run.startedAt.toISOString(),
    finishedAt: run.finishedAt?.toISOString() ?? null,
    cancellation:
      cancelledBy && cancelledAt
        ? { by: personOf(cancelledBy), at: cancelledAt.toISOString() }
        : null,
    signOff:
      signedOffBy && signedOffAt && signOffComment !== null
        ? { by: personOf(signedOffBy), at: signedOffAt.toISOString(), comment: signOffComment }
        : null,
  };
}

type Before = { id: string; number: string; date: string; totals: Record<string, string> };

/** The last finished run of exactly these books on an earlier close. */
async function findBefore(
  { deskId, snapshotDate }: ValuationRun,
  bookIds: readonly string[],
  transaction?: Transaction,
): Promise<Before | null> {
  const rows = await sequelize.query<Before>(
    `SELECT id, number, snapshot_date::text AS date, totals FROM valuation_runs run
      WHERE desk_id = $deskId AND status IN ('finished', 'signed-off')
        AND snapshot_date < $snapshotDate
        AND (SELECT array_agg(book_id ORDER BY book_id) FROM run_books WHERE run_id = run.id)
          = (SELECT array_agg(id ORDER BY id) FROM unnest($bookIds::uuid[]) AS wanted (id))
      ORDER BY snapshot_date DESC, ordinal DESC LIMIT 1`,
    { bind: { deskId, snapshotDate, bookIds }, type: QueryTypes.SELECT, transaction },
  );
  return rows.at(0) ?? null;
}

/** Exact for sums of any booked amounts. */
const ExactDecimal = Decimal.clone({ precision: 70 });

export const sumOf = (amounts: readonly string[]): string =>
  amounts.reduce((sum, amount) => sum.plus(amount), new ExactDecimal(0)).toFixed();

function totalsOf({ totals }: ValuationRun, before: Before | null): RunTotal[] {
  return Object.entries(totals ?? {}).map(([currency, total]) => {
    const then = before?.totals[currency] ?? null;
    const change = then === null ? null : new ExactDecimal(total).minus(then).toFixed();
    return { currency, total, before: then, change };
  });
}

/** Whoever started a run, touched a trade of it or put a value of their own beside the model's. */
export async function makersOf(run: ValuationRun, transaction?: Transaction): Promise<string[]> {
  const touchers = await findTouchers(run.id, transaction);
  const overriders = await sequelize.query<{ id: string }>(
    `SELECT DISTINCT answered_by_id AS id FROM run_exceptions
      WHERE run_id = $runId AND answer_kind = 'override'`,
    { bind: { runId: run.id }, type: QueryTypes.SELECT, transaction },
  );
  return [...new Set([run.startedById, ...touchers, ...overriders.map(({ id }) => id)])];
}

export async function runOf(run: ValuationRun, transaction?: Transaction): Promise<Run> {
  const facts = (await factsOfRuns([run.id], transaction))(run.id);
  const bookIds = facts.books.map(({ id }) => id);
  const before = await findBefore(run, bookIds, transaction);
  const reruns = await ValuationRun.findAll({
    attributes: ['id', 'number', 'status'],
    where: { rerunOfId: run.id },
    order: [['ordinal', 'ASC']],
    transaction,
  });
  return {
    ...summaryOf(run, facts),
    engine: run.engine,
    reruns: reruns.map((rerun) => ({ ...namedOf(rerun), status: rerun.status })),
    before: before && { id: before.id, number: before.number, date: before.date },
    totals: totalsOf(run, before),
    makerIds: await makersOf(run, transaction),
  };
}
