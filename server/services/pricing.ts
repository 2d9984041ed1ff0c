import os from 'node:os';
import type { Contract, Market } from '@/pricing/contract';
import type { Route } from '@/shared/contracts/pricing';
import { AppError } from '@/shared/errors';
import { threadPool } from '../thread-pool';
import type { PriceTask } from '../threads/price';

/** Far beyond what any request within the engine's caps takes. */
const timeLimitMs = 15_000;

const pool = threadPool('price', 'priceRoutes', Math.max(1, os.availableParallelism() - 1));

/** The value of every route that prices these terms; a route that cannot says why. */
export async function priceRoutes(contract: Contract, market: Market): Promise<Route[]> {
  const task: PriceTask = { contract, market };
  const signal = AbortSignal.timeout(timeLimitMs);
  try {
    return await pool.run(task, { signal });
  } catch (error) {
    if (!signal.aborted) throw error;
    const message = 'Pricing took too long and was stopped; try terms nearer to the usual.';
    throw new AppError('cannot-price', [{ path: '', code: 'time-limit', message }]);
  }
}

export const closePricingThreads = () => pool.destroy();
