/**
 * Volatility for a premium: the European one against mpmath's Newton iteration at 60 digits
 * (tests/reference/implied-vol.json), a worked example, and the way there and back; the American one
 * there and back through the engine's own price.
 */
import Decimal from 'decimal.js';
import fc from 'fast-check';
import type { PricingRequest } from '@/pricing/contract';
import { impliedVolatility, price } from '@/pricing/index';
import reference from '@/tests/reference/implied-vol.json';
import published from '@/tests/reference/published.json';
import { contractAndMarket, europeanTerms } from './request-arbitraries';

type Inputs = {
  kind: string;
  spot: number;
  strike: number;
  rate: number;
  yield: number;
  T: number;
};

/** The volatility of the request plays no part in the answer. */
function europeanRequest({ kind, spot, strike, rate, yield: carry, T }: Inputs): PricingRequest {
  return contractAndMarket({
    contract: { payoff: 'vanilla', exercise: 'european', kind, strike, expiry: T },
    market: { spot, rate, yield: carry, volatility: 0.2 },
  });
}

function vegaAt({ contract, market }: PricingRequest, volatility: number): number {
  const result = price({ contract, market: { ...market, volatility } });
  return result.ok ? result.greeks.vega : NaN;
}

function volatilityOf(request: PricingRequest, premium: number): number {
  const solved = impliedVolatility(request, premium);
  if (!solved.ok) throw new Error(solved.message);
  return solved.value;
}

it.each(reference.cases)('$id is right to max(1e-12 volatility, rounding / vega)', (row) => {
  const request = europeanRequest(row.inputs);
  const premium = row.inputs.priceDouble;
  const got = volatilityOf(request, premium);
  const error = new Decimal(row.expected.volOfDouble).minus(got).abs().toNumber();
  const fromRounding = (2 ** -53 * premium) / vegaAt(request, got);
  expect(error).toBeLessThanOrEqual(Math.max(1e-12 * got, fromRounding));
});

/** Digits from memory, as the row says. */
const example = published.cases.find(({ inputs }) => inputs?.quantity === 'vol');

it(`reproduces the worked example of ${example?.source ?? 'nobody'}`, () => {
  const inputs = example?.inputs as Inputs & { price: number };
  const got = volatilityOf(europeanRequest(inputs), inputs.price);
  expect(got.toFixed(3)).toBe(example?.expected.published);
  expect(got).toBeCloseTo(Number(example?.expected.computed), 11);
});

it('finds the volatility back from the price, in any market', () => {
  fc.assert(
    fc.property(europeanTerms, (terms) => {
      const result = price(terms);
      if (!result.ok) throw new Error(result.message);
      const { value, errorEstimate, greeks } = result;
      const doubt = (2 * (errorEstimate ?? NaN)) / greeks.vega;
      // Where the price hardly knows its volatility, nothing can be found back.
      if (!(doubt < 1e-3 * terms.market.volatility)) return;
      const got = volatilityOf(terms, value);
      const slack = 1e-12 * terms.market.volatility + 2 * doubt;
      expect(Math.abs(got - terms.market.volatility)).toBeLessThanOrEqual(slack);
    }),
  );
});

const inTheMoneyCall = europeanRequest({
  kind: 'call',
  spot: 120,
  strike: 100,
  rate: 0,
  yield: 0,
  T: 1,
});

it('says that a premium at its floor does not determine a volatility', () => {
  expect(impliedVolatility(inTheMoneyCall, 20)).toMatchObject({
    ok: false,
    code: 'not-determined',
    path: 'premium',
  });
});

it.each([19.9, 120, 500, 0, -1])('refuses the premium %d, which no volatility gives', (premium) => {
  expect(impliedVolatility(inTheMoneyCall, premium)).toMatchObject({
    ok: false,
    code: 'out-of-range',
    path: 'premium',
  });
});

it.each([NaN, Infinity])('refuses the premium %d', (premium) => {
  expect(impliedVolatility(inTheMoneyCall, premium)).toMatchObject({ code: 'not-finite' });
});

describe('American exercise', () => {
  const request = contractAndMarket({
    contract: { payoff: 'vanilla', exercise: 'american', kind: 'put', strike: 100, expiry: 0.5 },
    market: { spot: 95, rate: 0.05, yield: 0.01, volatility: 0.37 },
  });

  it('finds the volatility back from the price', () => {
    const result = price(request);
    if (!result.ok) throw new Error(result.message);
    expect(volatilityOf(request, result.value)).toBeCloseTo(0.37, 7);
  });

  it('tells what exercise pays from what no volatility gives', () => {
    expect(impliedVolatility(request, 5)).toMatchObject({ code: 'not-determined' });
    expect(impliedVolatility(request, 4)).toMatchObject({ code: 'out-of-range' });
    expect(impliedVolatility(request, 101)).toMatchObject({ code: 'out-of-range' });
  });
});
