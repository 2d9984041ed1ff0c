/**
 * The standard normal distribution over the whole line, tails included.
 *
 *     cdf(x) = erfc(-x / sqrt 2) / 2        density(x) = exp(-x^2 / 2) / sqrt(2 pi)
 *     millsRatio(z) = (1 - cdf(z)) / density(z) = sqrt(pi/2) erfcx(z / sqrt 2)
 *
 * In the tail a relative error e of x / sqrt 2 becomes x^2 e in the result: 10^-13 at x = -30. So the
 * rounding error of the quotient is kept, and taken off by the derivative of erfc. The density
 * squares x in two parts for the same reason.
 *
 * Accuracy: `normalCdf` and `normalDensity` at most 2 ulp, `millsRatio` at most 4 ulp, measured
 * against mpmath in tests/pricing/numerics/normal.test.ts. `inverseNormalCdf` gives a number whose
 * distribution function is the probability asked for, to 4 ulp of the number or of 1 - p.
 */
import { productError, scaleByPowerOfTwo } from './elementary/bits';
import { erfc, erfcx } from './elementary/erfc';
import { exp, expPair } from './elementary/exp';
import { log } from './elementary/log';

const SQRT_HALF = 0.7071067811865476;
const SQRT_HALF_REST = -4.833646656726457e-17;
const TWO_OVER_SQRT_PI = 1.1283791670955126;
const INVERSE_SQRT_TWO_PI = 0.3989422804014327;
const SQRT_HALF_PI = 1.2533141373155003;

const pair = new Float64Array(2);

/** cdf(-z) for z >= 0. */
function lowerTail(z: number): number {
  if (z > 38.6) return 0;
  const y = z * SQRT_HALF;
  if (z < 1e-20) return 0.5 - 0.5 * TWO_OVER_SQRT_PI * y;
  const rest = productError(z, SQRT_HALF, y) + z * SQRT_HALF_REST;
  return 0.5 * (erfc(y) - rest * TWO_OVER_SQRT_PI * exp(-y * y));
}

/** The probability that a standard normal variable is at most x. */
export function normalCdf(x: number): number {
  return x < 0 ? lowerTail(-x) : 1 - lowerTail(x);
}

export function normalDensity(x: number): number {
  if (x > 39 || x < -39) return 0;
  const square = x * x;
  if (square < 1e-280) return INVERSE_SQRT_TWO_PI;
  const k = expPair(-0.5 * square, -0.5 * productError(x, x, square), pair);
  return scaleByPowerOfTwo(pair[0] * INVERSE_SQRT_TWO_PI, k);
}

/** (1 - cdf(z)) / density(z): falls like 1/z, and keeps a tail in range where both vanish. */
export function millsRatio(z: number): number {
  // For negative z it grows like exp(z^2 / 2), whose exponent must be squared in two parts.
  if (z < -1) return normalCdf(-z) / normalDensity(z);
  return SQRT_HALF_PI * erfcx(z * SQRT_HALF);
}

/**
 * The x with cdf(x) = p, for 0 < p < 1. log cdf is concave and rises, so that Newton's iteration from
 * the left of the root climbs to it without overshooting; cdf(-sqrt(-2 log p)) < p gives the start.
 * The last step is taken on cdf itself, which is sharper than its logarithm.
 */
export function inverseNormalCdf(p: number): number {
  if (!(p > 0 && p < 1)) throw new RangeError(`no quantile at ${p}`);
  if (p > 0.5) return -inverseNormalCdf(1 - p);
  const target = log(p);
  let x = -Math.sqrt(-2 * target);
  for (let i = 0; i < 60; i += 1) {
    const step = (target - log(normalCdf(x))) * millsRatio(-x);
    x += step;
    if (Math.abs(step) <= 1e-12 * Math.max(1e-3, Math.abs(x))) break;
  }
  const density = normalDensity(x);
  return density > 1e-290 ? x + (p - normalCdf(x)) / density : x;
}
