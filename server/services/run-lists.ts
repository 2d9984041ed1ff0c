/** Pages of a run: its values, exceptions first and the gravest on top, and its exceptions alone. */
import { QueryTypes } from 'sequelize';
import { z } from 'zod';
import type { Verdict } from '@/pricing/contract';
import { AppError } from '@/shared/errors';
import { chainOf } from '../chain/append';
import { sequelize } from '../database';
import type { Desk } from '../models/desk';
import { ValuationRun } from '../models/valuation-run';
import { isExceptional, readValuations } from './run-valuations';

async function findRun(desk: Desk, id: string): Promise<ValuationRun> {
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

/**
 * Exceptions are few; of the rest, the index on the run gives a page in order without the others.
 * All values of a run have one instant, so that within it the order is that of the positions.
 */
const valuationKeys = `
  (SELECT entry.trade_version_id AS "versionId", entry.position, exception.gravity
    FROM run_exceptions exception
    JOIN chain_entries entry ON entry.kind = 'valuation' AND entry.run_id = exception.run_id
      AND entry.trade_version_id = exception.trade_version_id AND entry.role = 'primary'
    WHERE exception.run_id = $runId
      AND ($verdict::text IS NULL OR entry.verdict = $verdict)
      AND ($bookId::uuid IS NULL OR entry.book_id = $bookId)
      AND (exception.gravity, entry.position) > ($gravity::integer, $position::bigint)
    ORDER BY exception.gravity, entry.position LIMIT $rows)
  UNION ALL
  (SELECT entry.trade_version_id, entry.position, ${noGravity}
    FROM chain_entries entry
    WHERE entry.chain = $chain AND entry.run_number = $runNumber AND entry.role = 'primary'
      AND entry.valued_at = $valuedAt
      AND ($verdict::text IS NULL OR entry.verdict = $verdict)
      AND ($bookId::uuid IS NULL OR entry.book_id = $bookId)
      AND entry.position > CASE $gravity::integer WHEN ${noGravity} THEN $position::bigint ELSE 0 END
      AND NOT EXISTS (SELECT FROM run_exceptions exception
        WHERE exception.run_id = $runId AND exception.trade_version_id = entry.trade_version_id)
    ORDER BY entry.valued_at, entry.position LIMIT $rows)
  ORDER BY gravity, position LIMIT $rows`;

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
    bind: {
      runId,
      chain: chainOf('valuations', desk.id),
      runNumber: run.number,
      valuedAt: run.valuedAt.toISOString(),
      verdict,
      bookId,
      gravity,
      position,
      rows: limit + 1,
    },
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
