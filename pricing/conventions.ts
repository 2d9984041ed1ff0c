/**
 * Units and signs: the one place where they are written down.
 *
 * | quantity             | convention                                                              |
 * |----------------------|-------------------------------------------------------------------------|
 * | time                 | years, ACT/365 Fixed, from the valuation instant                        |
 * | rate, yield          | continuously compounded, per year, as a decimal (0.05 is 5 %)           |
 * | volatility           | per square-root year, as a decimal (0.20 is 20 %)                       |
 * | value, errorEstimate | per one unit of the underlying, in the quote currency                   |
 * | delta, gamma         | change per 1.00 of the spot; gamma is the change of delta per 1.00      |
 * | vega, rho, yieldRho  | change per 1.00 (one hundred points) of volatility, rate, yield         |
 * | theta                | change per year as time passes, all else fixed: the negative of the     |
 * |                      | derivative by expiry                                                    |
 * | vanna                | change of delta per 1.00 of volatility                                  |
 * | volga                | change of vega per 1.00 of volatility                                   |
 *
 * What a screen multiplies these by (per point, per day, per position) is display, not meaning.
 *
 * The carry of every kind of underlying is one number, the yield: the dividend yield of a share or
 * index, the foreign rate of a currency pair (Garman & Kohlhagen 1983), and for a future the domestic
 * rate itself (Black 1976), so that the forward of every market is spot * exp((rate - yield) * expiry).
 * The rho of a future holds the futures price fixed: its yield moves with the rate.
 */
import type { Market } from '@/pricing/contract';

const MS_PER_YEAR = 365 * 24 * 60 * 60 * 1000;

/** ACT/365 Fixed between two instants (milliseconds since 1970, UTC); negative when `to` is earlier. */
export function yearFraction(fromMs: number, toMs: number): number {
  return (toMs - fromMs) / MS_PER_YEAR;
}

/** The one number that carries any kind of underlying; see the table above. */
export function carryYield(market: Market): number {
  return 'carry' in market ? market.rate : market.yield;
}

/**
 * What a request may ask for, both ends included. Wide enough for every market quoted anywhere, and
 * narrow enough that no method can overflow or run for minutes: a number outside is a slip of the
 * keyboard or of a unit (5 for 5 %), and is refused with a sentence, never adjusted.
 */
export const numberLimits = {
  strike: { min: 1e-12, max: 1e12 },
  /** What a digital option pays, per one unit of the underlying. */
  cash: { min: 1e-12, max: 1e12 },
  spot: { min: 1e-12, max: 1e12 },
  /** From half a minute to a century. */
  expiry: { min: 1e-6, max: 100 },
  rate: { min: -1, max: 1 },
  yield: { min: -1, max: 1 },
  /** The largest is 1,000 % a year. */
  volatility: { min: 1e-5, max: 10 },
  /** Absolute, in the quote currency per one unit of the underlying. */
  tolerance: { min: 1e-12, max: 1e12 },
} as const;

/** Sizes of grids and walks, both ends included: what prices in about a second on a phone. */
export const sizeLimits = {
  spaceSteps: { min: 10, max: 4000 },
  timeSteps: { min: 4, max: 4000 },
  steps: { min: 1, max: 5000 },
  nodes: { min: 16, max: 64 },
} as const;
