/**
 * The heart of the closed form: the European option that is out of the money forward, in units of
 * the smaller of its two discounted legs.
 *
 *     v(x, s) = cdf(a) - exp(-x) cdf(b),   a = x/s + s/2,   b = x/s - s/2,   x <= 0,   s > 0,
 *
 * where x is the logarithm of the smaller leg over the larger and s = volatility sqrt(expiry).
 * Because density(a) = exp(-x) density(b), with Mills' ratio M(z) = (1 - cdf(z)) / density(z),
 *
 *     v = density(a) (M(-a) - M(-b)).
 *
 * The terms cancel in two ways, and each has its form:
 *  - far out of the money both terms are tiny; the difference of the Mills ratios (scaled erfc) keeps
 *    its digits where the plain difference of probabilities has none left;
 *  - for small s the two ratios are nearly equal. With h = -x/s, t = s/2 the difference is
 *    M(h - t) - M(h + t) = 2 (t I_1 + t^3/3! I_3 + t^5/5! I_5 + ...), where
 *    I_n(h) = integral over u > 0 of u^n exp(-h u - u^2/2) is positive, I_0 = M(h), I_1 = 1 - h M(h),
 *    I_{n+1} = n I_{n-1} - h I_n. Used for t < 0.1 and t h < 0.5; seven terms reach the last bit.
 * Where a >= 0 and s is not small nothing cancels, and the definition is used.
 *
 * Accuracy: a few units in the last place beyond what the rounding of x and s costs, see `closed-form.ts`.
 */
import { exp } from '@/pricing/numerics/elementary';
import { millsRatio, normalCdf, normalDensity } from '@/pricing/numerics/normal';

export type Branch = 'series' | 'mills' | 'direct';

export function branchFor(x: number, s: number): Branch {
  if (s < 0.2 && x > -1) return 'series';
  return x / s + 0.5 * s < 0 ? 'mills' : 'direct';
}

/** M(h - t) - M(h + t) by the series above. */
function millsDifference(h: number, t: number): number {
  let even = millsRatio(h);
  let odd = 1 - h * even;
  let power = t;
  let sum = power * odd;
  for (let n = 1; n < 13; n += 2) {
    even = n * even - h * odd;
    odd = (n + 1) * odd - h * even;
    power *= (t * t) / ((n + 1) * (n + 2));
    sum += power * odd;
  }
  return 2 * sum;
}

/** v(x, s) / density(a): stays in range where v itself is too small for a double. */
export function scaledOutOfTheMoney(x: number, s: number): number {
  const a = x / s + 0.5 * s;
  const branch = branchFor(x, s);
  if (branch === 'series') return millsDifference(-x / s, 0.5 * s);
  if (branch === 'mills') return millsRatio(-a) - millsRatio(0.5 * s - x / s);
  return outOfTheMoney(x, s) / normalDensity(a);
}

/** v(x, s): between 0 and 1, rising in both arguments. */
export function outOfTheMoney(x: number, s: number): number {
  const a = x / s + 0.5 * s;
  if (branchFor(x, s) !== 'direct') return normalDensity(a) * scaledOutOfTheMoney(x, s);
  return normalCdf(a) - exp(-x) * normalCdf(x / s - 0.5 * s);
}
