/** Processes killed in the middle of a run's chunk, and what the run has left in the end. */
import { asSuperuser } from './environment';
import { ended } from './processes';
import { until } from './until';
import type { ChildProcess } from 'node:child_process';

/** Chunks that somebody has taken and not finished. */
export async function chunksInHand(runId: string): Promise<number[]> {
  const rows = await asSuperuser<{ number: number }>(
    `SELECT chunk.number FROM graphile_worker._private_jobs job
      JOIN run_chunks chunk ON chunk.run_id = (job.payload ->> 'runId')::uuid
        AND chunk.number = (job.payload ->> 'number')::integer
      WHERE chunk.run_id = $1 AND chunk.done_at IS NULL AND job.locked_by IS NOT NULL`,
    [runId],
  );
  return rows.map(({ number }) => number);
}

export type RunState = { status: string; done: number; total: number };

export async function stateOf(runId: string): Promise<RunState> {
  const [state] = await asSuperuser<RunState>(
    'SELECT status, done, total FROM valuation_runs WHERE id = $1',
    [runId],
  );
  return state;
}

export const isOver = async (runId: string): Promise<boolean> =>
  (await stateOf(runId)).status === 'finished';

/** Waits until a chunk is in hand; false when the run came to its end before. */
export async function isCaughtInChunk(runId: string): Promise<boolean> {
  let isCaught = false;
  await until(async () => {
    isCaught = (await chunksInHand(runId)).length > 0;
    return isCaught || (await isOver(runId));
  });
  return isCaught;
}

/**
 * Kills the only worker while it has a chunk in hand: it is frozen first and looked at, and let go
 * on where it was just between two. Gives the chunks that it was at; none when the run was quicker.
 */
export async function killMidChunk(worker: ChildProcess, runId: string): Promise<number[]> {
  while (await isCaughtInChunk(runId)) {
    worker.kill('SIGSTOP');
    const inHand = await chunksInHand(runId);
    if (inHand.length > 0) {
      worker.kill('SIGKILL');
      await ended(worker);
      return inHand;
    }
    worker.kill('SIGCONT');
  }
  return [];
}

/** Everything that a run has sealed and left on its trades, without what names the run itself. */
export async function leftBy(runId: string): Promise<string[]> {
  const rows = await asSuperuser<{ row: string }>(
    `(SELECT (body::jsonb - 'runId' - 'runNumber')::text AS row
      FROM chain_entries WHERE kind = 'valuation' AND run_id = $1
      ORDER BY trade_number, role)
    UNION ALL
    (SELECT concat_ws(' ', trade_id, kind, materiality) FROM run_exceptions
      WHERE run_id = $1 ORDER BY trade_id)
    UNION ALL
    (SELECT concat_ws(' ', number, last_value, last_error, last_verdict, last_refuted, last_total,
        last_strip, last_tolerance)
      FROM trades WHERE last_run_id = $1 ORDER BY ordinal)
    UNION ALL
    (SELECT concat_ws(' ', done, total, agree, wide, disagree, one_route, failed, refuted, totals)
      FROM valuation_runs WHERE id = $1)`,
    [runId],
  );
  return rows.map(({ row }) => row);
}
