/**
 * The tree of Tian (1993): three moments of the price are met in every step.
 *
 * With M = e^((r−q)Δt) and V = e^(σ²Δt), the spot is multiplied by
 *
 *     u, d = ½MV(V + 1 ± √(V² + 2V − 3))   with probability   p = (M − d)/(u − d)   up,
 *
 * so that mean, variance and third moment of the price (not of its logarithm) are those of the
 * lognormal law. The forward is carried without error at any drift and any volatility, and p stays
 * between 0 and ½: this walk always exists. Its nodes drift by (r − q + σ²)Δt a step, above the mean
 * path of the logarithm, which the smaller p undoes.
 *
 * `smoothing: 'none'` is the stated tree, node by node (60-digit roll-backs of it agree to 1e-12,
 * `tests/pricing/lattice-trees.test.ts`). Its error falls like 1/n but swings with the place of the
 * strike between the nodes. `richardson`, the default, is the mean over four shifted walks
 * extrapolated in 1/n (`lattice/price.ts`). Because the nodes drift past the strike as the rates
 * move, the rates' Greeks of an American option are always taken from smoothed walks.
 *
 * Accuracy at the default 1000 steps is asserted in `tests/pricing/reference-lattices.test.ts`:
 * European within 1e-7 of the strike, American within 1e-5 on the reference cases, drift-dominated
 * ones included.
 *
 * Greeks: delta and gamma from the nodes of the present instant of a walk that starts a few steps
 * early, theta and vega by `greeks.ts`.
 *
 * Source: Y. S. Tian, A modified lattice approach to option pricing, Journal of Futures Markets 13
 * (1993). The form by drift and cosh in `drifting-steps.ts` is this module's own.
 */
import { tianLattice } from '@/pricing/lattice/kind';
import { latticeMethod } from '@/pricing/lattice/method';

export const latticeTian = latticeMethod(tianLattice, {
  name: 'lattice-tian',
  label: 'Tian tree',
  summary:
    'The tree of Tian: mean, variance and third moment of the price are met in every step, so that ' +
    'the forward is carried without error at any drift and volatility. European and American ' +
    'exercise. Rougher than the other walks at the same number of steps where volatility is high.',
  theoreticalOrder: 1,
  machinery: ['walk roll-back', 'three moments of the price'],
  steps: { usual: 1000, coarsest: 64 },
});
