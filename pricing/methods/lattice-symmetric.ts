/**
 * The plain walk, ±h with probability ½ each, in heat coordinates.
 *
 * In x = ln S and τ = σ²(time to expiry)/2 the value is V = e^(αx+βτ)·u, and u obeys u_τ = u_xx.
 * The explicit step with k/h² = ½ is u(x, τ+k) = ½u(x−h, τ) + ½u(x+h, τ): the heat equation's
 * simplest difference scheme is the average over a fair coin. With h = σ√(T/n), n tosses take the
 * payoff to its price. `walk.ts` shows the factor between neighbours; `random-walk.ts` does the
 * same product forward, by the distribution of the walk, and European results carry both numbers
 * (`walkForward`, `walkBackward`: the plain walk, before refinement).
 *
 * Early exercise: at every toss the holder takes the better of the average and the intrinsic value.
 *
 * Refinement: as in `lattice/price.ts` (mean over four shifts, extrapolation in 1/n).
 *
 * Accuracy. European: falls like 1/n² after extrapolation; 1000 steps are within 6e-6 of the strike
 * on the European reference family, 1e-7 but where drift exceeds several deviations. American:
 * order 1 with a wandering factor, within 2e-5 of the strike at 1000 steps on the American reference
 * cases (`tests/pricing/reference-american.test.ts`), the drift-dominated ones included.
 *
 * Where it fails: the drift must be spread over enough tosses, |αh| < 1; else it is refused with the
 * number of steps that would do. The estimate grows long before that point.
 *
 * Greeks: delta and gamma from the nodes of the present instant (the walk starts a few steps
 * early), theta and vega by `greeks.ts`; rho and the yield's sensitivity from the same formula for
 * European options, by central differences on equal walks for American ones (`rateBump`).
 *
 * Source: the walk is the classical proof device of Courant, Friedrichs and Lewy (1928); its use
 * as a pricing tree is common practice.
 */
import type { Contract, Market, PricingResult } from '@/pricing/contract';
import { symmetricLattice } from '@/pricing/lattice/kind';
import { priceOnLattice } from '@/pricing/lattice/price';
import { europeanBothWays } from '@/pricing/lattice/random-walk';
import type { Method, MethodSizes } from '@/pricing/method';

const defaults = { steps: 1000, smoothing: 'richardson' } as const;

function price(contract: Contract, market: Market, settings: MethodSizes): PricingResult {
  const sizes = { ...defaults, ...settings };
  const { steps, smoothing } = sizes;
  const result = priceOnLattice(contract, market, sizes, symmetricLattice);
  if (!result.ok) return result;
  const bothWays =
    contract.exercise === 'european' ? europeanBothWays(contract, market, steps) : null;
  const diagnostics = bothWays
    ? { ...result.diagnostics, walkForward: bothWays.forward, walkBackward: bothWays.backward }
    : result.diagnostics;
  const method = { name: 'lattice-symmetric', steps, smoothing } as const;
  return { ...result, diagnostics, method, warnings: [] };
}

export const latticeSymmetric: Method = {
  name: 'lattice-symmetric',
  label: 'Symmetric walk',
  summary:
    'A fair coin moves the logarithm of the price up or down; the price is the average over many ' +
    'tosses, in the coordinates of the heat equation. European and American exercise. Weak where ' +
    'the drift outruns the volatility over the life of the option: its error estimate then grows.',
  theoreticalOrder: 1,
  machinery: ['walk roll-back', 'heat coordinates'],
  defaultSettings: defaults,
  coarsestSettings: { steps: 64, smoothing: 'richardson' },
  prices: (contract) => contract.payoff === 'vanilla',
  work: ({ steps = defaults.steps }) => 60 * steps * Math.sqrt(steps),
  price,
};
