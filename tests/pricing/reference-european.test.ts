/**
 * The grid and the walks on the European families (mpmath, 60 digits): within 1e-4 of the strike at
 * their default sizes, with estimates that cover the error and do not exaggerate it, and Greeks.
 */
import type { Contract, Greeks, Market, PricingSuccess } from '@/pricing/contract';
import { methods } from '@/pricing/registry';
import black76 from '@/tests/reference/black76.json';
import european from '@/tests/reference/european.json';
import garmanKohlhagen from '@/tests/reference/garman-kohlhagen.json';
import { contractAndMarket } from './request-arbitraries';

const families = [
  { family: 'european', cases: european.cases },
  { family: 'black76', cases: black76.cases },
  { family: 'garman-kohlhagen', cases: garmanKohlhagen.cases },
];

const numerical = methods.filter(({ theoreticalOrder }) => theoreticalOrder !== null);

const runs = numerical.flatMap((method) =>
  families.map(({ family, cases }) => ({
    name: method.name,
    family,
    rows: cases.map(({ id, request, expected }) => {
      const { contract, market } = contractAndMarket(request);
      const result = method.price(contract, market, {});
      if (!result.ok) throw new Error(`${method.name} on ${id}: ${result.message}`);
      return { id, contract, market, expected: expected as Record<string, string>, result };
    }),
  })),
);

type Row = { contract: Contract; expected: Record<string, string>; result: PricingSuccess };

const errorOf = ({ expected, result }: Row) => Math.abs(result.value - Number(expected.value));
const estimateOf = ({ result }: Row) => result.errorEstimate ?? 0;

describe.each(runs)('$name on the family $family', ({ rows }) => {
  it('is within 1e-4 of the strike', () => {
    const wrong = rows.filter((row) => errorOf(row) > 1e-4 * row.contract.strike);
    expect(wrong.map(({ id }) => id)).toEqual([]);
  });

  it('estimates at least its error in 95 % of the cases', () => {
    const covered = rows.filter((row) => estimateOf(row) >= errorOf(row));
    expect(covered.length).toBeGreaterThanOrEqual(0.95 * rows.length);
  });

  it('and at most thirty times it in 80 % of those whose error exceeds ten times rounding', () => {
    const real = rows.filter((row) => {
      const rounding = 1e-12 * Math.max(row.contract.strike, row.market.spot);
      return errorOf(row) > 10 * rounding;
    });
    const sharp = real.filter((row) => estimateOf(row) <= 30 * errorOf(row));
    expect(sharp.length).toBeGreaterThanOrEqual(0.8 * real.length);
  });

  it('has Greeks within the bounds stated here', () => {
    const wrong = rows.flatMap(({ id, contract, market, expected, result }) =>
      greekNames
        .filter((name) => {
          const got = result.greeks[name];
          if (expected[name] === undefined || got === null || got === undefined) return false;
          return Math.abs(got - Number(expected[name])) > greekBound(name, contract, market);
        })
        .map((name) => `${id} ${name}`),
    );
    expect(wrong).toEqual([]);
  });
});

const greekNames = ['delta', 'gamma', 'vega', 'theta', 'rho', 'yieldRho'] as const;

/** Common practice, no source: a thousandth of each Greek's natural size. */
function greekBound(name: keyof Greeks, { strike, expiry }: Contract, market: Market): number {
  const { spot, rate, volatility } = market;
  const deviation = volatility * Math.sqrt(expiry);
  switch (name) {
    case 'delta':
      return 1e-3;
    case 'gamma':
      return 1e-3 / (spot * deviation);
    case 'vega':
      return 1e-3 * spot * Math.sqrt(expiry);
    case 'theta':
      return 1e-3 * ((spot * deviation) / expiry + Math.abs(rate) * Math.max(strike, spot));
    default:
      return 1e-3 * Math.max(strike, spot) * expiry;
  }
}
