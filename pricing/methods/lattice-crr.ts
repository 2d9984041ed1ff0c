/**
 * The binomial tree of Cox, Ross and Rubinstein (1979).
 *
 * In each of n steps of Δt = T/n the spot goes up by u = e^(σ√Δt) with probability
 * p = (e^((r−q)Δt) − d)/(u − d), else down by d = 1/u; a value is the discounted mean of the two
 * that follow it, and with early exercise the better of that and the intrinsic value.
 *
 * `smoothing: 'none'` gives the value of exactly that tree, rolled back node by node, as printed in
 * textbooks; it agrees with exact arithmetic to 1e-13 (`tests/pricing/lattice.test.ts`). Its error
 * falls like 1/n but swings between odd and even n and with the places of strike and exercise
 * boundary between the nodes. `smoothing: 'richardson'`, the default, takes that swing out by the
 * mean over four shifted trees and extrapolates in 1/n (`lattice/price.ts`).
 *
 * Accuracy at the default 1000 steps: European within 1.5e-7 of the strike on the European reference
 * family, American within 2e-5 on the American one (`tests/pricing/reference-american.test.ts`). The
 * plain tree of 1000 steps is within 1e-4. Drift-dominated contracts (rate 0.10, volatility 0.10, ten
 * years) are the hardest: 1e-5 at 1000 steps, 8e-5 at 500, and the estimate says so.
 *
 * Where it fails: p leaves the range from 0 to 1 when |r − q|·√Δt reaches σ. That is a failure value
 * with the number of steps that would do, never a tree with negative probabilities. The
 * extrapolation needs its quarter-size tree too, so that it asks four times as many.
 *
 * Greeks: delta and gamma from the nodes of the present instant of a tree that starts a few steps
 * early, theta and vega by `greeks.ts`; rho and the yield's sensitivity from the same formula for
 * European options, by central differences on trees of equal size for American ones (`rateBump`).
 *
 * Source: J. C. Cox, S. A. Ross, M. Rubinstein, Option pricing: a simplified approach, Journal of
 * Financial Economics 7 (1979). The shifted mean is this module's own.
 */
import type { Contract, Market, PricingResult } from '@/pricing/contract';
import { crrLattice } from '@/pricing/lattice/kind';
import { priceOnLattice } from '@/pricing/lattice/price';
import type { Method, MethodSizes } from '@/pricing/method';

const defaults = { steps: 1000, smoothing: 'richardson' } as const;

function price(contract: Contract, market: Market, settings: MethodSizes): PricingResult {
  const { steps, smoothing } = { ...defaults, ...settings };
  const result = priceOnLattice(contract, market, { steps, smoothing }, crrLattice);
  if (!result.ok) return result;
  return { ...result, method: { name: 'lattice-crr', steps, smoothing }, warnings: [] };
}

export const latticeCrr: Method = {
  name: 'lattice-crr',
  label: 'Binomial tree',
  summary:
    'The tree of Cox, Ross and Rubinstein: the price moves up or down with the probability that ' +
    'the forward implies. European and American exercise. Weak where the drift outruns the ' +
    'volatility over the life of the option: its error estimate then grows, or it refuses.',
  theoreticalOrder: 1,
  machinery: ['walk roll-back', 'matched probabilities'],
  defaultSettings: defaults,
  coarsestSettings: { steps: 64, smoothing: 'richardson' },
  prices: (contract) => contract.payoff === 'vanilla',
  work: ({ steps = defaults.steps }) => 60 * steps * Math.sqrt(steps),
  price,
};
