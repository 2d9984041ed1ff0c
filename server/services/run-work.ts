/**
 * The work of a run: one chunk a job. A chunk is kept whole in one transaction, which also counts it;
 * done a second time, by the same worker or another, it finds that and writes nothing.
 */
import type { Transaction } from 'sequelize';
import { yearFraction, type Market } from '@/pricing/contract';
import { engineVersion } from '@/pricing/index';
import type { ValuationBody } from '@/shared/contracts/chain-bodies';
import type { PolicyMethod } from '@/shared/contracts/policies';
import type { RunCounts } from '@/shared/contracts/runs';
import { appendValuations } from '../chain/append';
import { sequelize } from '../database';
import { MarketQuote } from '../models/market-quote';
import { PricingPolicy } from '../models/pricing-policy';
import { RunChunk } from '../models/run-chunk';
import { RunException } from '../models/run-exception';
import { ValuationRun } from '../models/valuation-run';
import type { RouteTask, TaskFinding, ValuationTask } from '../threads/value';
import { toleranceOf } from './policies';
import { countsOf, exceptionOf } from './run-findings';
import { finishRun } from './run-finish';
import { valueTrades } from './run-threads';
import { findRunTrades, type RunTrade } from './run-trades';
import { isActive } from './run-views';
import { marketOf } from './underlyings';

export type ValuedTrade = { trade: RunTrade; tolerance: number; found: TaskFinding };

function routeTask(policy: PricingPolicy, name: PolicyMethod, tolerance: number): RouteTask {
  const { sizes, toleranceShare } = policy;
  if (toleranceShare !== null) return { name, within: toleranceShare * tolerance };
  return { name, ...(name === 'closed-form' ? {} : sizes?.[name]) };
}

function taskOf(
  { valuedAt }: ValuationRun,
  policy: PricingPolicy,
  trade: RunTrade,
  market: Market,
): ValuationTask {
  const tolerance = toleranceOf(policy, trade.underlying, trade);
  const { kind, exercise } = trade;
  const [primary, check] =
    exercise === 'european'
      ? [policy.primaryEuropean, policy.checkEuropean]
      : [policy.primaryAmerican, policy.checkAmerican];
  return {
    contract: {
      payoff: 'vanilla',
      exercise,
      kind,
      strike: Number(trade.strike),
      expiry: yearFraction(valuedAt.getTime(), trade.expiryAt.getTime()),
    },
    market,
    tolerance,
    primary: routeTask(policy, primary, tolerance),
    check: routeTask(policy, check, tolerance),
  };
}

async function valueChunk(run: ValuationRun, { tradeVersionIds }: RunChunk) {
  const trades = await findRunTrades(run.deskId, tradeVersionIds);
  const policy = await PricingPolicy.findByPk(run.policyId, { rejectOnEmpty: true });
  const quotes = await MarketQuote.findAll({ where: { snapshotId: run.snapshotId } });
  const markets = new Map(quotes.map((quote) => [quote.underlyingId, marketOf(quote)]));
  const tasks = trades.map((trade) => {
    const market = markets.get(trade.underlying.id);
    if (!market) throw new Error(`Run ${run.number} was started without a market it needs.`);
    return taskOf(run, policy, trade, market);
  });
  const findings = await valueTrades(tasks);
  return trades.map((trade, index): ValuedTrade => ({
    trade,
    tolerance: tasks[index].tolerance,
    found: findings[index],
  }));
}

function bodiesOf(run: ValuationRun, { trade, tolerance, found }: ValuedTrade): ValuationBody[] {
  const { primary, check, verdict, refuted } = found;
  const shared = {
    kind: 'valuation' as const,
    runId: run.id,
    runNumber: run.number,
    tradeId: trade.tradeId,
    tradeNumber: trade.tradeNumber,
    tradeVersionId: trade.tradeVersionId,
    engine: engineVersion,
    snapshotId: run.snapshotId,
    policyId: run.policyId,
    valuedAt: run.valuedAt.toISOString(),
    underlyingId: trade.underlying.id,
    bookId: trade.bookId,
    bookCode: trade.bookCode,
    tolerance,
  };
  return [
    {
      ...shared,
      ...primary,
      role: 'primary',
      route: primary.request.method.name,
      verdict,
      refuted,
    },
    { ...shared, ...check, role: 'check', route: check.request.method.name },
  ];
}

async function storeExceptions(
  { id: runId, deskId }: ValuationRun,
  valued: readonly ValuedTrade[],
  transaction: Transaction,
) {
  const rows = valued.flatMap(({ trade, found }) => {
    const exception = exceptionOf(trade, found);
    const { tradeId, tradeVersionId } = trade;
    return exception ? [{ deskId, runId, tradeId, tradeVersionId, ...exception }] : [];
  });
  await RunException.bulkCreate(rows, { transaction });
}

const added = (run: ValuationRun, counts: RunCounts): RunCounts => ({
  agree: run.agree + counts.agree,
  wide: run.wide + counts.wide,
  disagree: run.disagree + counts.disagree,
  oneRoute: run.oneRoute + counts.oneRoute,
  failed: run.failed + counts.failed,
  refuted: run.refuted + counts.refuted,
});

/** The run's lock comes first and the chain's last, so that chunks wait for each other in order. */
const keepChunk = (runId: string, number: number, valued: readonly ValuedTrade[]) =>
  sequelize.transaction(async (transaction) => {
    const run = await ValuationRun.findByPk(runId, {
      transaction,
      lock: true,
      rejectOnEmpty: true,
    });
    const key = { runId, number };
    const chunk = await RunChunk.findOne({ where: key, transaction, rejectOnEmpty: true });
    if (!isActive(run.status) || chunk.doneAt !== null) return;
    await chunk.update({ doneAt: new Date() }, { transaction });
    await storeExceptions(run, valued, transaction);
    const progress = {
      ...added(run, countsOf(valued.map(({ found }) => found))),
      done: run.done + valued.length,
    };
    const isLast = progress.done === run.total;
    if (!isLast) await run.update({ status: 'running', ...progress }, { transaction });
    const bodies = valued.flatMap((each) => bodiesOf(run, each));
    await appendValuations(transaction, run.deskId, bodies);
    if (isLast) await finishRun(run, progress, transaction);
  });

export async function runChunk(runId: string, number: number): Promise<void> {
  const run = await ValuationRun.findByPk(runId, { rejectOnEmpty: true });
  const chunk = await RunChunk.findOne({ where: { runId, number }, rejectOnEmpty: true });
  if (!isActive(run.status) || chunk.doneAt !== null) return;
  await keepChunk(runId, number, await valueChunk(run, chunk));
}
