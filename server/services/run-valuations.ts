/** What a run found, trade by trade, read from the chain: exceptions first, the gravest on top. */
import { QueryTypes, type Transaction } from 'sequelize';
import { z } from 'zod';
import type { Verdict } from '@/pricing/contract';
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

export async function findRun(desk: Desk, id: string): Promise<ValuationRun> {
  const run = await ValuationRun.findOne({ where: { deskId: desk.id, id } });
  if (!run) throw new AppError('not-found');
  return run;
}

const encode = (key: readonly unknown[]) => Buffer.from(JSON.stringify(key)).toString('base64url');

function decode<Key>(cursor: string, schema: z.ZodType<Key>): Key {
  try {
    return schema.parse(JSON.parse(Buffer.from(cursor, 'base64url').toString('utf8')));
  } catch (error) {
    if (!(error instanceof SyntaxError || error instanceof z.ZodError)) throw error;
    const message = 'Take the cursor from the page before, unchanged.';
    throw new AppError('validation-failed', [{ path: 'cursor', code: 'not-a-cursor', message }]);
  }
}

type Page = { cursor?: string; limit: number };

/** Reads the rows that keys were found for; keys are one longer than the page when there is more. */
async function pageFor<Key extends { versionId: string }>(
  run: ValuationRun,
  keys: readonly Key[],
  limit: number,
  cursorOf: (key: Key) => readonly unknown[],
) {
  const shown = keys.slice(0, limit);
  const last = shown.at(-1);
  return {
    items: await readValuations(
      run,
      shown.map(({ versionId }) => versionId),
    ),
    nextCursor: keys.length > limit && last ? encode(cursorOf(last)) : null,
  };
}

type ValuationKey = { versionId: string; gravity: number; position: string };

/** Trades with which nothing is wrong come after every gravity of exception. */
const noGravity = 9;

const valuationKeys = `
  SELECT entry.trade_version_id AS "versionId", entry.position,
    coalesce(exception.gravity, ${noGravity}) AS gravity
  FROM chain_entries entry
  LEFT JOIN run_exceptions exception ON exception.run_id = entry.run_id
    AND exception.trade_version_id = entry.trade_version_id
  WHERE entry.kind = 'valuation' AND entry.run_id = $runId AND entry.role = 'primary'
    AND ($verdict::text IS NULL OR entry.verdict = $verdict)
    AND ($bookId::uuid IS NULL OR entry.book_id = $bookId)
    AND (coalesce(exception.gravity, ${noGravity}), entry.position)
      > ($gravity::integer, $position::bigint)
  ORDER BY gravity, entry.position LIMIT $rows`;

const valuationCursor = z.tuple([z.number().int().min(0), z.string().regex(/^\d{1,18}$/)]);

export async function listRunValuations(
  desk: Desk,
  runId: string,
  query: Page & { verdict?: Verdict; bookId?: string },
) {
  const { cursor, limit, verdict = null, bookId = null } = query;
  const run = await findRun(desk, runId);
  const [gravity, position] = cursor === undefined ? [0, '0'] : decode(cursor, valuationCursor);
  const keys = await sequelize.query<ValuationKey>(valuationKeys, {
    bind: { runId, verdict, bookId, gravity, position, rows: limit + 1 },
    type: QueryTypes.SELECT,
  });
  return pageFor(run, keys, limit, (key) => [key.gravity, key.position]);
}

type ExceptionKey = {
  versionId: string;
  rank: number;
  gravity: number;
  descent: string;
  id: string;
};

const exceptionKeys = `
  SELECT trade_version_id AS "versionId", (state = 'answered')::integer AS rank, gravity,
    descent::text AS descent, id
  FROM run_exceptions
  WHERE run_id = $runId AND ($state::text IS NULL OR state = $state)
    AND ($kind::text IS NULL OR kind = $kind)
    AND ((state = 'answered')::integer, gravity, descent, id)
      > ($rank::integer, $gravity::integer, $descent::numeric, $id::uuid)
  ORDER BY rank, gravity, run_exceptions.descent, id LIMIT $rows`;

const exceptionCursor = z.tuple([
  z.number().int().min(0).max(1),
  z.number().int().min(0),
  z.string().regex(/^-(Infinity|\d{1,40}(\.\d{1,20})?)$|^0$/),
  z.uuid(),
]);

const beforeAll = [0, 0, '0', '00000000-0000-4000-8000-000000000000'] as const;

const isExceptional = (
  row: RunValuation,
): row is RunValuation & { exception: ExceptionOnTheWire } => row.exception !== null;

export async function listRunExceptions(
  desk: Desk,
  runId: string,
  query: Page & { state?: string; kind?: string },
) {
  const { cursor, limit, state = null, kind = null } = query;
  const run = await findRun(desk, runId);
  const start = cursor === undefined ? beforeAll : decode(cursor, exceptionCursor);
  const [rank, gravity, descent, id] = start;
  const keys = await sequelize.query<ExceptionKey>(exceptionKeys, {
    bind: { runId, state, kind, rank, gravity, descent, id, rows: limit + 1 },
    type: QueryTypes.SELECT,
  });
  const page = await pageFor(run, keys, limit, (key) => [
    key.rank,
    key.gravity,
    key.descent,
    key.id,
  ]);
  return { ...page, items: page.items.filter(isExceptional) };
}

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
