/** ACT/365 Fixed (2006 ISDA Definitions, 4.16(d)): actual days over 365, leap years as any other. */
import { carryYield, yearFraction } from '@/pricing/conventions';

it.each([
  ['2025-01-01', '2026-01-01', 1],
  ['2024-01-01', '2025-01-01', 366 / 365],
  ['2026-01-01', '2026-07-02', 182 / 365],
  ['2026-01-02', '2026-01-01', -1 / 365],
])('from %s to %s are %d years', (from, to, years) => {
  expect(yearFraction(Date.parse(from), Date.parse(to))).toBeCloseTo(years, 15);
});

it('the carry of a future is the rate itself, that of anything else its yield', () => {
  expect(carryYield({ spot: 1, rate: 0.05, yield: 0.02, volatility: 0.2 })).toBe(0.02);
  expect(carryYield({ spot: 1, rate: 0.05, carry: 'future', volatility: 0.2 })).toBe(0.05);
});
