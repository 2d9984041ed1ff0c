/**
 * The tree of Leisen and Reimer (1996): laid out for the strike of its option.
 *
 * The European value is A·P′(in the money) − B·P(in the money), with discounted legs A and B and two
 * binomial probabilities. Instead of letting them tend to cdf(d₁) and cdf(d₂) as they may, this walk
 * inverts the binomial distribution: p = h(d₂), p′ = h(d₁) by the second formula of Peizer and Pratt,
 * and u = M·p′/p, d = M(1 − p′)/(1 − p), M = e^((r−q)Δt), so that both come out right nearly at once.
 * The strike lies halfway between the two middle nodes, which needs an odd number of steps: an even
 * one is refused, never changed.
 *
 * European: order 2 without any smoothing, within 1e-6 of the strike at 501 steps; extrapolated in
 * 1/n² (`smoothing: 'richardson'`, the default) within 1e-9. American: order 1, because the exercise
 * boundary lies between the nodes wherever it happens to; within 5e-4 of the strike at 501 steps
 * and 2e-4 at 1001. Asserted in `tests/pricing/reference-lattices.test.ts`.
 *
 * Nodes more than seven deviations from the walk's mean are not rolled: the same value to 3e-12 of
 * the strike with work n^1.5. It is the cheapest of the walks, since it needs no shifted copies.
 *
 * Where it fails: drift-dominated puts (rate 0.10, volatility 0.10, ten years), whose boundary
 * crosses few nodes, wander by 1e-4 of the strike at any affordable size, and the estimate says so;
 * and a strike more than 2√n deviations away leaves no walk at all, which is refused with the number
 * of steps that would do.
 *
 * Greeks: delta and gamma from seven nodes of the present instant of the same walk started six steps
 * early; they are of first order, since only the middle node's walk is laid out for the strike.
 * Theta and vega by `greeks.ts`; rho and the yield's sensitivity from the same formula for European
 * options, by central differences on walks of equal size for American ones (`rateBump`).
 *
 * Source: D. P. J. Leisen, M. Reimer, Binomial models for option valuation – examining and improving
 * convergence, Applied Mathematical Finance 3 (1996); D. B. Peizer, J. W. Pratt, A normal
 * approximation for binomial, F, beta, and other common, related tail probabilities, Journal of the
 * American Statistical Association 63 (1968).
 */
import { leisenReimerLattice } from '@/pricing/lattice/kind';
import { latticeMethod } from '@/pricing/lattice/method';

export const latticeLeisenReimer = latticeMethod(leisenReimerLattice, {
  name: 'lattice-leisen-reimer',
  label: 'Leisen–Reimer tree',
  summary:
    'The tree of Leisen and Reimer, laid out for the strike: European values of second order, and ' +
    'the fastest of the walks. European and American exercise, an odd number of steps. Weak for ' +
    'American puts whose drift outruns their volatility: its error estimate then grows.',
  theoreticalOrder: 2,
  americanOrder: 1,
  oddSteps: true,
  machinery: ['walk roll-back', 'inverted binomial'],
  steps: { usual: 1001, coarsest: 65 },
});
