/**
 * The routes of a cross-check of American exercise, at their default settings, on the American
 * reference cases (collocation of the exercise boundary with 128 nodes, confirmed by a fine grid) and on the
 * published rows (digits recalled from memory, as each row says).
 */
import type { Contract, Greeks, Market } from '@/pricing/contract';
import { routesFor } from '@/pricing/index';
import { methodNamed } from '@/pricing/registry';
import american from '@/tests/reference/american.json';
import published from '@/tests/reference/published.json';
import { contractAndMarket } from './request-arbitraries';

type Case = { id: string; request: object; expected: Record<string, string>; bound: number };

const cases: Case[] = [
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

const able = routesFor(...termsOf(contractAndMarket(cases[0].request))).map(methodNamed);

function termsOf({ contract, market }: { contract: Contract; market: Market }) {
  return [contract, market] as const;
}

it('the routes are the grid and both walks', () => {
  expect(able.map(({ name }) => name)).toEqual([
    'heat-crank-nicolson',
    'lattice-symmetric',
    'lattice-crr',
  ]);
});

describe.each(able)('$name', (method) => {
  const rows = cases.map((row) => {
    const { contract, market } = contractAndMarket(row.request);
    const result = method.price(contract, market, {});
    if (!result.ok) throw new Error(`${row.id}: ${result.message}`);
    const error = Math.abs(result.value - Number(row.expected.value));
    return { ...row, contract, market, result, error };
  });

  it('is within 1e-4 of the strike on every case', () => {
    const wrong = rows.filter(({ error, contract }) => error > 1e-4 * contract.strike);
    expect(wrong.map(({ id, error }) => `${id}: ${error}`)).toEqual([]);
  });

  it('is within 2e-5 of the strike, as its opening comment says', () => {
    const wrong = rows.filter(({ error, contract }) => error > 2e-5 * contract.strike);
    expect(wrong.map(({ id, error }) => `${id}: ${error}`)).toEqual([]);
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
        .filter((name) => expected[name] !== undefined)
        .filter((name) => {
          const gap = Math.abs(result.greeks[name] - Number(expected[name]));
          return gap > greekBound(name, contract, market);
        })
        .map((name) => `${id} ${name}: ${result.greeks[name]}, not ${expected[name]}`),
    );
    expect(wrong).toEqual([]);
  });

  const printed = published.cases.flatMap((row) =>
    row.request?.contract.exercise === 'american' ? [{ ...row, request: row.request }] : [],
  );

  it.each(printed)(
    'prints $expected.published for $id: $source (from memory: $fromMemory)',
    (row) => {
      const { contract, market } = contractAndMarket(row.request);
      const result = method.price(contract, market, {});
      if (!result.ok) throw new Error(result.message);
      const { computed, published: digits } = row.expected as {
        computed: string;
        published: string;
      };
      const halfDigit = Number(row.errorBound.bound);
      expect(Math.abs(result.value - Number(digits))).toBeLessThanOrEqual(halfDigit);
      expect(Math.abs(result.value - Number(computed))).toBeLessThan(2e-5 * contract.strike);
    },
  );
});

/**
 * Common practice, no source. Beside the exercise boundary gamma jumps to zero, and the grid's cells
 * there are some percent of the spot: gamma and theta are good to a hundredth of their size, vega
 * and rho (central differences, and what follows from them) to a hundredth of the strike.
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
