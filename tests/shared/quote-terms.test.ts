import fc from 'fast-check';
import {
  expiryInstantMs,
  positionTotal,
  pricingRequestOf,
  type PricedTerms,
} from '@/shared/quote-terms';

const desk = { timeZone: 'Europe/Berlin', expiryCutoff: '17:30' };

const terms: PricedTerms = {
  kind: 'put',
  exercise: 'american',
  strike: '210.00',
  expiryDate: '2027-12-01',
  market: { spot: 212.4, rate: 0.03, carry: 'future', volatility: 0.245 },
  pricedAt: '2026-12-01T16:30:00Z',
};

describe('the request for the terms of a quote', () => {
  it('ends at the desk’s cut-off, in the desk’s zone', () => {
    // Central European Time is UTC+1 in winter and UTC+2 in summer (Directive 2000/84/EC).
    expect(new Date(expiryInstantMs('2027-12-01', desk)).toISOString()).toBe(
      '2027-12-01T16:30:00.000Z',
    );
    expect(new Date(expiryInstantMs('2027-06-01', desk)).toISOString()).toBe(
      '2027-06-01T15:30:00.000Z',
    );
  });

  it('counts years ACT/365 Fixed', () => {
    // 365 days at the same wall clock in the same season: one year exactly.
    expect(pricingRequestOf(terms, desk)).toEqual({
      contract: { payoff: 'vanilla', exercise: 'american', kind: 'put', strike: 210, expiry: 1 },
      market: terms.market,
    });
  });
});

describe('the total of a position', () => {
  it('is positive for what the desk holds and negative for what it sold', () => {
    const position = { quantity: '10', contractSize: '500' };
    expect(positionTotal(13.2343, { ...position, direction: 'buy' })).toBe('66171.5');
    expect(positionTotal(13.2343, { ...position, direction: 'sell' })).toBe('-66171.5');
  });

  it('is exact in the decimals of the value', () => {
    expect(positionTotal(0.1, { direction: 'buy', quantity: '3', contractSize: '1' })).toBe('0.3');
  });

  it('of a purchase and of the same sale add up to nought', () => {
    const quantities = fc.integer({ min: 1, max: 1_000_000 }).map(String);
    fc.assert(
      fc.property(fc.double({ min: 0, max: 1e4, noNaN: true }), quantities, (value, quantity) => {
        const position = { quantity, contractSize: '50' };
        const bought = positionTotal(value, { ...position, direction: 'buy' });
        const sold = positionTotal(value, { ...position, direction: 'sell' });
        expect(Number(bought) + Number(sold)).toBe(0);
      }),
    );
  });
});
