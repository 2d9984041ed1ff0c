/**
 * The normal distribution against mpmath, against the printed table, and against jstat (a general
 * statistics library, good to about 1e-7 of the tail; the bound is what it was seen to hold).
 */
import fc from 'fast-check';
import { jStat } from 'jstat';
import { inverseNormalCdf, millsRatio, normalCdf, normalDensity } from '@/pricing/numerics/normal';
import published from '@/tests/reference/published.json';
import { unitInLastPlace, worstError } from './units-in-last-place';

it('the distribution function and the density are right to two units in the last place', () => {
  expect(worstError('normalCdf', normalCdf)).toBeLessThanOrEqual(2);
  expect(worstError('normalDensity', normalDensity)).toBeLessThanOrEqual(2);
});

it('the Mills ratio is right to four units in the last place', () => {
  expect(worstError('millsRatio', millsRatio)).toBeLessThanOrEqual(4);
});

/** Abramowitz & Stegun, Handbook of Mathematical Functions, Table 26.1; digits from memory. */
const printedRows = published.cases.filter((row) => row.inputs?.quantity === 'P(x)');

it('finds the printed rows', () => {
  expect(printedRows.length).toBe(4);
});

it.each(printedRows.map((row) => [row.inputs?.x, row.expected.published] as const))(
  'P(%d) is %s as printed by Abramowitz & Stegun, Table 26.1',
  (x, printed) => {
    expect(normalCdf(Number(x)).toFixed(15)).toBe(printed);
  },
);

it('agrees with jstat at the accuracy of jstat', () => {
  for (let x = -6; x <= 6; x += 0.125) {
    expect(Math.abs(normalCdf(x) - jStat.normal.cdf(x, 0, 1))).toBeLessThan(2e-7);
    expect(Math.abs(normalDensity(x) / jStat.normal.pdf(x, 0, 1) - 1)).toBeLessThan(1e-13);
  }
});

it('the quantile gives its probability back, to the conditioning of the distribution', () => {
  const probabilities = fc.double({ min: 1e-300, max: 0.5, noNaN: true, minExcluded: true });
  fc.assert(
    fc.property(probabilities, (p) => {
      const x = inverseNormalCdf(p);
      const slack = 4 * unitInLastPlace(x) * normalDensity(x) + 4 * unitInLastPlace(p);
      expect(Math.abs(normalCdf(x) - p)).toBeLessThanOrEqual(slack);
    }),
  );
  expect(() => inverseNormalCdf(0)).toThrow(RangeError);
  expect(inverseNormalCdf(0.5)).toBeCloseTo(0, 15);
});
