/**
 * The American option from its exercise boundary, which is found first.
 *
 * The value is the European one and a premium: interest on the strike less the yield of the spot over
 * the time in which the option is exercised (I. J. Kim 1990), an integral that needs the boundary
 * B(τ) only. That the value's slope is continuous there gives an equation for B alone
 * (`spectral/residual.ts`). It is asked to hold at Chebyshev nodes in √τ; between them stands the
 * polynomial of H = ln²(B/X), which is smooth where B is not, X the boundary at expiry. Newton's
 * iteration with exact derivatives finds the heights (`spectral/newton.ts`), first for 8 nodes, then
 * for three quarters of `nodes`, then for all: the plain fixed point of Andersen, Lake and Offengenden
 * (2016) diverges where drift dominates. Calls are puts with spot and strike, rate and yield exchanged.
 *
 * Accuracy, of the strike, on the American reference cases: 3e-9 with 16 nodes, 6e-10 with 24, 2e-10
 * with 32, 2e-12 with 64; on random ones up to 30 years 4e-10 with 16 nodes in 95 % of the cases and
 * 2e-8 in all but a few, the drift-dominated ones (2e-5 at volatility 0.02, 23 years, rate and yield
 * above 0.1). The error falls faster than any fixed order that a study could measure.
 *
 * Error estimate: one and a half times the distance to the value from three quarters of the nodes,
 * and rounding. On 811 random puts and calls alive, against 64 nodes, it covers 99 % with 16 and with 24
 * nodes; where the error is above rounding, 98 and 96 %, and it is within thirty times the
 * error in 85 and 88 %.
 *
 * Greeks: delta and gamma by differentiation of the integral, and beside the boundary by smooth
 * pasting (`spectral/near-boundary.ts`); theta from the equation, vega from the scaling of time
 * (`greeks.ts`); rho and the yield's sensitivity by differences, in which the boundary
 * moves as its equation says (`rateBump`). The European part is the closed form's.
 *
 * Diagnostics: `exerciseBoundary` is the spot from which immediate exercise is best now,
 * `exerciseBoundaryAtExpiry` the same just before expiry, `iterations` the rounds with all nodes.
 *
 * Where it stops: with a negative rate and a yield below it (for calls the other way round) there are
 * two boundaries, and this equation has none of them; and an iteration may fail to converge. Then
 * the heat grid of 400 × 200 gives the value, and a warning says so. Never exercised: the closed form.
 */
import type { Contract, Market, PricingResult, PricingWarning } from '@/pricing/contract';
import { priceAmericanOnGrid } from '@/pricing/heat/american';
import type { GridValue } from '@/pricing/heat/grid-value';
import { refuseGrid } from '@/pricing/heat/refusals';
import type { Method, MethodSizes } from '@/pricing/method';
import { priceBySpectralBoundary } from '@/pricing/spectral/american';
import { problemOf, regionsOf } from '@/pricing/spectral/problem';

const defaults = { nodes: 16 } as const;
const fallback = { spaceSteps: 400, timeSteps: 200, smoothing: 'richardson' } as const;

function price(contract: Contract, market: Market, settings: MethodSizes): PricingResult {
  if (!prices(contract)) {
    return {
      ok: false,
      code: 'method-does-not-price',
      path: 'contract.exercise',
      message: 'Only an American option has this boundary: choose another method.',
    };
  }
  const { nodes } = { ...defaults, ...settings };
  const method = { name: 'spectral-boundary', nodes } as const;
  const solved = priceBySpectralBoundary(contract, market, nodes);
  if (solved !== null && isFinite(solved)) return { ok: true, ...solved, method, warnings: [] };
  const refusal = refuseGrid(fallback, market.volatility * Math.sqrt(contract.expiry));
  if (refusal) return refusal;
  const onGrid = priceAmericanOnGrid(contract, market, fallback);
  return { ok: true, ...onGrid, method, warnings: [whyOnGrid(contract, market)] };
}

function isFinite({ value, errorEstimate, greeks, diagnostics }: GridValue): boolean {
  const numbers = [value, errorEstimate, ...Object.values(greeks), ...Object.values(diagnostics)];
  return numbers.every((number) => number === null || Number.isFinite(number));
}

function whyOnGrid(contract: Contract, market: Market): PricingWarning {
  if (regionsOf(problemOf(contract, market, 0, 0)) === 'two') {
    return {
      code: 'two-boundaries',
      message:
        'At these rates the option is exercised between two boundaries, which this method cannot ' +
        'find; the value is the heat grid’s, 400 × 200, and does not check that route.',
    };
  }
  return {
    code: 'boundary-not-found',
    message:
      'The iteration for the exercise boundary did not converge here; the value is the heat ' +
      'grid’s, 400 × 200, and does not check that route.',
  };
}

function prices(contract: Contract): boolean {
  return contract.payoff === 'vanilla' && contract.exercise === 'american';
}

export const spectralBoundary: Method = {
  name: 'spectral-boundary',
  label: 'Exercise boundary',
  summary:
    'Finds the boundary of early exercise first, by collocation, and integrates what exercise earns ' +
    'along it. American exercise only; a thousand times closer than a grid of the same cost. Where ' +
    'negative rates make two boundaries it gives the heat grid’s value, and says so.',
  theoreticalOrder: null,
  byNameOnly: true,
  machinery: ['exercise boundary', 'quadrature', 'closed formula'],
  defaultSettings: defaults,
  coarsestSettings: defaults,
  prices,
  work: ({ nodes = defaults.nodes }) => 60 * nodes * nodes * nodes,
  price,
};
