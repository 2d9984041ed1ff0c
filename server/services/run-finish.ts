/** The end of a run: its values become the last ones of its trades, and answer what it repeats. */
import { QueryTypes, type Transaction } from 'sequelize';
import type { MethodName, Verdict } from '@/pricing/contract';
import type { RunCounts } from '@/shared/contracts/runs';
import { positionTotal, type PositionTerms } from '@/shared/quote-terms';
import { sequelize } from '../database';
import type { ValuationRun } from '../models/valuation-run';
import { sumOf } from './run-views';
import { recordLastValues, type ValuedTrade } from './trades';

type FoundRoute = { name: MethodName; value: number | null; errorEstimate: number | null };

type FoundRow = PositionTerms & {
  tradeId: string;
  currency: string;
  verdict: Verdict;
  refuted: boolean;
  tolerance: number;
  primary: FoundRoute;
  check: FoundRoute;
};

const routeColumns = (entry: string) => `json_build_object('name', ${entry}.route,
  'value', ${entry}.body::jsonb #> '{result,value}',
  'errorEstimate', ${entry}.body::jsonb #> '{result,errorEstimate}')`;

/** Read from the chain, so that nothing else is ever shown than what is sealed there. */
const found = `
  SELECT version.trade_id AS "tradeId", underlying.currency, version.direction, version.quantity,
    version.contract_size AS "contractSize", main.verdict,
    (main.body::jsonb ->> 'refuted')::boolean AS refuted,
    (main.body::jsonb ->> 'tolerance')::double precision AS tolerance,
    ${routeColumns('main')} AS primary, ${routeColumns('other')} AS check
  FROM chain_entries main
  JOIN chain_entries other ON other.kind = 'valuation' AND other.run_id = main.run_id
    AND other.trade_version_id = main.trade_version_id AND other.role = 'check'
  JOIN trade_versions version ON version.id = main.trade_version_id
  JOIN underlyings underlying ON underlying.id = version.underlying_id
  WHERE main.kind = 'valuation' AND main.run_id = $runId AND main.role = 'primary'`;

type Valued = FoundRoute & { value: number };
const hasValue = (route: FoundRoute): route is Valued => route.value !== null;

type LastRow = ValuedTrade & { currency: string };

function lastRow({ id: runId, snapshotDate }: ValuationRun, row: FoundRow): LastRow {
  const { tradeId, currency, primary, check, verdict, refuted, tolerance } = row;
  const key = { tradeId, runId, snapshotDate, currency };
  if (!hasValue(primary)) return { ...key, found: null };
  const { value, errorEstimate } = primary;
  const strip = [primary, check].filter(hasValue);
  const total = positionTotal(value, row);
  return { ...key, found: { value, errorEstimate, verdict, refuted, total, strip, tolerance } };
}

function totalsOf(rows: readonly LastRow[]): Record<string, string> {
  const byCurrency = new Map<string, string[]>();
  for (const { currency, found: value } of rows) {
    if (!value) continue;
    const amounts = byCurrency.get(currency) ?? [];
    amounts.push(value.total);
    byCurrency.set(currency, amounts);
  }
  return Object.fromEntries(
    [...byCurrency].sort().map(([currency, amounts]) => [currency, sumOf(amounts)]),
  );
}

/** Open exceptions of the run that this one repeats, of trades with which nothing is wrong now. */
const answers = `
  UPDATE run_exceptions before SET state = 'answered', answer_kind = 'rerun', rerun_id = $runId,
    answered_by_id = $startedById, answered_at = $at
  WHERE before.run_id = $rerunOfId AND before.state = 'open'
    AND before.trade_id IN (
      SELECT version.trade_id FROM chain_entries entry
      JOIN trade_versions version ON version.id = entry.trade_version_id
      WHERE entry.kind = 'valuation' AND entry.run_id = $runId AND entry.verdict = 'agree')
    AND NOT EXISTS (SELECT FROM run_exceptions now
      WHERE now.run_id = $runId AND now.trade_id = before.trade_id)`;

export async function finishRun(
  run: ValuationRun,
  progress: RunCounts & { done: number },
  transaction: Transaction,
): Promise<void> {
  const rows = await sequelize.query<FoundRow>(found, {
    bind: { runId: run.id },
    type: QueryTypes.SELECT,
    transaction,
  });
  if (rows.length !== run.total) throw new Error(`Run ${run.number} has lost some of its values.`);
  const last = rows.map((row) => lastRow(run, row));
  await recordLastValues(transaction, last);
  const finishedAt = new Date();
  const { id: runId, rerunOfId, startedById } = run;
  if (rerunOfId !== null)
    await sequelize.query(answers, {
      bind: { runId, rerunOfId, startedById, at: finishedAt },
      transaction,
    });
  await run.update(
    {
      ...progress,
      status: 'finished',
      finishedAt,
      totals: totalsOf(last),
      version: run.version + 1,
    },
    { transaction },
  );
}
