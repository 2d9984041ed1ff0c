/**
 * The European digital options in closed form: all or nothing at expiry.
 *
 *     cash-or-nothing    V = cash exp(-rate T) cdf(± d2)
 *     asset-or-nothing   V = spot exp(-yield T) cdf(± d1)          + for a call, - for a put
 *
 * with d1 and d2 of `closed-form.ts`. Both are L·cdf(± d) with one leg L and one argument d, and one
 * set of formulas serves: with n = density(d), e = d1 for the cash and d2 for the asset option (the
 * other argument), s = volatility sqrt(T), the derivatives are
 *
 *     by d          ± L n                 by spot      of d: 1/(spot s)
 *     by volatility of d: -e/volatility   of d1: -d2/volatility,   of d2: -d1/volatility
 *
 * A vanilla call is the asset option less the cash option that pays the strike, which the tests use.
 * Nothing is subtracted, so that no digits cancel: the value is as good as cdf and the rounding of d,
 * tails included.
 *
 * Source: M. Rubinstein, E. Reiner, Unscrambling the binary code, Risk 4 (1991).
 */
import type { DigitalContract, Greeks, Market } from '@/pricing/contract';
import { legsOf, type Legs } from '@/pricing/closed-form/legs';
import { exp } from '@/pricing/numerics/elementary';
import { normalCdf, normalDensity } from '@/pricing/numerics/normal';

const ROUNDING = 1.1102230246251565e-16;
const SMALLEST_NORMAL = 2.2250738585072014e-308;
/** The independent errors are each about half their bound; this makes the sum a safe one. */
const SAFETY = 1.7;

/** What value, Greeks and error share; `paysCash` tells the two options apart. */
type Terms = {
  legs: Legs;
  paysCash: boolean;
  leg: number;
  s: number;
  d: number;
  other: number;
  value: number;
  /** ± L n: the derivative of the value by d. */
  slope: number;
};

export type DigitalValue = {
  value: number;
  errorEstimate: number;
  greeks: Greeks;
  diagnostics: { d1: number; d2: number; forward: number };
};

export function digitalValue(contract: DigitalContract, market: Market): DigitalValue {
  const terms = termsOf(contract, market);
  const { paysCash, d, other, legs, value } = terms;
  return {
    value,
    errorEstimate: errorOf(contract, market, terms),
    greeks: greeksOf(contract, market, terms),
    diagnostics: {
      d1: paysCash ? other : d,
      d2: paysCash ? d : other,
      forward: market.spot * exp(legs.drift),
    },
  };
}

function termsOf(contract: DigitalContract, market: Market): Terms {
  const legs = legsOf(contract, market);
  const s = market.volatility * Math.sqrt(contract.expiry);
  const d1 = legs.x / s + 0.5 * s;
  const d2 = legs.x / s - 0.5 * s;
  const paysCash = contract.payoff === 'cash-or-nothing';
  const leg = paysCash ? contract.cash * exp(-market.rate * contract.expiry) : legs.legA;
  const d = paysCash ? d2 : d1;
  return {
    legs,
    paysCash,
    leg,
    s,
    d,
    other: paysCash ? d1 : d2,
    value: leg * normalCdf(legs.sign * d),
    slope: legs.sign * leg * normalDensity(d),
  };
}

function greeksOf(contract: DigitalContract, market: Market, terms: Terms): Greeks {
  const { legs, paysCash, s, d, other, value, slope } = terms;
  const { expiry } = contract;
  const { spot, rate, volatility } = market;
  const { carry, drift } = legs;
  const rootExpiry = Math.sqrt(expiry);
  // The leg of the asset option is the spot's own; that of the cash option does not move with it.
  const own = paysCash ? 0 : 1;
  const delta = (own * value + slope / s) / spot;
  const halfVariance = (paysCash ? -0.5 : 0.5) * s * s;
  const ofTime = (drift + halfVariance) / (s * expiry) - d / (2 * expiry);
  const legRate = paysCash ? rate : carry;
  const isFuture = 'carry' in market;
  const ofRate = (slope * rootExpiry) / volatility;
  return {
    delta,
    gamma: (-slope * other) / (spot * spot * s * s),
    vega: (-slope * other) / volatility,
    theta: legRate * value - slope * ofTime,
    rho: isFuture ? -expiry * value : (paysCash ? -expiry * value : 0) + ofRate,
    yieldRho: isFuture ? null : (paysCash ? 0 : -expiry * value) - ofRate,
    vanna: (slope * ((d * other - 1) / s - own * other)) / (spot * volatility),
    volga: (-slope * (d * other * other - d - other)) / (volatility * volatility),
  };
}

/** The roundings of x, s and d, of the leg and of cdf, each times the derivative by it. */
function errorOf(contract: DigitalContract, market: Market, terms: Terms): number {
  const { legs, paysCash, s, d, value, slope } = terms;
  const { logSpotStrike, drift, x, carry } = legs;
  const exponent = Math.abs(paysCash ? market.rate : carry) * contract.expiry;
  const xError = Math.abs(logSpotStrike) + 2 * Math.abs(drift) + 0.5 * Math.abs(x);
  const errors = [
    2 * value,
    value * (1 + exponent),
    slope * (xError / s),
    slope * (Math.abs(x / s) + 0.5 * s + 0.5 * Math.abs(d)),
  ];
  // Scaled by the largest, because the square of a tail value would underflow.
  const largest = Math.max(...errors.map(Math.abs), SMALLEST_NORMAL);
  const square = errors.reduce((sum, error) => sum + (error / largest) * (error / largest), 0);
  return Math.max(SAFETY * ROUNDING * largest * Math.sqrt(square), SMALLEST_NORMAL);
}
