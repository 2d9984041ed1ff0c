/** What the two desks quote on, with the numbers of one invented close. */
import type { Market } from '@/pricing/contract';
import type { UnderlyingDraft } from '../services/underlyings';

export type SeedUnderlying = UnderlyingDraft & { market: Market };

type Numbers = { spot: number; rate: number; volatility: number };

const future = (numbers: Numbers): Market => ({ ...numbers, carry: 'future' });

const euroRate = 0.026;

export const commodities: readonly SeedUnderlying[] = [
  {
    symbol: 'WHEAT-DEC',
    name: 'Winter wheat, December future',
    kind: 'future',
    currency: 'EUR',
    unit: 't',
    contractSize: '50',
    priceDecimals: 2,
    tolerance: 0.01,
    market: future({ spot: 212.4, rate: euroRate, volatility: 0.245 }),
  },
  {
    symbol: 'RAPE-MAY',
    name: 'Rapeseed, May future',
    kind: 'future',
    currency: 'EUR',
    unit: 't',
    contractSize: '50',
    priceDecimals: 2,
    tolerance: 0.02,
    market: future({ spot: 468.25, rate: euroRate, volatility: 0.22 }),
  },
  {
    symbol: 'BARLEY-MAR',
    name: 'Malting barley, March future',
    kind: 'future',
    currency: 'EUR',
    unit: 't',
    contractSize: '50',
    priceDecimals: 2,
    tolerance: 0.01,
    market: future({ spot: 241.5, rate: euroRate, volatility: 0.26 }),
  },
  {
    symbol: 'FREIGHT-Q1',
    name: 'Dry freight index, first-quarter future',
    kind: 'future',
    currency: 'USD',
    unit: 'point',
    contractSize: '10',
    priceDecimals: 1,
    tolerance: 0.1,
    market: future({ spot: 1480, rate: 0.041, volatility: 0.55 }),
  },
  {
    symbol: 'MILL',
    name: 'Tarnfield Mill, share',
    kind: 'share',
    currency: 'EUR',
    unit: 'share',
    contractSize: '100',
    priceDecimals: 2,
    tolerance: 0.002,
    market: { spot: 38.6, rate: euroRate, yield: 0.028, volatility: 0.31 },
  },
  {
    symbol: 'FERTI',
    name: 'Grenmoor Fertiliser, share',
    kind: 'share',
    currency: 'EUR',
    unit: 'share',
    contractSize: '100',
    priceDecimals: 2,
    tolerance: 0.003,
    market: { spot: 61.2, rate: euroRate, yield: 0.041, volatility: 0.34 },
  },
  {
    symbol: 'FOOD-40',
    name: 'Food and farming index, 40 shares',
    kind: 'index',
    currency: 'EUR',
    unit: 'point',
    contractSize: '10',
    priceDecimals: 1,
    tolerance: 0.1,
    market: { spot: 1824.6, rate: euroRate, yield: 0.022, volatility: 0.18 },
  },
];

const pair = (
  symbol: string,
  details: { priceDecimals: number; tolerance: number; market: Market },
): SeedUnderlying => {
  const [base, currency] = symbol.split('/');
  return {
    symbol,
    name: `${base} in ${currency}`,
    kind: 'currency-pair',
    currency,
    unit: base,
    contractSize: '100000',
    ...details,
  };
};

export const treasury: readonly SeedUnderlying[] = [
  pair('EUR/USD', {
    priceDecimals: 5,
    tolerance: 0.00005,
    market: { spot: 1.0842, rate: 0.041, yield: euroRate, volatility: 0.078 },
  }),
  pair('EUR/SEK', {
    priceDecimals: 4,
    tolerance: 0.0005,
    market: { spot: 11.342, rate: 0.025, yield: euroRate, volatility: 0.065 },
  }),
  pair('GBP/EUR', {
    priceDecimals: 5,
    tolerance: 0.00005,
    market: { spot: 1.1905, rate: euroRate, yield: 0.043, volatility: 0.06 },
  }),
  pair('USD/NOK', {
    priceDecimals: 4,
    tolerance: 0.0005,
    market: { spot: 10.52, rate: 0.042, yield: 0.041, volatility: 0.115 },
  }),
];
