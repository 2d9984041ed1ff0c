/** Strike for a delta: there and back, and a delta that is exact by hand. */
import fc from 'fast-check';
import type { PricingRequest } from '@/pricing/contract';
import { price, strikeForDelta } from '@/pricing/index';
import { contractAndMarket, europeanTerms } from './request-arbitraries';

function strikeOf(request: PricingRequest, delta: number): number {
  const solved = strikeForDelta(request, delta);
  if (!solved.ok) throw new Error(solved.message);
  return solved.value;
}

function deltaAt({ contract, market }: PricingRequest, strike: number): number {
  const result = price({ contract: { ...contract, strike }, market });
  return result.ok ? result.greeks.delta : NaN;
}

it('a strike found for a delta has that delta, in any market', () => {
  fc.assert(
    fc.property(europeanTerms, fc.double({ min: 0.01, max: 0.99, noNaN: true }), (terms, share) => {
      const { contract, market } = terms;
      const carry = 'carry' in market ? market.rate : market.yield;
      const sign = contract.kind === 'call' ? 1 : -1;
      const delta = sign * share * Math.exp(-carry * contract.expiry);
      const solved = strikeForDelta(terms, delta);
      if (!solved.ok) {
        expect(solved.message).toMatch('No strike within the limits');
        return;
      }
      // One rounding of the strike moves d1 by its share of s, and delta by the density of that.
      const s = market.volatility * Math.sqrt(contract.expiry);
      const slack = 1e-14 * Math.abs(delta) * (1 + 10 / s);
      expect(Math.abs(deltaAt(terms, solved.value) - delta)).toBeLessThanOrEqual(slack);
    }),
  );
});

/** d1 = 0 gives delta one half: strike = spot exp(s^2 / 2) with no rates. By hand. */
it('delta one half without rates is the spot times exp of half the variance', () => {
  const request = contractAndMarket({
    contract: { payoff: 'vanilla', exercise: 'european', kind: 'call', strike: 1, expiry: 1 },
    market: { spot: 100, rate: 0, yield: 0, volatility: 0.2 },
  });
  expect(strikeOf(request, 0.5)).toBeCloseTo(100 * Math.exp(0.02), 11);
});

const americanPut = contractAndMarket({
  contract: { payoff: 'vanilla', exercise: 'american', kind: 'put', strike: 1, expiry: 0.5 },
  market: { spot: 100, rate: 0.05, yield: 0.01, volatility: 0.25 },
});

it.each([-0.1, -0.5, -0.9])('an American put has the delta %d at the strike found', (delta) => {
  expect(deltaAt(americanPut, strikeOf(americanPut, delta))).toBeCloseTo(delta, 5);
});

it.each([0.5, 0, -1, -2, NaN])('refuses the delta %d, which no strike has', (delta) => {
  expect(strikeForDelta(americanPut, delta)).toMatchObject({ ok: false, path: 'delta' });
});
