/**
 * The strike at which an option has a given delta (per 1.00 of spot, spot delta with premium not
 * included: the derivative that every result reports).
 *
 * European: delta = sign exp(-yield T) cdf(sign d1) is inverted by the quantile of the normal
 * distribution, and d1 gives the strike. American: delta falls as the strike rises; it is priced at
 * trial strikes in a bracket widened from the European answer, and is as good as that price's delta.
 */
import type { PricingRequest } from '@/pricing/contract';
import { numberLimits } from '@/pricing/conventions';
import { legsOf } from '@/pricing/closed-form/legs';
import { exp, log } from '@/pricing/numerics/elementary';
import { inverseNormalCdf } from '@/pricing/numerics/normal';
import { findRoot } from '@/pricing/numerics/root';
import { unsolved, type Pricer, type Solved } from './solved';

/** The double before 1: a delta at its limit still has a quantile. */
const LARGEST_SHARE = 1 - 1.1102230246251565e-16;

/** `share` is the probability that the delta leaves once the yield is taken off: 0 < share < 1. */
function europeanStrike({ contract, market }: PricingRequest, share: number): number {
  const { sign, drift } = legsOf(contract, market);
  const s = market.volatility * Math.sqrt(contract.expiry);
  const d1 = sign * inverseNormalCdf(share);
  return market.spot * exp(drift - s * d1 + 0.5 * s * s);
}

function americanStrike(request: PricingRequest, delta: number, start: number, price: Pricer) {
  const { min, max } = numberLimits.strike;
  const gap = (logStrike: number) => {
    const contract = { ...request.contract, strike: exp(logStrike) };
    const result = price({ ...request, contract });
    return result.ok ? result.greeks.delta - delta : NaN;
  };
  const from = log(Math.min(Math.max(start, min * 2), max / 2));
  const step = 0.5 * request.market.volatility * Math.sqrt(request.contract.expiry) + 0.01;
  let [low, high] = [from, from];
  let [atLow, atHigh] = [gap(low), gap(high)];
  // Delta falls with the strike: the low end must lie above the target, the high end below.
  for (let width = step; atLow < 0 && low > log(min); width *= 2) {
    [high, atHigh] = [low, atLow];
    low = Math.max(log(min), low - width);
    atLow = gap(low);
  }
  for (let width = step; atHigh > 0 && high < log(max); width *= 2) {
    [low, atLow] = [high, atHigh];
    high = Math.min(log(max), high + width);
    atHigh = gap(high);
  }
  const found = findRoot(gap, { low, high, atLow, atHigh }, 1e-10);
  return found === undefined ? undefined : exp(found);
}

export function solveStrikeForDelta(request: PricingRequest, delta: number, price: Pricer): Solved {
  const { contract, market } = request;
  if (!Number.isFinite(delta)) {
    return unsolved('not-finite', 'delta', 'The delta must be a finite number.');
  }
  const { sign, yieldDiscount } = legsOf(contract, market);
  const european = contract.exercise === 'european';
  // An American option can be exercised now, so that its delta reaches the whole of the spot.
  const limit = european ? yieldDiscount : Math.max(1, yieldDiscount);
  const size = sign * delta;
  if (!(size > 0 && size < limit)) {
    const bounds = sign === 1 ? `0 and ${limit.toFixed(4)}` : `${(-limit).toFixed(4)} and 0`;
    const message = `The delta of this ${contract.kind} lies between ${bounds}: enter one of these.`;
    return unsolved('out-of-range', 'delta', message);
  }
  const start = europeanStrike(request, Math.min(size / yieldDiscount, LARGEST_SHARE));
  const strike = european ? start : americanStrike(request, delta, start, price);
  const { min, max } = numberLimits.strike;
  if (strike !== undefined && strike >= min && strike <= max) return { ok: true, value: strike };
  const message = 'No strike within the limits has this delta: enter one nearer to the middle.';
  return unsolved('out-of-range', 'delta', message);
}
