/**
 * The Black–Scholes equation as a heat equation on a grid, by Crank and Nicolson's step.
 *
 * European: x = ln(F/K) with F the forward, τ = σ²T/2, V = K·e^(−rT)·e^(x/2−τ/4)·u and u_τ = u_xx on a
 * uniform grid (`heat/european-grid.ts`, step in `heat/theta-step.ts`).
 *
 * American: the same equation in x = ln(S/K) with the intrinsic value as an obstacle, on a grid that
 * is concentrated around strike and exercise boundary and in time towards expiry, with its drift
 * and reaction terms kept instead of split off (`heat/american-grid.ts` says why).
 *
 * Both: Rannacher's four implicit half-steps first, the payoff averaged over the strike's cell, and
 * (`smoothing: 'richardson'`, the default) extrapolation over grids of full, half and quarter size,
 * which also gives the error estimate (`heat/refine.ts`). `smoothing: 'none'` is the plain scheme,
 * order 2 in both steps: observed 1.85 to 2.15 on smooth settings (`tests/pricing/heat.test.ts`).
 *
 * Accuracy at the default 200 × 100, of the strike: European 3e-7 on the European, futures and
 * currency reference families; American within 2e-5 on the reference cases and on 250 random ones,
 * drift-dominated included, the largest errors within a cell or two of the exercise boundary; the
 * median of the random ones is 2e-8.
 *
 * Greeks: delta and gamma are derivatives of the grid at the spot, theta the equation's, vega by the
 * scaling of time (`greeks.ts`). Rho and the yield's sensitivity: by formula for European options,
 * by central differences on the same nodes for American ones (`rateBump` in the diagnostics).
 *
 * Diagnostics: `stabilityNumber` is the largest k/h² of the grid (past ½ an explicit step would blow
 * up); `exerciseBoundary` is the spot from which immediate exercise is best, now.
 *
 * Where it fails: σ√T above 25, where the exponents leave the range of doubles and the option is
 * worth its spot or its discounted strike; and fewer than 32 × 8 steps, too few for the quarter grid.
 *
 * Sources: J. Crank, P. Nicolson (1947); R. Rannacher, Numerische Mathematik 43 (1984); M. J.
 * Brennan, E. S. Schwartz, Journal of Finance 32 (1977).
 */
import type { Contract, Market, PricingResult } from '@/pricing/contract';
import { priceAmericanOnGrid } from '@/pricing/heat/american';
import { priceEuropeanOnGrid } from '@/pricing/heat/european';
import { refuseGrid } from '@/pricing/heat/refusals';
import type { Method, MethodSizes } from '@/pricing/method';

const defaults = { spaceSteps: 200, timeSteps: 100, smoothing: 'richardson' } as const;

function price(contract: Contract, market: Market, settings: MethodSizes): PricingResult {
  const { spaceSteps, timeSteps, smoothing } = { ...defaults, ...settings };
  const deviation = market.volatility * Math.sqrt(contract.expiry);
  const refusal = refuseGrid({ spaceSteps, timeSteps }, deviation);
  if (refusal) return refusal;
  const solve = contract.exercise === 'american' ? priceAmericanOnGrid : priceEuropeanOnGrid;
  const method = { name: 'heat-crank-nicolson', spaceSteps, timeSteps, smoothing } as const;
  return {
    ok: true,
    ...solve(contract, market, { spaceSteps, timeSteps, smoothing }),
    method,
    warnings: [],
  };
}

export const heatCrankNicolson: Method = {
  name: 'heat-crank-nicolson',
  label: 'Heat equation',
  summary:
    'The pricing equation as heat that spreads on a grid, solved by the Crank–Nicolson step. ' +
    'European and American exercise, drift-dominated contracts included, with the exercise ' +
    'boundary. Least accurate within a cell or two of that boundary.',
  theoreticalOrder: 2,
  machinery: ['finite-difference grid', 'heat coordinates'],
  defaultSettings: defaults,
  coarsestSettings: { spaceSteps: 50, timeSteps: 25, smoothing: 'richardson' },
  prices: (contract) => contract.payoff === 'vanilla',
  work: ({ spaceSteps = defaults.spaceSteps, timeSteps = defaults.timeSteps }) =>
    10 * spaceSteps * timeSteps,
  price,
};
