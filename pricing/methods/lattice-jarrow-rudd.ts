/**
 * The tree of Jarrow and Rudd (1983): equal probabilities, and the drift in the nodes.
 *
 * In each of n steps of Δt = T/n the spot is multiplied by u = e^((r−q−½σ²)Δt + σ√Δt) or by
 * d = e^((r−q−½σ²)Δt − σ√Δt), each with probability ½. The logarithm then has the right mean and
 * variance at any drift, so that this walk always exists; it is the discrete form of the diffusion
 * itself, and its nodes follow the forward instead of standing around the spot.
 *
 * What it gives up is the forward: ½(u + d) misses e^((r−q)Δt) by a relative σ⁴Δt²/12 a step, in all
 * σ⁴T²/12n, which is nothing at σ = 0.3 and a sixth of the strike at σ²T of 36 (501 steps). The loss
 * is of first order and smooth, and extrapolation takes it out; the estimate of a plain tree says it.
 *
 * `smoothing: 'none'` is the stated tree, node by node (60-digit roll-backs of it agree to 1e-12,
 * `tests/pricing/lattice-trees.test.ts`). `richardson`, the default, is the mean over four shifted
 * walks extrapolated in 1/n (`lattice/price.ts`). Because the nodes drift past the strike as the
 * rates move, the rates' Greeks of an American option are always taken from smoothed walks.
 *
 * Accuracy at the default 1000 steps is asserted in `tests/pricing/reference-lattices.test.ts`:
 * European within 6e-5 of the strike at σ²T of 36 and within 5e-8 elsewhere, American within 1e-5
 * on the reference cases, drift-dominated ones included.
 *
 * Source: R. Jarrow, A. Rudd, Option Pricing (1983), ch. 13.
 */
import { jarrowRuddLattice } from '@/pricing/lattice/kind';
import { latticeMethod } from '@/pricing/lattice/method';

export const latticeJarrowRudd = latticeMethod(jarrowRuddLattice, {
  name: 'lattice-jarrow-rudd',
  label: 'Jarrow–Rudd tree',
  summary:
    'The tree of Jarrow and Rudd: up and down are equally likely, and the nodes move with the ' +
    'drift, so that no drift is too strong for it. European and American exercise. Weak where the ' +
    'variance over the life of the option is large: the forward is then met by extrapolation only.',
  theoreticalOrder: 1,
  machinery: ['walk roll-back', 'equal probabilities'],
  steps: { usual: 1000, coarsest: 64 },
});
