import type { Contract, Market, PricingFailure, PricingResult } from '@/pricing/contract';
import type { LatticeKind } from '@/pricing/lattice/kind';
import { priceOnLattice } from '@/pricing/lattice/price';
import type { Method, MethodSizes } from '@/pricing/method';

type Entry = Pick<Method, 'name' | 'label' | 'summary' | 'machinery' | 'theoreticalOrder'> &
  Pick<Method, 'americanOrder' | 'oddSteps'> & { steps: { usual: number; coarsest: number } };

/**
 * A lattice that is priced by name and studied, and does not take the place of the routes that a
 * desk's stored values were checked with.
 */
export function latticeMethod(kind: LatticeKind, { steps, ...entry }: Entry): Method {
  const defaultSettings = { steps: steps.usual, smoothing: 'richardson' } as const;

  function price(contract: Contract, market: Market, settings: MethodSizes): PricingResult {
    const sizes = { ...defaultSettings, ...settings };
    if (entry.oddSteps && sizes.steps % 2 === 0) return evenRefused(sizes.steps);
    const result = priceOnLattice(contract, market, sizes, kind);
    if (!result.ok) return result;
    const method = { name: entry.name, steps: sizes.steps, smoothing: sizes.smoothing };
    return { ...result, method, warnings: [] };
  }

  return {
    ...entry,
    byNameOnly: true,
    defaultSettings,
    coarsestSettings: { steps: steps.coarsest, smoothing: 'richardson' },
    prices: (contract) => contract.payoff === 'vanilla',
    work: ({ steps: count = steps.usual }) => 60 * count * Math.sqrt(count),
    price,
  };
}

function evenRefused(steps: number): PricingFailure {
  return {
    ok: false,
    code: 'out-of-range',
    path: 'method.steps',
    message: `This tree puts the strike between its two middle nodes, which takes an odd number of steps: ask for ${steps + 1}, or ${steps - 1}.`,
  };
}
