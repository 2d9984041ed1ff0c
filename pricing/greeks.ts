import type { Greeks, Market } from '@/pricing/contract';
import { carryYield } from '@/pricing/conventions';

/** A value with its derivatives in x = ln(spot), the variable in which grids and walks live. */
export type LogDerivatives = { value: number; slope: number; curvature: number };

/** Sensitivities to the rates; `yieldRho` is null for a future, whose rho holds its price fixed. */
export type RateSensitivities = { rho: number; yieldRho: number | null };

/**
 * All Greeks of a vanilla option from its derivatives in x and its sensitivities to the rates.
 *
 * Theta is the equation's, −V_t = ½σ²(V_xx − V_x) + (r−q)V_x − rV. Vega needs no second price: the
 * value depends on rate, yield, variance and time only through rT, qT and σ²T, hence
 * T·V_T = r·V_r + q·V_q + ½σ·V_σ, and V_T is minus theta. Both hold where the option is alive,
 * early exercise or not, for one constant rate, yield and volatility.
 */
export function greeksFromLogDerivatives(
  market: Market,
  expiry: number,
  { value, slope, curvature }: LogDerivatives,
  { rho, yieldRho }: RateSensitivities,
): Greeks {
  const { spot, rate, volatility } = market;
  const carry = carryYield(market);
  const bend = curvature - slope;
  const theta = rate * value - (rate - carry) * slope - 0.5 * volatility * volatility * bend;
  const fromRates = rate * rho + (yieldRho === null ? 0 : carry * yieldRho);
  const vega = (2 * (-expiry * theta - fromRates)) / volatility;
  return { delta: slope / spot, gamma: bend / (spot * spot), vega, theta, rho, yieldRho };
}

/**
 * European only: the rates act through the forward and the discount factor, so that
 * V_r = T·(V_x − V) and V_q = −T·V_x; with a futures price held fixed, V_r = −T·V.
 */
export function europeanRateSensitivities(
  market: Market,
  expiry: number,
  { value, slope }: LogDerivatives,
): RateSensitivities {
  if ('carry' in market) return { rho: -expiry * value, yieldRho: null };
  return { rho: expiry * (slope - value), yieldRho: -expiry * slope };
}

/** An option that is exercised now: the holder owns spot against strike, and nothing else moves. */
export function greeksOfImmediateExercise(market: Market, kind: 'call' | 'put'): Greeks {
  const yieldRho = 'carry' in market ? null : 0;
  return { delta: kind === 'call' ? 1 : -1, gamma: 0, vega: 0, theta: 0, rho: 0, yieldRho };
}

/**
 * How far to move a rate for a central difference: as far as moves the forward by a twentieth of
 * its deviation, and 0.4 points at most. Smaller moves would only magnify what the grid or
 * walk cannot resolve; the difference itself is wrong by about the square of this share over 6.
 */
export function rateBumpOf(market: Market, expiry: number): number {
  return Math.min(0.004, (0.05 * market.volatility) / Math.sqrt(expiry));
}

/**
 * Central difference in the rates, for American values: `valueAt` prices with rate and yield moved
 * by the given amounts on the same grid or walk, so that its discretisation moves smoothly.
 */
export function bumpedRateSensitivities(
  market: Market,
  bump: number,
  valueAt: (rateBump: number, yieldBump: number) => number,
): RateSensitivities {
  if ('carry' in market) {
    return { rho: (valueAt(bump, bump) - valueAt(-bump, -bump)) / (2 * bump), yieldRho: null };
  }
  return {
    rho: (valueAt(bump, 0) - valueAt(-bump, 0)) / (2 * bump),
    yieldRho: (valueAt(0, bump) - valueAt(0, -bump)) / (2 * bump),
  };
}
