/**
 * The heat equation by the explicit step: each new value is the mean over a short random walk.
 *
 * In the heat coordinates of `heat/uniform-grid.ts` the equation is u_τ = u_xx, and one step reads
 *   u(x, τ+k) = λ·u(x−h, τ) + (1 − 2λ)·u(x, τ) + λ·u(x+h, τ),   λ = k/h².
 * That is the expectation after one move of a walk that goes left or right with probability λ and
 * stays with 1 − 2λ. Its variance per unit of heat time, h²·2λ/k = 2, does not depend on the grid; so
 * a ladder of grids keeps h²/(2k) fixed and quarters k where it halves h.
 *
 * Stability. A wave sin(πmjh) is multiplied by 1 − 4λ·sin²(πmh/2) per step. Past λ = ½ the shortest
 * wave on the grid grows, by 4λ − 1 per step in size: the walk would have to stay with a negative
 * probability. Such sizes are refused with advice; `beyondStability: true` runs them all the same,
 * because a study wants to show what happens. With spaceSteps N and timeSteps M,
 * λ ≤ N²/(392·M) for every contract, so that the defaults are stable for all of them.
 *
 * Order: 2 in h at fixed λ, which is 1 in k; the leading error is proportional to 1 − 6λ, so that
 * λ = 1/6 would be of fourth order on smooth data. Early exercise: after each step the larger of
 * that mean and the intrinsic value.
 *
 * `smoothing: 'richardson'`, the default, extrapolates over grids of full, half and quarter width at
 * one λ, and makes the error estimate of them (`heat/refine.ts`); `none` is the plain scheme.
 * Greeks as in `heat-crank-nicolson.ts`. Accuracy at the default 192 × 240: European
 * 1e-5 of the larger of strike and spot, American 1e-4 of the strike (`tests/pricing/heat-schemes.test.ts`).
 *
 * Diagnostics: `stabilityNumber` is the largest λ of the grids used, `stayProbability` is 1 − 2λ,
 * `amplification` the size of the factor by which a step multiplies the wave that grows most or
 * falls least.
 *
 * Source: R. Courant, K. Friedrichs, H. Lewy, Mathematische Annalen 100 (1928).
 */
import type { Contract, Market, PricingFailure, PricingResult } from '@/pricing/contract';
import { sizeLimits } from '@/pricing/conventions';
import { refuseGrid } from '@/pricing/heat/refusals';
import { exerciseValue, priceOnUniformGrid } from '@/pricing/heat/uniform';
import { lambdaOf } from '@/pricing/heat/uniform-grid';
import type { Method, MethodSizes } from '@/pricing/method';
import { sin } from '@/pricing/numerics/elementary';

const defaults = { spaceSteps: 192, timeSteps: 240, smoothing: 'richardson' } as const;
const stabilityLimit = 0.5;
const halfTurn = 1.5707963267948966;

function price(contract: Contract, market: Market, settings: MethodSizes): PricingResult {
  const { spaceSteps, timeSteps, smoothing } = { ...defaults, ...settings };
  const deviation = market.volatility * Math.sqrt(contract.expiry);
  const refusal = refuseGrid({ spaceSteps, timeSteps }, deviation);
  if (refusal) return refusal;
  const lambda = largestLambda(deviation, spaceSteps, timeSteps);
  const past = lambda > stabilityLimit;
  if (past && !settings.beyondStability) {
    return pastTheLimit(deviation, spaceSteps, timeSteps, lambda);
  }
  const result = priceOnUniformGrid(
    contract,
    market,
    { spaceSteps, timeSteps, smoothing },
    'explicit',
  );
  if (!Number.isFinite(result.value) || !Number.isFinite(result.errorEstimate)) return overflowed();
  const diagnostics = {
    ...result.diagnostics,
    stabilityNumber: lambda,
    stabilityLimit,
    stayProbability: 1 - 2 * lambda,
    amplification: amplificationOf(lambda, spaceSteps),
  };
  const sizes = { name: 'heat-explicit', spaceSteps, timeSteps, smoothing } as const;
  if (!past) {
    const value = Math.max(result.value, exerciseValue(contract, market));
    return { ok: true, ...result, value, diagnostics, method: sizes, warnings: [] };
  }
  const warning = { code: 'past-stability-limit', message: whyUnstable(lambda) };
  const method = { ...sizes, beyondStability: true };
  return { ok: true, ...result, diagnostics, method, warnings: [warning] };
}

/** Of all grids that the extrapolation uses; rounding of their sizes moves λ a little. */
function largestLambda(deviation: number, spaceSteps: number, timeSteps: number): number {
  const at = (divisor: number) =>
    lambdaOf(
      deviation,
      Math.ceil(spaceSteps / divisor),
      Math.ceil(timeSteps / (divisor * divisor)),
    );
  return Math.max(at(1), at(2), at(4));
}

/** The largest |1 − 4λs| over the waves that the grid carries, s = sin²(πm/2N), m = 1 … N − 1. */
function amplificationOf(lambda: number, spaceSteps: number): number {
  const factor = (mode: number) => {
    const root = sin((halfTurn * mode) / spaceSteps);
    return Math.abs(1 - 4 * lambda * root * root);
  };
  return Math.max(factor(1), factor(spaceSteps - 1));
}

function whyUnstable(lambda: number): string {
  const stay = (2 * lambda - 1).toFixed(2);
  const factor = (4 * lambda - 1).toFixed(2);
  return `At k/h² = ${lambda.toFixed(2)}, past ½, the walk would stay with a probability of −${stay}, and each step multiplies the shortest wave by −${factor}.`;
}

function pastTheLimit(
  deviation: number,
  spaceSteps: number,
  timeSteps: number,
  lambda: number,
): PricingFailure {
  let enough = 16 * Math.ceil((timeSteps * lambda) / (16 * stabilityLimit));
  while (largestLambda(deviation, spaceSteps, enough) > stabilityLimit) enough += 16;
  const allowed = enough <= sizeLimits.timeSteps.max;
  const advice = allowed ? `Take at least ${enough} time steps` : 'Take fewer space steps';
  return {
    ok: false,
    code: 'past-stability-limit',
    path: allowed ? 'method.timeSteps' : 'method.spaceSteps',
    message: `${whyUnstable(lambda)} ${advice}, or the implicit or the Crank–Nicolson grid.`,
  };
}

/** The same space grid at k/h² a little above ¾, where each step doubles the shortest wave. */
function pastLimit(contract: Contract, market: Market, sizes: MethodSizes): MethodSizes {
  const { spaceSteps, timeSteps } = { ...defaults, ...sizes };
  const deviation = market.volatility * Math.sqrt(contract.expiry);
  const lambda = lambdaOf(deviation, spaceSteps, timeSteps);
  const shortened = Math.max(sizeLimits.timeSteps.min, Math.floor((timeSteps * lambda) / 0.75));
  return { ...sizes, timeSteps: shortened, beyondStability: true };
}

function overflowed(): PricingFailure {
  return {
    ok: false,
    code: 'numerical-failure',
    path: 'method.timeSteps',
    message:
      'The steps past the stability limit grew beyond what a computer holds; take more time steps.',
  };
}

export const heatExplicit: Method = {
  name: 'heat-explicit',
  label: 'Explicit heat grid',
  summary:
    'The heat equation by the explicit step, each value the average over a short random walk. ' +
    'European and American exercise. Stable up to k/h² = ½ only, so that fine grids need very many ' +
    'time steps; for convergence studies rather than for daily prices.',
  theoreticalOrder: 2,
  machinery: ['uniform finite-difference grid', 'heat coordinates', 'explicit step'],
  defaultSettings: defaults,
  coarsestSettings: { spaceSteps: 48, timeSteps: 15, smoothing: 'richardson' },
  stability: { timeGrowth: 4, pastLimit },
  byNameOnly: true,
  prices: (contract) => contract.payoff === 'vanilla',
  work: ({ spaceSteps = defaults.spaceSteps, timeSteps = defaults.timeSteps }) =>
    8 * spaceSteps * timeSteps,
  price,
};
