/**
 * The heat equation by the implicit step: stable for any sizes, of first order in time.
 *
 * In the heat coordinates of `heat/uniform-grid.ts` the equation is u_τ = u_xx, and one step solves
 *   (1 + 2λ)·u(x, τ+k) − λ·u(x−h, τ+k) − λ·u(x+h, τ+k) = u(x, τ),   λ = k/h².
 * A wave sin(πmjh) is multiplied by 1/(1 + 4λ·sin²(πmh/2)) per step, which lies between 0 and 1
 * whatever λ is: no limit, no sawtooth, and no need of a damped start. What it costs is order: the
 * error is (k/2 + h²/12)·u_xxxx to leading order, first in k. A ladder that doubles both sizes shows
 * order 1; the Crank–Nicolson grid shows 2 for the same work.
 *
 * Early exercise is solved exactly within each step (`heat/obstacle-step.ts`).
 *
 * `smoothing: 'richardson'`, the default, extrapolates over grids of full, half and quarter width
 * with k/h² fixed, where the error has the one leading term h², and makes the error estimate of them
 * (`heat/refine.ts`); `none` is the plain scheme. Greeks as in `heat-crank-nicolson.ts`. Accuracy at
 * the default 192 × 240, European 1e-5 of the larger of strike and spot,
 * American 1e-4 of the strike
 * (`tests/pricing/heat-schemes.test.ts`).
 *
 * Diagnostics: `stabilityNumber` is λ, `amplification` the largest factor by which a step multiplies
 * a wave of the grid.
 *
 * Source: P. Laasonen, Acta Mathematica 81 (1949).
 */
import type { Contract, Market, PricingResult } from '@/pricing/contract';
import { refuseGrid } from '@/pricing/heat/refusals';
import { exerciseValue, priceOnUniformGrid } from '@/pricing/heat/uniform';
import { lambdaOf } from '@/pricing/heat/uniform-grid';
import type { Method, MethodSizes } from '@/pricing/method';
import { sin } from '@/pricing/numerics/elementary';

const defaults = { spaceSteps: 192, timeSteps: 240, smoothing: 'richardson' } as const;
const halfTurn = 1.5707963267948966;

function price(contract: Contract, market: Market, settings: MethodSizes): PricingResult {
  const { spaceSteps, timeSteps, smoothing } = { ...defaults, ...settings };
  const deviation = market.volatility * Math.sqrt(contract.expiry);
  const refusal = refuseGrid({ spaceSteps, timeSteps }, deviation);
  if (refusal) return refusal;
  const sizes = { spaceSteps, timeSteps, smoothing };
  const result = priceOnUniformGrid(contract, market, sizes, 'implicit');
  const lambda = lambdaOf(deviation, spaceSteps, timeSteps);
  const root = sin(halfTurn / spaceSteps);
  const amplification = 1 / (1 + 4 * lambda * root * root);
  return {
    ok: true,
    ...result,
    value: Math.max(result.value, exerciseValue(contract, market)),
    diagnostics: { ...result.diagnostics, stabilityNumber: lambda, amplification },
    method: { name: 'heat-implicit', ...sizes },
    warnings: [],
  };
}

export const heatImplicit: Method = {
  name: 'heat-implicit',
  label: 'Implicit heat grid',
  summary:
    'The heat equation by the implicit step: stable for any sizes, but of first order in time. ' +
    'European and American exercise. For convergence studies rather than for daily prices.',
  theoreticalOrder: 1,
  machinery: ['uniform finite-difference grid', 'heat coordinates', 'implicit step'],
  defaultSettings: defaults,
  coarsestSettings: { spaceSteps: 64, timeSteps: 8, smoothing: 'richardson' },
  byNameOnly: true,
  prices: (contract) => contract.payoff === 'vanilla',
  work: ({ spaceSteps = defaults.spaceSteps, timeSteps = defaults.timeSteps }) =>
    14 * spaceSteps * timeSteps,
  price,
};
