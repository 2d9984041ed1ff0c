import fc from 'fast-check';
import {
  alignDecimals,
  formatDifference,
  formatErrorEstimate,
  formatNumber,
  formatPercent,
  formatQuantity,
  minusSign,
  hardSpace,
  valueDecimals,
} from '@/shared/format/numbers';

const plain = (text: string) =>
  text.replaceAll(hardSpace, '').replaceAll(minusSign, '-').replace('%', '');

describe('numbers on a screen', () => {
  it('groups by a hard space and signs with a true minus', () => {
    expect(formatNumber(-66171.5, 2)).toBe('\u221266\u00a0171.50');
    expect(formatNumber(13.23427, 4)).toBe('13.2343');
    expect(formatNumber(0.0001, 4, 'always')).toBe('+0.0001');
  });

  it('shows no sign on a nought', () => {
    expect(formatNumber(-0.00001, 2)).toBe('0.00');
    expect(formatNumber(0, 2, 'always')).toBe('0.00');
  });

  it('takes decimal strings beyond the reach of a double', () => {
    expect(formatQuantity('123456789012345.0000000001')).toBe(
      '123\u00a0456\u00a0789\u00a0012\u00a0345.0000000001',
    );
  });

  it('keeps what it shows within half of the last decimal', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -1e9, max: 1e9, noNaN: true }),
        fc.integer({ min: 0, max: 6 }),
        (value, decimals) => {
          const shown = Number(plain(formatNumber(value, decimals)));
          expect(Math.abs(shown - value)).toBeLessThanOrEqual(0.5000001 * 10 ** -decimals);
        },
      ),
    );
  });

  it('shows one digit below the tolerance', () => {
    expect(valueDecimals(0.001, 2)).toBe(4);
    expect(valueDecimals(0.000001, 4)).toBe(7);
    expect(valueDecimals(5, 2)).toBe(2);
  });

  it('writes percent with the digits that the fraction has', () => {
    expect(formatPercent(0.245)).toBe('24.50\u00a0%');
    expect(formatPercent(-0.0012345)).toBe('\u22120.12345\u00a0%');
  });
});

describe('error estimates', () => {
  it.each([
    [0.00021, '0.0003'],
    [0.0003, '0.0003'],
    [2e-7, '2e\u22127'],
    [1.01e-13, '2e\u221213'],
    [0.00001, '1e\u22125'],
    [0.96, '1'],
    [9.6e-6, '1e\u22125'],
    [12, '20'],
    [0, '0'],
    [null, 'unknown'],
  ])('%p is written %s', (estimate, text) => {
    expect(formatErrorEstimate(estimate)).toBe(text);
  });

  it('never look smaller than they are', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-15, max: 1e4, noNaN: true }), (estimate) => {
        const shown = Number(plain(formatErrorEstimate(estimate)));
        expect(shown).toBeGreaterThanOrEqual(estimate);
        expect(shown).toBeLessThanOrEqual(2.0000001 * estimate);
      }),
    );
  });
});

describe('differences', () => {
  it('carry a sign, and a power of ten where the decimals would show nought', () => {
    expect(formatDifference(0.00012, 4)).toBe('+0.0001');
    expect(formatDifference(-0.0002, 4)).toBe('\u22120.0002');
    expect(formatDifference(-3.4e-9, 4)).toBe('\u22123e\u22129');
    expect(formatDifference(0, 4)).toBe('0');
  });
});

describe('alignDecimals', () => {
  it('puts every point at the same distance from the right', () => {
    expect(alignDecimals(['12.5', '\u22123', '0.0107'])).toEqual([
      { text: '12.5', padding: '000' },
      { text: '\u22123', padding: '.0000' },
      { text: '0.0107', padding: '' },
    ]);
    expect(alignDecimals(['5', '7'])).toEqual([
      { text: '5', padding: '' },
      { text: '7', padding: '' },
    ]);
  });
});
