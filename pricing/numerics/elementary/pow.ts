/**
 * pow(x, y) = exp(y log x), with log x and the product held to more than 2^-63, so that the exponent,
 * up to 745, spoils no bit of the result.
 *
 * log x = k ln 2 + 2 artanh s, s = f / (2 + f) by exact division in two parts, artanh s =
 * s (1 + z (1/3 + z (1/5 + ...))), z = s^2: the 1, and the term z/3, in two parts each.
 *
 * Special cases are those of ECMAScript: pow(x, 0) is 1 even for NaN; pow(±1, ±Infinity) is NaN; a
 * negative base has a power only for integer exponents.
 *
 * Accuracy: at most 0.6 ulp for normal results, 1 ulp for subnormal ones, measured against mpmath
 * in tests/pricing/numerics/elementary.test.ts; an integer power that a double can hold is exact.
 */
import { highWord, productError, scaleByPowerOfTwo, sumError, withHighWord } from './bits';
import { expPair } from './exp';

const LN2 = 0.6931471805599453;
const LN2_REST = 2.3190468138462996e-17;
const THIRD = 1 / 3;
const THIRD_REST = 1.850371707708594e-17;
const SQRT2_FRACTION = 0x6a09e;

const pair = new Float64Array(2);

/** 1/5 + z/7 + z^2/9 + ... */
function artanhTail(z: number): number {
  return (
    1 / 5 +
    z *
      (1 / 7 +
        z *
          (1 / 9 +
            z *
              (1 / 11 +
                z *
                  (1 / 13 +
                    z * (1 / 15 + z * (1 / 17 + z * (1 / 19 + z * (1 / 21 + z * (1 / 23)))))))))
  );
}

/** Puts log x, for positive finite x, into `pair`. */
function logPair(x: number): void {
  let k = 0;
  if (x < 2.2250738585072014e-308) {
    x *= 18014398509481984;
    k = -54;
  }
  const word = highWord(x);
  const fraction = word & 0xfffff;
  const halve = fraction > SQRT2_FRACTION ? 1 : 0;
  k += (word >> 20) - 1023 + halve;
  const mantissa = withHighWord(x, fraction | ((1023 - halve) << 20));

  const f = mantissa - 1;
  const divisor = 1 + mantissa;
  const divisorRest = sumError(1, mantissa, divisor);
  const s = f / divisor;
  const back = s * divisor;
  const sRest = (f - back - productError(s, divisor, back) - s * divisorRest) / divisor;

  const z = s * s;
  const zRest = productError(s, s, z) + 2 * s * sRest;
  const linear = z * THIRD;
  const correction =
    productError(z, THIRD, linear) + z * THIRD_REST + zRest * THIRD + z * z * artanhTail(z);
  const growth = linear + correction;
  const growthRest = linear - growth + correction;

  const cubic = s * growth;
  const cubicRest = productError(s, growth, cubic) + s * growthRest + sRest * growth;
  const half = s + cubic;
  const halfRest = s - half + cubic + (sRest + cubicRest);

  const whole = k * LN2;
  const wholeRest = productError(k, LN2, whole) + k * LN2_REST;
  const sum = whole + 2 * half;
  const rest = sumError(whole, 2 * half, sum) + (wholeRest + 2 * halfRest);
  pair[0] = sum + rest;
  pair[1] = sum - pair[0] + rest;
}

/** x^y for 0 < x < Infinity, x not 1, and finite y, not 0. */
function powOfPositive(x: number, y: number): number {
  logPair(x);
  const estimate = y * pair[0];
  if (estimate > 710) return Infinity;
  if (estimate < -746) return 0;
  // A subnormal exponent or one below 1e-30 leaves 1 and cannot be split exactly.
  if (estimate > -1e-30 && estimate < 1e-30) return 1;
  const rest = productError(y, pair[0], estimate) + y * pair[1];
  const high = estimate + rest;
  const k = expPair(high, estimate - high + rest, pair);
  return scaleByPowerOfTwo(pair[0], k);
}

function isOddInteger(y: number): boolean {
  return Math.abs(y) < 9007199254740992 && Math.floor(y) === y && Math.floor(y / 2) * 2 !== y;
}

export function pow(x: number, y: number): number {
  if (y === 0) return 1;
  if (x !== x || y !== y) return NaN;
  const magnitude = Math.abs(x);
  if (y === Infinity || y === -Infinity) {
    if (magnitude === 1) return NaN;
    return magnitude > 1 === y > 0 ? Infinity : 0;
  }
  if (y === 1) return x;
  if (y === 2) return x * x;
  const negative = (x < 0 || (x === 0 && 1 / x < 0)) && isOddInteger(y);
  if (magnitude === 0 || magnitude === Infinity) {
    const result = (magnitude === 0) === y > 0 ? 0 : Infinity;
    return negative ? -result : result;
  }
  if (x < 0 && Math.floor(y) !== y) return NaN;
  const result = magnitude === 1 ? 1 : powOfPositive(magnitude, y);
  return negative ? -result : result;
}
