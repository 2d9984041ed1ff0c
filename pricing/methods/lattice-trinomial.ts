/**
 * The walk with three branches: up, stay, down, g = σ√(3Δt) apart.
 *
 * The stretch λ = √3 of Kamrad and Ritchken (1991): of all walks with three branches the one whose
 * fourth moment, too, is that of the Gaussian. With ν = r − q − ½σ² and y = νΔt/g, the walk moves with
 * probability ⅓ + y², so that the logarithm has the right second moment, and up and down are
 * shared out so that the forward is met exactly:
 *
 *     p·e^g + (⅔ − y²) + d·e^(−g) = e^((r−q)Δt),   p + d = ⅓ + y².
 *
 * It is an explicit difference scheme read as a walk: the weights are those of the heat equation with
 * k/h² = 1/6 once the drift is taken out, where the first error term of space cancels that of time.
 *
 * `smoothing: 'none'` is the stated tree, node by node (60-digit roll-backs of it agree to 1e-12,
 * `tests/pricing/lattice-trees.test.ts`); its nodes are half again as close as those of a tree with
 * two branches. `richardson`, the default, is the mean over four shifted walks extrapolated in 1/n
 * (`lattice/price.ts`).
 *
 * Accuracy at the default 1000 steps is asserted in `tests/pricing/reference-lattices.test.ts`:
 * European within 1e-7 of the strike, American within 3e-5 on the reference cases, drift-dominated
 * ones included.
 *
 * Where it fails: |y| must stay below 0.8 or so, that is |ν|√Δt < 1.4σ, a wider range than the
 * binomial walk's. Past it, it is refused with the number of steps that would do; the
 * extrapolation needs its smallest part too, so that it asks eight times as many for American options.
 *
 * Greeks: delta and gamma from the nodes of the present instant of a walk that starts a few steps
 * early, theta and vega by `greeks.ts`; rho and the yield's sensitivity from the same formula for
 * European options, by central differences on equal walks for American ones (`rateBump`).
 *
 * Source: B. Kamrad, P. Ritchken, Multinomial approximating models for options with k state
 * variables, Management Science 37 (1991); meeting the forward exactly is common practice.
 */
import { trinomialLattice } from '@/pricing/lattice/kind';
import { latticeMethod } from '@/pricing/lattice/method';

export const latticeTrinomial = latticeMethod(trinomialLattice, {
  name: 'lattice-trinomial',
  label: 'Trinomial tree',
  summary:
    'A walk with three branches, whose first four moments are those of the Gaussian but for the ' +
    'drift. European and American exercise. Weak where the drift outruns the volatility over the ' +
    'life of the option: its error estimate then grows, or it refuses.',
  theoreticalOrder: 1,
  machinery: ['walk roll-back', 'three branches'],
  steps: { usual: 1000, coarsest: 64 },
});
