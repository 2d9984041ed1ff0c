import fc from 'fast-check';
import { cellsOfMarket, marketComplaints, readMarketRow } from '@/shared/market-cells';
import { marketWarnings, warningKey } from '@/shared/market-warnings';

const cells = { price: '212.40', rate: '2.6', yield: '', volatility: '24.5' };
const market = { spot: 212.4, rate: 0.026, carry: 'future', volatility: 0.245 } as const;

describe('a row of cells', () => {
  test('is read as the close of a future, or of what has a yield', () => {
    expect(readMarketRow('future', cells)).toEqual({ ok: true, market });
    expect(readMarketRow('share', { ...cells, yield: '2,8 %', price: '38,6' })).toEqual({
      ok: true,
      market: { spot: 38.6, rate: 0.026, yield: 0.028, volatility: 0.245 },
    });
  });

  test('says what to do at each cell that cannot be read', () => {
    const wrong = { price: '1,234', rate: '', yield: '1', volatility: '2450' };
    expect(readMarketRow('future', wrong)).toEqual({
      ok: false,
      errors: {
        price: '“1,234” can be read in two ways: type 1.234 or 1234.',
        rate: 'Fill in the rate.',
        yield: 'A future has no yield of its own; leave this empty.',
        volatility: 'The volatility must lie between 0.001\u00a0% and 1\u00a0000\u00a0%.',
      },
    });
  });

  test('gives the same doubles back that it was written from', () => {
    // Nobody types a negative zero, and none is written: adding zero takes the sign away.
    const number = (min: number, max: number) =>
      fc.double({ min, max, noNaN: true }).map((each) => each + 0);
    const arbitrary = fc.record({
      spot: number(1e-6, 1e6),
      rate: number(-0.2, 0.5),
      yield: number(-0.2, 0.5),
      volatility: number(0.001, 4),
    });
    fc.assert(
      fc.property(arbitrary, (each) => {
        expect(readMarketRow('share', cellsOfMarket(each))).toEqual({ ok: true, market: each });
      }),
    );
  });
});

test('numbers that the engine would refuse are named by field', () => {
  expect(marketComplaints(market)).toEqual([]);
  expect(marketComplaints({ spot: 0, rate: 2.6, yield: -2, volatility: 24.5 })).toEqual([
    { field: 'spot', message: 'The price must be more than zero.' },
    { field: 'rate', message: 'The rate must lie between \u2212100\u00a0% and 100\u00a0%.' },
    { field: 'yield', message: 'The yield must lie between \u2212100\u00a0% and 100\u00a0%.' },
    {
      field: 'volatility',
      message: 'The volatility must lie between 0.001\u00a0% and 1\u00a0000\u00a0%.',
    },
  ]);
});

describe('unlikely numbers', () => {
  const warn = (changes: object, before: object | null) =>
    marketWarnings(
      [{ underlyingId: 'w', symbol: 'WHEAT', market: { ...market, ...changes } }],
      new Map(before ? [['w', { ...market, ...before }]] : []),
    ).map(({ code }) => code);

  test('are moves of more than a fifth, and volatilities beyond 1 % and 300 %', () => {
    expect(warn({ spot: 120 }, { spot: 100 })).toEqual([]);
    expect(warn({ spot: 120.01 }, { spot: 100 })).toEqual(['large-move']);
    expect(warn({ spot: 79.9 }, { spot: 100 })).toEqual(['large-move']);
    expect(warn({ spot: 1000 }, null)).toEqual([]);
    expect(warn({ volatility: 0.0099 }, null)).toEqual(['unusual-volatility']);
    expect(warn({ volatility: 0.01 }, null)).toEqual([]);
    expect(warn({ volatility: 3.001, spot: 1 }, {})).toEqual(['large-move', 'unusual-volatility']);
  });

  test('are known by underlying and kind, whatever their words', () => {
    expect(warningKey({ underlyingId: 'w', code: 'large-move' })).toBe('w large-move');
  });
});
