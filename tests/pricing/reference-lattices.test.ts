/**
 * The walks that are priced by name, at their default sizes, on the American reference cases
 * (collocation of the exercise boundary with 128 nodes, confirmed by a fine grid) and at the sizes
 * for which they state an accuracy; the European families are in `reference-european.test.ts`.
 */
import type { Contract, Greeks, Market, MethodName } from '@/pricing/contract';
import { methodNamed } from '@/pricing/registry';
import american from '@/tests/reference/american.json';
import black76 from '@/tests/reference/black76.json';
import european from '@/tests/reference/european.json';
import garmanKohlhagen from '@/tests/reference/garman-kohlhagen.json';
import { contractAndMarket } from './request-arbitraries';

type Case = { id: string; request: object; expected: Record<string, string>; bound: number };

const americanCases: Case[] = [
  ...american.cases.map(({ id, request, expected, errorBound }) => ({
    id,
    request,
    expected,
    bound: Number(errorBound.bound),
  })),
  // Drift-dominated; values by the same collocation.
  ...[
    { rate: 0.1, expiry: 10, value: '1.79461409156348' },
    { rate: 0.2, expiry: 1, value: '0.903612068303437' },
  ].map(({ rate, expiry, value }) => ({
    id: `drift-dominated, rate ${rate}, expiry ${expiry}`,
    request: {
      contract: { payoff: 'vanilla', exercise: 'american', kind: 'put', strike: 100, expiry },
      market: { spot: 100, rate, yield: 0, volatility: 0.1 },
    },
    expected: { value },
    bound: 1e-9,
  })),
];

const europeanCases: Case[] = [...european.cases, ...black76.cases, ...garmanKohlhagen.cases].map(
  ({ id, request, expected }) => ({ id, request, expected, bound: 0 }),
);

/** What the opening comments say, in units of the strike. */
const walks: { name: MethodName; withinAmerican: number; withinEuropean: number }[] = [
  { name: 'lattice-jarrow-rudd', withinAmerican: 1e-5, withinEuropean: 6e-5 },
  { name: 'lattice-tian', withinAmerican: 1e-5, withinEuropean: 1e-7 },
  { name: 'lattice-trinomial', withinAmerican: 3e-5, withinEuropean: 1e-7 },
  { name: 'lattice-leisen-reimer', withinAmerican: 2e-4, withinEuropean: 1e-9 },
];

function rowsOf(name: MethodName, cases: readonly Case[], settings = {}) {
  return cases.map((row) => {
    const { contract, market } = contractAndMarket(row.request);
    const result = methodNamed(name).price(contract, market, settings);
    if (!result.ok) throw new Error(`${name} on ${row.id}: ${result.message}`);
    const error = Math.abs(result.value - Number(row.expected.value));
    return { ...row, contract, market, result, error };
  });
}

function beyond(rows: ReturnType<typeof rowsOf>, share: number): string[] {
  return rows
    .filter(({ error, contract }) => error > share * contract.strike)
    .map(({ id, error }) => `${id}: ${error}`);
}

describe.each(walks)('$name, American', ({ name, withinAmerican }) => {
  const rows = rowsOf(name, americanCases);

  it('is as near as its opening comment says', () => {
    expect(beyond(rows, withinAmerican)).toEqual([]);
  });

  it('estimates at least its error in 95 % of the cases', () => {
    const covered = rows.filter(
      ({ error, bound, result }) => (result.errorEstimate ?? 0) + bound >= error,
    );
    expect(covered.length).toBeGreaterThanOrEqual(0.95 * rows.length);
  });

  it('and at most thirty times it in 80 % of those whose error is above ten times the reference’s', () => {
    const real = rows.filter(({ error, bound }) => error > 10 * bound);
    const sharp = real.filter(({ error, result }) => (result.errorEstimate ?? 0) <= 30 * error);
    expect(sharp.length).toBeGreaterThanOrEqual(0.8 * real.length);
  });

  it('has Greeks within the bounds stated here', () => {
    const wrong = rows.flatMap(({ id, contract, market, expected, result }) =>
      (['delta', 'gamma', 'vega', 'theta', 'rho'] as const)
        .filter((greek) => expected[greek] !== undefined)
        .filter((greek) => {
          const gap = Math.abs(result.greeks[greek] - Number(expected[greek]));
          return gap > greekBound(greek, contract, market);
        })
        .map((greek) => `${id} ${greek}: ${result.greeks[greek]}, not ${expected[greek]}`),
    );
    expect(wrong).toEqual([]);
  });
});

it.each(walks)('$name, European: as near as its opening comment says', (walk) => {
  expect(beyond(rowsOf(walk.name, europeanCases), walk.withinEuropean)).toEqual([]);
});

describe('lattice-leisen-reimer, the plain tree of 501 steps', () => {
  const plain = { steps: 501, smoothing: 'none' } as const;

  it('is within 1e-6 of the strike for European options', () => {
    expect(beyond(rowsOf('lattice-leisen-reimer', europeanCases, plain), 1e-6)).toEqual([]);
  });

  it('is within 5e-4 of the strike for American ones', () => {
    expect(beyond(rowsOf('lattice-leisen-reimer', americanCases, plain), 5e-4)).toEqual([]);
  });
});

/**
 * Common practice, no source: the bounds of the cross-check's routes (`reference-american.test.ts`).
 * Vega and rho rest on central differences of values that wander.
 */
function greekBound(name: keyof Greeks, { strike, expiry }: Contract, market: Market): number {
  const { spot, volatility } = market;
  const deviation = volatility * Math.sqrt(expiry);
  switch (name) {
    case 'delta':
      return 1e-3;
    case 'gamma':
      return 1e-2 / (spot * deviation);
    case 'theta':
      return (1e-2 * strike * deviation) / expiry;
    default:
      return 1e-2 * strike * Math.max(1, Math.sqrt(expiry));
  }
}
