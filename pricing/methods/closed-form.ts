/**
 * European options in closed form: vanilla here, digital ones in `closed-form/digital.ts`.
 *
 *     call = A cdf(d1) - B cdf(d2),   put = B cdf(-d2) - A cdf(-d1),
 *     A = spot exp(-yield T),  B = strike exp(-rate T),  x = ln(A / B),  s = volatility sqrt(T),
 *     d1 = x/s + s/2,  d2 = x/s - s/2.
 *
 * One formula for every kind of underlying (`conventions.ts`): Black & Scholes (1973) and Merton (1973)
 * for a share or index, Garman & Kohlhagen (1983) for a currency pair, Black (1976) for a future. It
 * supposes one constant rate, yield and volatility and no cash dividends.
 *
 * Computed as: the option out of the money forward by `out-of-the-money.ts`, which never subtracts what
 * cancels; the one in the money is that and the difference of the discounted legs, which is parity.
 * x is taken as ln(spot / strike), exact to its last bit however near the two are, plus the drift.
 *
 * Accuracy: relative error at most 1e-13 max(1, spot |delta| / value), tails included, and parity to
 * 1e-14 of the larger leg; measured against 60-digit values (tests/pricing/closed-form.test.ts) over
 * expiries to 50 years, volatilities from 0.01 % and values down to 1e-200. What is not reached is
 * conditioning: a value that moves a thousandfold with the spot shows its rounding a thousandfold.
 *
 * Error estimate: the roundings of x, s, the legs and of each branch, times the derivative by each,
 * combined as independent errors. It holds in at least 95 % of cases.
 */
import type { Contract, Greeks, Market, PricingResult } from '@/pricing/contract';
import { digitalValue } from '@/pricing/closed-form/digital';
import { forwardGain, legsOf, type Legs } from '@/pricing/closed-form/legs';
import { branchFor, outOfTheMoney } from '@/pricing/closed-form/out-of-the-money';
import type { Method } from '@/pricing/method';
import { exp } from '@/pricing/numerics/elementary';
import { millsRatio, normalCdf, normalDensity } from '@/pricing/numerics/normal';

const ROUNDING = 1.1102230246251565e-16;
const SMALLEST_NORMAL = 2.2250738585072014e-308;
/** The independent errors are each about half their bound; this makes the sum a safe one. */
const SAFETY = 1.7;

/** The numbers that value, Greeks and error share; the names are those of the formula above. */
type Terms = {
  legs: Legs;
  s: number;
  d1: number;
  d2: number;
  rootExpiry: number;
  /** The value of the option on the other side of the forward: what is left above parity. */
  extrinsic: number;
};

function termsOf(contract: Contract, market: Market): Terms {
  const legs = legsOf(contract, market);
  const { x, legA, legB } = legs;
  const rootExpiry = Math.sqrt(contract.expiry);
  const s = market.volatility * rootExpiry;
  return {
    legs,
    s,
    d1: x / s + 0.5 * s,
    d2: x / s - 0.5 * s,
    rootExpiry,
    extrinsic: Math.min(legA, legB) * outOfTheMoney(-Math.abs(x), s),
  };
}

function valueOf(terms: Terms): number {
  const { legs, extrinsic } = terms;
  return legs.sign * legs.x > 0 ? forwardGain(legs) + extrinsic : extrinsic;
}

function greeksOf(contract: Contract, market: Market, terms: Terms, value: number): Greeks {
  const { s, d1, d2, rootExpiry } = terms;
  const { sign, legA, legB, yieldDiscount, carry } = terms.legs;
  const { rate, spot, volatility } = market;
  const { expiry } = contract;
  const density = normalDensity(d1);
  const delta = sign * yieldDiscount * normalCdf(sign * d1);
  const spotPart = spot * delta;
  const strikePart = sign * legB * normalCdf(sign * d2);
  const vega = legA * density * rootExpiry;
  const isFuture = 'carry' in market;
  return {
    delta,
    gamma: (yieldDiscount * density) / (spot * s),
    vega,
    theta: (-0.5 * vega * volatility) / expiry + (carry - rate) * spotPart + rate * value,
    rho: isFuture ? -expiry * value : expiry * strikePart,
    yieldRho: isFuture ? null : -expiry * spotPart,
    vanna: (-yieldDiscount * density * d2) / volatility,
    volga: (vega * d1 * d2) / volatility,
  };
}

/** See the opening comment; each entry is one rounding error seen in the value. */
function errorOf(contract: Contract, market: Market, terms: Terms, value: number): number {
  const { s, extrinsic } = terms;
  const { sign, legA, legB, logSpotStrike, drift, x, carry } = terms.legs;
  const distance = -Math.abs(x);
  const a = distance / s + 0.5 * s;
  const small = Math.min(legA, legB);
  const density = small * normalDensity(a);
  const branch = branchFor(distance, s);
  const inTheMoney = sign * x > 0;
  const xError = Math.abs(logSpotStrike) + Math.abs(drift) + 0.5 * Math.abs(x);
  const strikeLegSlope = Math.max(legA, legB) * normalCdf(distance / s - 0.5 * s);
  const exponent = Math.max(Math.abs(carry), Math.abs(market.rate)) * contract.expiry;
  const errors = [
    value,
    xError * (strikeLegSlope + (inTheMoney && x * x < 0.25 ? legB : 0)),
    s * density,
    extrinsic * (1 + exponent),
    extrinsic * Math.abs(a) * (Math.abs(distance / s) + Math.abs(a)) * 0.7,
    inTheMoney ? (legA + legB) * (0.5 * exponent + (x * x < 0.25 ? 0 : 1)) : 0,
    branch === 'direct' ? 2 * small * normalCdf(a) : 0,
    branch === 'mills' ? 2 * density * millsRatio(-a) : 0,
    branch === 'series' ? extrinsic * (x / s) * (x / s) : 0,
  ];
  // Scaled by the largest, because the square of a tail value would underflow.
  const largest = Math.max(...errors, SMALLEST_NORMAL);
  const square = errors.reduce((sum, error) => sum + (error / largest) * (error / largest), 0);
  return Math.max(SAFETY * ROUNDING * largest * Math.sqrt(square), SMALLEST_NORMAL);
}

function price(contract: Contract, market: Market): PricingResult {
  if (!prices(contract)) {
    return {
      ok: false,
      code: 'method-does-not-price',
      path: 'contract.exercise',
      message: 'The closed form prices European exercise only: choose another method.',
    };
  }
  if (contract.payoff !== 'vanilla') {
    return {
      ok: true,
      ...digitalValue(contract, market),
      method: { name: 'closed-form' },
      warnings: [],
    };
  }
  const terms = termsOf(contract, market);
  const value = valueOf(terms);
  return {
    ok: true,
    value,
    errorEstimate: errorOf(contract, market, terms, value),
    greeks: greeksOf(contract, market, terms, value),
    method: { name: 'closed-form' },
    diagnostics: { d1: terms.d1, d2: terms.d2, forward: market.spot * exp(terms.legs.drift) },
    warnings: [],
  };
}

function prices(contract: Contract): boolean {
  return contract.exercise === 'european';
}

export const closedForm: Method = {
  name: 'closed-form',
  label: 'Closed form',
  summary:
    'The formula of Black, Scholes and Merton, with its variants for currency pairs, futures and ' +
    'digital options. Exact to rounding, and the yardstick for the other routes; European exercise only.',
  theoreticalOrder: null,
  machinery: ['normal distribution', 'closed formula'],
  defaultSettings: {},
  coarsestSettings: {},
  prices,
  work: () => 1,
  price,
};
