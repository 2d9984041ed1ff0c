import { formatAmount, formatMoney, minorUnitDecimals } from '@/shared/format/money';

describe('money', () => {
  // ISO 4217:2015, table A.1: minor units of these currencies.
  it.each([
    ['EUR', 2],
    ['USD', 2],
    ['SEK', 2],
    ['JPY', 0],
    ['KWD', 3],
  ])('%s has %i decimals', (currency, decimals) => {
    expect(minorUnitDecimals(currency)).toBe(decimals);
  });

  it('is rounded to the minor unit, halves away from zero', () => {
    expect(formatMoney('-66171.505', 'EUR')).toBe('\u221266\u00a0171.51\u00a0EUR');
    expect(formatMoney('1234567.5', 'JPY')).toBe('1\u00a0234\u00a0568\u00a0JPY');
    expect(formatAmount('0.125', 'EUR', 'always')).toBe('+0.13');
  });
});
