/**
 * The digital options against values of mpmath (60 digits and more: `generate/digital.py`, whose Greeks are
 * numerical derivatives), worked examples of the literature (digits from memory, as the rows say),
 * and the laws that tie them to the vanilla option.
 */
import Decimal from 'decimal.js';
import fc from 'fast-check';
import type { DigitalContract, Greeks, Market, PricingSuccess } from '@/pricing/contract';
import { compareRoutes, impliedVolatility, price, priceRoutes, strikeForDelta } from '@/pricing';
import { closedForm } from '@/pricing/methods/closed-form';
import { methods } from '@/pricing/registry';
import family from '@/tests/reference/digital.json';
import sample from '@/tests/reference/digital-sample.json';
import published from '@/tests/reference/published.json';
import { contractAndMarket, europeanTerms } from './request-arbitraries';

const Exact = Decimal.clone({ precision: 50 });

function priced(request: unknown): PricingSuccess {
  const result = price(request);
  if (!result.ok) throw new Error(result.message);
  return result;
}

const rows = [
  ...family.cases.map(({ id, request, expected }) => ({ id, request, expected })),
  ...sample.cases.map(({ region, ...row }, i) => ({ id: `${region} ${i}`, ...row })),
].map(({ id, request, expected }) => ({
  id,
  request,
  market: contractAndMarket(request).market,
  expected: expected as Record<string, string>,
  result: priced(request),
}));

type Row = (typeof rows)[number];

const gapOf = (got: number, expected: string) => new Exact(expected).minus(got).abs().toNumber();

/** How much faster the value moves than the spot: what the rounding of the inputs costs. */
const conditioning = ({ market, result }: Row) =>
  Math.max(1, (market.spot * Math.abs(result.greeks.delta)) / result.value);

it('values are right to 1e-13 times max(1, spot |delta| / value)', () => {
  const wrong = rows.filter((row) => {
    const allowed = 1e-13 * conditioning(row) * row.result.value;
    return gapOf(row.result.value, row.expected.value) > allowed;
  });
  expect(wrong.map(({ id }) => id)).toEqual([]);
});

it('every Greek is right to 1e-13 times the larger of that and d1 or d2 squared', () => {
  const wrong = rows.flatMap((row) =>
    Object.entries(row.expected)
      .filter(([name]) => name !== 'value')
      .filter(([name, digits]) => {
        const greek = name as keyof Greeks;
        const got = row.result.greeks[greek];
        const { d1, d2 } = row.result.diagnostics;
        // Volga is the sum of terms of either sign: near its zeros it is measured by these.
        const terms = Math.abs(row.result.greeks.vega / row.market.volatility) * Math.abs(d1 * d2);
        const size = Math.max(Math.abs(Number(digits)), greek === 'volga' ? terms : 0);
        const allowed = 1e-13 * Math.max(conditioning(row), d1 * d1, d2 * d2) * size;
        return !(typeof got === 'number' && gapOf(got, digits) <= allowed);
      })
      .map(([name, digits]) => `${row.id} ${name} ${digits}`),
  );
  expect(wrong).toEqual([]);
});

it('the error estimate holds in 95 % of cases, and is no more than thirty times too wide', () => {
  const errors = rows.map(({ expected, result }) => ({
    trueError: gapOf(result.value, expected.value),
    estimate: result.errorEstimate ?? NaN,
    rounding: 2 ** -53 * result.value,
  }));
  const holds = errors.filter(({ trueError, estimate }) => estimate >= trueError);
  expect(holds.length).toBeGreaterThanOrEqual(0.95 * errors.length);
  const visible = errors.filter(({ trueError, rounding }) => trueError > 10 * rounding);
  const sharp = visible.filter(({ trueError, estimate }) => estimate <= 30 * trueError);
  expect(visible.length).toBeGreaterThan(0);
  expect(sharp.length).toBeGreaterThanOrEqual(0.8 * visible.length);
});

type Example = {
  id: string;
  source: string;
  request: unknown;
  expected: { published?: string; computed?: string };
};

const examples = published.cases.flatMap(({ id, source, request, expected }): Example[] => {
  const payoff = request?.contract.payoff;
  if (payoff === 'asset-or-nothing') return [{ id, source, request, expected }];
  if (payoff !== 'cash-or-nothing') return [];
  // The row says its cash in words only: “cash-or-nothing put, cash 10”.
  const contract = { ...request?.contract, cash: 10 };
  return [{ id, source, request: { ...request, contract }, expected }];
});

it('finds the worked examples', () => expect(examples.length).toBe(2));

it.each(examples)('$id: $source', ({ request, expected }) => {
  const { value } = priced(request);
  expect(value.toFixed(4)).toBe(expected.published);
  expect(Math.abs(value / Number(expected.computed) - 1)).toBeLessThan(1e-11);
});

describe('laws', () => {
  const digital = (terms: object, payoff: 'cash-or-nothing' | 'asset-or-nothing', cash = 1) => ({
    ...terms,
    payoff,
    ...(payoff === 'cash-or-nothing' ? { cash } : {}),
  });

  it('a call and a put of the same kind pay the whole leg between them', () => {
    fc.assert(
      fc.property(europeanTerms, ({ contract, market }) => {
        const of = (kind: 'call' | 'put', payoff: 'cash-or-nothing' | 'asset-or-nothing') =>
          priced({ contract: digital({ ...contract, kind }, payoff), market }).value;
        const carry = 'carry' in market ? market.rate : market.yield;
        const bond = Math.exp(-market.rate * contract.expiry);
        const spot = market.spot * Math.exp(-carry * contract.expiry);
        const cash = of('call', 'cash-or-nothing') + of('put', 'cash-or-nothing');
        const asset = of('call', 'asset-or-nothing') + of('put', 'asset-or-nothing');
        expect(Math.abs(cash / bond - 1)).toBeLessThan(1e-14);
        expect(Math.abs(asset / spot - 1)).toBeLessThan(1e-14);
      }),
      { seed: 20260301 },
    );
  });

  it('the vanilla option is the asset option less the cash option that pays the strike', () => {
    fc.assert(
      fc.property(europeanTerms, ({ contract, market }) => {
        const { strike, expiry, kind } = contract;
        const sign = kind === 'call' ? 1 : -1;
        const vanilla = priced({ contract, market });
        const asset = priced({ contract: digital(contract, 'asset-or-nothing'), market });
        const cash = priced({ contract: digital(contract, 'cash-or-nothing', strike), market });
        const carry = 'carry' in market ? market.rate : market.yield;
        const legs =
          market.spot * Math.exp(-carry * expiry) + strike * Math.exp(-market.rate * expiry);
        const gap = vanilla.value - sign * (asset.value - cash.value);
        const conditioned = 1 + Math.abs(asset.greeks.delta * market.spot) / legs;
        expect(Math.abs(gap)).toBeLessThan(1e-14 * legs * conditioned);
      }),
      { seed: 20260302 },
    );
  });
});

describe('what is asked of it', () => {
  const contract = {
    payoff: 'cash-or-nothing',
    exercise: 'european',
    kind: 'call',
    strike: 100,
    expiry: 0.5,
    cash: 10,
  } as const satisfies DigitalContract;
  const market: Market = { spot: 100, rate: 0.05, yield: 0.02, volatility: 0.2 };

  it('is priced by the closed form, with or without its name or a tolerance', () => {
    const chosen = priced({ contract, market });
    expect(chosen.method).toEqual({ name: 'closed-form' });
    expect(priced({ contract, market, method: { name: 'closed-form' } })).toEqual(chosen);
    expect(priced({ contract, market, method: { tolerance: 1e-6 } })).toEqual(chosen);
    const routes = priceRoutes(contract, market);
    expect(compareRoutes(routes, 1e-6)).toMatchObject({ verdict: 'one-route' });
  });

  it.each(methods.filter(({ name }) => name !== closedForm.name))(
    '$name refuses it by name',
    ({ name }) => {
      expect(price({ contract, market, method: { name } })).toMatchObject({
        ok: false,
        code: 'method-does-not-price',
        path: 'contract.payoff',
      });
    },
  );

  it.each([
    [{ ...contract, cash: undefined }, 'contract.cash', 'missing'],
    [{ ...contract, cash: -1 }, 'contract.cash', 'not-positive'],
    [{ ...contract, payoff: 'asset-or-nothing' }, 'contract.cash', 'unknown-field'],
    [{ ...contract, payoff: 'vanilla' }, 'contract.cash', 'unknown-field'],
    [{ ...contract, exercise: 'american' }, 'contract.exercise', 'not-priced'],
  ])('refuses %j', (asked, path, code) => {
    expect(price({ contract: asked, market })).toMatchObject({ ok: false, path, code });
  });

  it('has no one volatility or strike to its value or delta, and says so', () => {
    const refusal = { ok: false, code: 'not-priced', path: 'contract.payoff' };
    expect(impliedVolatility({ contract, market }, 4)).toMatchObject(refusal);
    expect(strikeForDelta({ contract, market }, 0.1)).toMatchObject(refusal);
  });

  it('is finite to the limits of what may be asked', () => {
    const logBetween = (low: number, high: number) =>
      fc
        .double({ min: Math.log(low), max: Math.log(high), noNaN: true })
        .map((x) => Math.min(Math.max(Math.exp(x), low), high));
    const rates = fc.double({ min: -1, max: 1, noNaN: true });
    const anything = fc.record({
      contract: fc
        .record({
          payoff: fc.constantFrom('cash-or-nothing', 'asset-or-nothing'),
          exercise: fc.constant('european'),
          kind: fc.constantFrom('call', 'put'),
          strike: logBetween(1e-12, 1e12),
          expiry: logBetween(1e-6, 100),
          cash: logBetween(1e-12, 1e12),
        })
        .map(({ cash, ...terms }) =>
          terms.payoff === 'cash-or-nothing' ? { ...terms, cash } : terms,
        ),
      market: fc.record({
        spot: logBetween(1e-12, 1e12),
        rate: rates,
        yield: rates,
        volatility: logBetween(1e-5, 10),
      }),
    });
    fc.assert(
      fc.property(anything, (request) => {
        const { value, errorEstimate, greeks, diagnostics } = priced(request);
        const given = [value, errorEstimate, ...Object.values(greeks)];
        expect([...given, ...Object.values(diagnostics)].every(Number.isFinite)).toBe(true);
        expect(value).toBeGreaterThanOrEqual(0);
      }),
      { seed: 20260303, numRuns: 500 },
    );
  });
});
