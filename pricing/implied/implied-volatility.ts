/**
 * The volatility at which an option is worth a given premium.
 *
 * European: by parity the premium is reduced to that of the option out of the money forward, and
 * that to v(x, s) of `closed-form/out-of-the-money.ts`, a rising function of s alone. Its logarithm is
 * taken, because v spans hundreds of decades, and the root in ln s found in a bracket that the bounds
 *
 *     v(x, s) <= v(0, s) <= 0.4 s   and   v(x, s) < exp(-(|x|/s - s/2)^2 / 2)
 *
 * give, so that nothing depends on a guess. Error at most max(1e-12 volatility, rounding of the premium
 * over vega), measured against mpmath (tests/pricing/implied-volatility.test.ts).
 *
 * American: the premium is the price of a method as a function of the volatility; a bracket is
 * widened from 30 % and closed in. As good as that price.
 *
 * Where there is no answer: a premium outside what no arbitrage allows, whatever the volatility; and a
 * premium equal to what exercise or the forward pays, which every small volatility gives.
 */
import type { Contract, Market, PricingRequest } from '@/pricing/contract';
import { numberLimits } from '@/pricing/conventions';
import { forwardGain, legsOf, type Legs } from '@/pricing/closed-form/legs';
import {
  branchFor,
  outOfTheMoney,
  scaledOutOfTheMoney,
} from '@/pricing/closed-form/out-of-the-money';
import { exp, log } from '@/pricing/numerics/elementary';
import { findRoot } from '@/pricing/numerics/root';
import { unsolved, type Pricer, type Solved } from './solved';

const LOG_SQRT_TWO_PI = 0.9189385332046727;
/** A premium nearer to its floor than this share of it is its floor, rounded. */
const ROUNDING = 1e-15;

const floorMessage =
  'At this premium the option is worth only what it would pay if the price never moved: every ' +
  'small volatility gives it. Enter a higher premium.';

/** ln v(x, s), also where v is too small for a double. */
function logOutOfTheMoney(x: number, s: number): number {
  if (branchFor(x, s) === 'direct') return log(outOfTheMoney(x, s));
  const a = x / s + 0.5 * s;
  return log(scaledOutOfTheMoney(x, s)) - 0.5 * a * a - LOG_SQRT_TWO_PI;
}

/** The s with v(x, s) = share, for x <= 0 and 0 < share < 1. */
function solveDeviation(x: number, share: number): number | undefined {
  const target = log(share);
  const gap = (logS: number) => logOutOfTheMoney(x, exp(logS)) - target;
  // A double's logarithm is above -745, so that |x|/s is below 45; and v(x, 40 + 4 sqrt|x|) is 1.
  const low = log(Math.max(2 * share, -x / 45));
  const high = log(40 + 4 * Math.sqrt(-x));
  const found = findRoot(gap, { low, high, atLow: gap(low), atHigh: gap(high) }, 1e-15);
  return found === undefined ? undefined : exp(found);
}

function europeanVolatility(contract: Contract, legs: Legs, premium: number): Solved {
  const { sign, legA, legB, x } = legs;
  const gain = forwardGain(legs);
  const floor = Math.max(0, gain);
  const ceiling = sign === 1 ? legA : legB;
  if (premium < floor - ROUNDING * floor || premium >= ceiling) {
    return outsideBand(floor, ceiling);
  }
  const extrinsic = sign * x > 0 ? premium - gain : premium;
  if (extrinsic <= ROUNDING * floor) return unsolved('not-determined', 'premium', floorMessage);
  const s = solveDeviation(-Math.abs(x), extrinsic / Math.min(legA, legB));
  return withinLimits(s === undefined ? undefined : s / Math.sqrt(contract.expiry));
}

function outsideBand(floor: number, ceiling: number): Solved {
  const band = `between ${floor.toPrecision(6)} and ${ceiling.toPrecision(6)}`;
  const message = `No volatility gives this premium: without arbitrage it lies ${band}.`;
  return unsolved('out-of-range', 'premium', message);
}

function withinLimits(volatility: number | undefined): Solved {
  const { min, max } = numberLimits.volatility;
  if (volatility !== undefined && volatility >= min && volatility <= max) {
    return { ok: true, value: volatility };
  }
  const message = `The volatility of this premium is not between ${min} and ${max}: check it.`;
  return unsolved('out-of-range', 'premium', message);
}

/** By pricing at trial volatilities; see the opening comment. */
function volatilityByPricing(request: PricingRequest, premium: number, price: Pricer): Solved {
  const { contract, market } = request;
  const sign = contract.kind === 'call' ? 1 : -1;
  const floor = Math.max(0, sign * (market.spot - contract.strike));
  if (premium < floor - ROUNDING * floor) return outsideBand(floor, ceilingOf(contract, market));
  if (premium <= floor + ROUNDING * floor) {
    return unsolved('not-determined', 'premium', floorMessage);
  }
  const { min, max } = numberLimits.volatility;
  const gap = (volatility: number) => {
    const result = price({ ...request, market: { ...market, volatility } });
    return result.ok ? result.value - premium : NaN;
  };
  let [low, high] = [0.3, 0.3];
  let [atLow, atHigh] = [gap(low), gap(high)];
  while (atLow > 0 && low > min) {
    [high, atHigh] = [low, atLow];
    low = Math.max(min, low / 2);
    atLow = gap(low);
  }
  while (atHigh < 0 && high < max) {
    [low, atLow] = [high, atHigh];
    high = Math.min(max, high * 2);
    atHigh = gap(high);
  }
  return withinLimits(findRoot(gap, { low, high, atLow, atHigh }, 1e-10));
}

/** What an American option can never be worth more than. */
function ceilingOf(contract: Contract, market: Market): number {
  const { legA, legB } = legsOf(contract, market);
  return contract.kind === 'call' ? Math.max(market.spot, legA) : Math.max(contract.strike, legB);
}

export function solveImpliedVolatility(
  request: PricingRequest,
  premium: number,
  price: Pricer,
): Solved {
  if (!Number.isFinite(premium)) {
    return unsolved('not-finite', 'premium', 'The premium must be a finite number.');
  }
  const { contract, market } = request;
  if (contract.exercise === 'european') {
    return europeanVolatility(contract, legsOf(contract, market), premium);
  }
  return volatilityByPricing(request, premium, price);
}
