/** What a run found for trades, read from the chain, with the exceptions that it made of it. */
import { QueryTypes, type Transaction } from 'sequelize';
import { valuationBodySchema, type ValuationBody } from '@/shared/contracts/chain-bodies';
import type { RunException as ExceptionOnTheWire, RunValuation } from '@/shared/contracts/runs';
import { AppError } from '@/shared/errors';
import { positionTotal } from '@/shared/quote-terms';
import { sequelize } from '../database';
import { ChainEntry } from '../models/chain-entry';
import type { Desk } from '../models/desk';
import { RunException } from '../models/run-exception';
import { ValuationRun } from '../models/valuation-run';
import { exceptionView, withAnswer } from './run-exception-views';
import { findRunTrades, type RunTrade } from './run-trades';
import { termsOf } from './trade-rows';

type BeforeRow = {
  position: string;
  runId: string;
  runNumber: string;
  valuedAt: string;
  value: number | null;
};

const beforeOf = `
  SELECT entry.position, earlier."runId", earlier."runNumber", earlier."valuedAt", earlier.value
  FROM chain_entries entry
  CROSS JOIN LATERAL (
    SELECT run.id AS "runId", run.number AS "runNumber", past.valued_at AS "valuedAt",
      (past.body::jsonb #>> '{result,value}')::double precision AS value
    FROM chain_entries past
    JOIN valuation_runs run ON run.id = past.run_id AND run.status IN ('finished', 'signed-off')
    WHERE past.chain = entry.chain AND past.trade_number = entry.trade_number
      AND past.role = 'primary' AND past.valued_at < entry.valued_at
    ORDER BY past.valued_at DESC, past.position DESC LIMIT 1
  ) earlier
  WHERE entry.chain = $chain AND entry.position = ANY ($positions::bigint[])`;

/** The values of the same trades in the last finished runs on earlier closes. */
async function findBefore(entries: readonly ChainEntry[], transaction?: Transaction) {
  if (entries.length === 0) return () => undefined;
  const [{ chain }] = entries;
  const positions = entries.map(({ position }) => position);
  const rows = await sequelize.query<BeforeRow>(beforeOf, {
    bind: { chain, positions },
    type: QueryTypes.SELECT,
    transaction,
  });
  const byPosition = new Map(rows.map((row) => [row.position, row]));
  return ({ position }: ChainEntry) => byPosition.get(String(position));
}

const bodyOf = ({ body }: ChainEntry) => valuationBodySchema.parse(JSON.parse(body));

const routeOf = ({ route, result }: ValuationBody) => ({ name: route, result });

const stripOf = (bodies: readonly ValuationBody[]): RunValuation['strip'] =>
  bodies.flatMap(({ route, result }) =>
    result.ok ? [{ name: route, value: result.value, errorEstimate: result.errorEstimate }] : [],
  );

type Parts = {
  entry: ChainEntry;
  check: ValuationBody;
  trade: RunTrade;
  before: BeforeRow | undefined;
  exception: ExceptionOnTheWire | null;
};

function valuationOf({ entry, check, trade, before, exception }: Parts): RunValuation {
  const body = bodyOf(entry);
  const { result, tolerance, verdict, refuted, tradeId, tradeNumber } = body;
  if (verdict === undefined || refuted === undefined)
    throw new Error(`Entry ${entry.position} is a primary one and has no verdict.`);
  const { tolerance: _, ...underlying } = trade.underlying;
  const value = result.ok ? result.value : null;
  const then = before?.value ?? null;
  return {
    position: Number(entry.position),
    trade: { id: tradeId, number: tradeNumber },
    tradeVersionId: body.tradeVersionId,
    book: { id: trade.bookId, code: trade.bookCode, name: trade.bookName },
    underlying,
    terms: termsOf(trade),
    primary: routeOf(body),
    check: routeOf(check),
    tolerance,
    verdict,
    refuted,
    strip: stripOf([body, check]),
    total: value === null ? null : positionTotal(value, trade),
    before:
      before && then !== null
        ? {
            run: { id: before.runId, number: before.runNumber },
            valuedAt: before.valuedAt,
            value: then,
          }
        : null,
    change: value === null || then === null ? null : value - then,
    exception,
  };
}

/** The rows of some trades of one run, in the order of the versions given. */
export async function readValuations(
  run: ValuationRun,
  versionIds: readonly string[],
  transaction?: Transaction,
): Promise<RunValuation[]> {
  const entries = await ChainEntry.findAll({
    where: { kind: 'valuation', runId: run.id, tradeVersionId: [...versionIds] },
    transaction,
  });
  const byVersion = (role: string) =>
    new Map(
      entries
        .filter((entry) => entry.role === role)
        .map((entry) => [String(entry.tradeVersionId), entry]),
    );
  const [primaries, checks] = [byVersion('primary'), byVersion('check')];
  const beforeFor = await findBefore([...primaries.values()], transaction);
  const trades = await findRunTrades(run.deskId, versionIds, transaction);
  const exceptions = await RunException.findAll({
    where: { runId: run.id, tradeVersionId: [...versionIds] },
    include: withAnswer,
    transaction,
  });
  return trades.map((trade) => {
    const [entry, check] = [primaries, checks].map((map) => map.get(trade.tradeVersionId));
    if (!entry || !check) throw new Error(`Trade ${trade.tradeNumber} is not in this run.`);
    const exception = exceptions.find(({ tradeId }) => tradeId === trade.tradeId);
    return valuationOf({
      entry,
      check: bodyOf(check),
      trade,
      before: beforeFor(entry),
      exception: exception ? exceptionView(exception, run, trade) : null,
    });
  });
}

export const isExceptional = (
  row: RunValuation,
): row is RunValuation & { exception: ExceptionOnTheWire } => row.exception !== null;

export async function readException(exception: RunException, transaction?: Transaction) {
  const run = await ValuationRun.findByPk(exception.runId, { transaction, rejectOnEmpty: true });
  const rows = await readValuations(run, [exception.tradeVersionId], transaction);
  const [row] = rows.filter(isExceptional);
  return row;
}

export async function getRunException(desk: Desk, runId: string, id: string) {
  const exception = await RunException.findOne({ where: { deskId: desk.id, runId, id } });
  if (!exception) throw new AppError('not-found');
  return readException(exception);
}
