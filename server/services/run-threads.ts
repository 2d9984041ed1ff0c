/** The threads that valuation runs are computed in. */
import os from 'node:os';
import { threadPool } from '../thread-pool';
import type { TaskFinding, ValuationTask } from '../threads/value';

/** One processor is left to those who read meanwhile. */
const pool = threadPool('value', 'valueTrades', Math.max(1, os.availableParallelism() - 1));

/** So few at a time that all threads come to their end together. */
const sliceSize = 10;

export async function valueTrades(tasks: readonly ValuationTask[]): Promise<TaskFinding[]> {
  const slices: Promise<TaskFinding[]>[] = [];
  for (let from = 0; from < tasks.length; from += sliceSize)
    slices.push(pool.run(tasks.slice(from, from + sliceSize)));
  return (await Promise.all(slices)).flat();
}

export const closeValuationThreads = () => pool.destroy();
