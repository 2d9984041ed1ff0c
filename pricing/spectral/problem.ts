import type { Contract, Market } from '@/pricing/contract';
import { carryYield } from '@/pricing/conventions';
import { log } from '@/pricing/numerics/elementary';

/**
 * The American put per unit of strike, with the expiry as the unit of time: besides the spot it
 * depends on three numbers. A call is the put with spot and strike, rate and yield exchanged.
 */
export type BoundaryProblem = {
  /** rate · expiry. */
  rate: number;
  /** yield · expiry. */
  carry: number;
  /** volatility · √expiry. */
  deviation: number;
};

/** ln X: the boundary just before expiry, at the strike or where interest no longer pays the yield. */
export function logStartOf({ rate, carry }: BoundaryProblem): number {
  return carry > rate ? log(rate / carry) : 0;
}

/** The put that a contract is, with rate and yield moved by the given amounts. */
export function problemOf(
  contract: Contract,
  market: Market,
  rateBy: number,
  yieldBy: number,
): BoundaryProblem {
  const { expiry } = contract;
  const domestic = (market.rate + rateBy) * expiry;
  const foreign = (carryYield(market) + yieldBy) * expiry;
  const put = contract.kind === 'put';
  return {
    rate: put ? domestic : foreign,
    carry: put ? foreign : domestic,
    deviation: market.volatility * Math.sqrt(expiry),
  };
}

/**
 * Where the put is exercised: `none` where interest on the strike never exceeds the yield of the
 * spot, `two` where it does only between two boundaries, else below one that starts at the strike
 * or beneath it.
 */
export type Regions = 'none' | 'two' | 'from-strike' | 'from-below-strike';

export function regionsOf({ rate, carry }: BoundaryProblem): Regions {
  if (rate < 0) return carry < rate ? 'two' : 'none';
  if (rate === 0 && carry >= 0) return 'none';
  return carry > rate ? 'from-below-strike' : 'from-strike';
}
