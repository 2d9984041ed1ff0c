/**
 * The elementary functions against mpmath (tests/reference/generate/elementary.py), and their special
 * cases against ECMA-262 (Math.exp, Math.pow and so on) and, for erfc, the limits of its definition.
 */
import fc from 'fast-check';
import {
  cos,
  erfc,
  erfcx,
  exp,
  expm1,
  log,
  log1p,
  logRatio,
  pow,
  sin,
} from '@/pricing/numerics/elementary';
import { worstError } from './units-in-last-place';

describe('against mpmath, over the whole range', () => {
  it.each([
    ['exp', exp],
    ['expm1', expm1],
    ['log', log],
    ['log1p', log1p],
    ['logRatio', logRatio],
    ['sin', sin],
    ['cos', cos],
    ['pow', pow],
    ['erfc', erfc],
  ] as const)('%s is right to one unit in the last place', (name, f) => {
    expect(worstError(name, f as (...numbers: number[]) => number)).toBeLessThanOrEqual(1);
  });

  it('erfcx is right to two units in the last place', () => {
    expect(worstError('erfcx', erfcx)).toBeLessThanOrEqual(2);
  });
});

describe('special cases', () => {
  it.each([
    ['exp', exp, Math.exp],
    ['expm1', expm1, Math.expm1],
    ['log', log, Math.log],
    ['log1p', log1p, Math.log1p],
    ['sin', sin, Math.sin],
    ['cos', cos, Math.cos],
  ] as const)(
    '%s treats zeros, infinities, NaN and the ends of the range as ECMA-262 does',
    (_name, ours, standard) => {
      const extremes = [0, -0, Infinity, -Infinity, NaN, 5e-324, -5e-324, -1];
      for (const x of extremes) expect(ours(x)).toBe(standard(x));
    },
  );

  it('exp overflows and vanishes where it must', () => {
    expect(exp(709.782712893384)).toBeLessThan(Infinity);
    expect(exp(709.7827128933841)).toBe(Infinity);
    expect(exp(-745.1332191019411)).toBe(5e-324);
    expect(exp(-745.1332191019412)).toBe(0);
  });

  it('pow agrees with ECMA-262 on every pair of special numbers', () => {
    const bases = [
      0,
      -0,
      1,
      -1,
      4,
      -4,
      0.25,
      -0.25,
      Infinity,
      -Infinity,
      NaN,
      1e300,
      -1e300,
      5e-324,
    ];
    const exponents = [
      0,
      -0,
      1,
      2,
      3,
      -1,
      -2,
      -3,
      0.5,
      -0.5,
      1e16,
      1e300,
      Infinity,
      -Infinity,
      NaN,
    ];
    for (const x of bases) for (const y of exponents) expect(pow(x, y)).toBe(Math.pow(x, y));
  });

  it('pow of integers is exact while a double holds the result', () => {
    for (let base = 2; base <= 12; base += 1) {
      for (let power = 1, exact = base; exact <= 2 ** 53; power += 1, exact *= base) {
        expect(pow(base, power)).toBe(exact);
      }
    }
  });

  it('erfc goes from 2 to 0', () => {
    expect([-Infinity, -30, 0, 28, Infinity].map(erfc)).toEqual([2, 2, 1, 0, 0]);
    expect(erfc(NaN)).toBeNaN();
    expect(erfcx(-30)).toBe(Infinity);
    expect(erfcx(1e300)).toBeCloseTo(0, 20);
  });
});

describe('for any double', () => {
  const anyDouble = fc.double();
  const bounded = fc.double({ min: -700, max: 700, noNaN: true });

  it('sin and cos stay within one, and NaN comes only from what has no value', () => {
    fc.assert(
      fc.property(anyDouble, (x) => {
        if (!Number.isFinite(x)) return;
        expect(Math.abs(sin(x))).toBeLessThanOrEqual(1);
        expect(Math.abs(cos(x))).toBeLessThanOrEqual(1);
        expect(exp(x)).toBeGreaterThanOrEqual(0);
        expect(erfc(x)).toBeGreaterThanOrEqual(0);
        expect(Number.isNaN(log(x))).toBe(x < 0);
      }),
    );
  });

  it('log undoes exp to the conditioning of the pair', () => {
    fc.assert(
      fc.property(bounded, (x) => {
        expect(Math.abs(log(exp(x)) - x)).toBeLessThanOrEqual(2e-16 * (1 + Math.abs(x)));
      }),
    );
  });
});
