/**
 * log, log1p and the logarithm of a ratio.
 *
 * A positive number is written 2^k (1 + f) with sqrt(1/2) <= 1 + f < sqrt 2, and
 * log = k ln 2 + log(1 + f). With s = f / (2 + f), log(1 + f) = 2 artanh s = 2s + s R, R = 2/3 s^2 +
 * 2/5 s^4 + ... (power series to s^22; what is left out is below 1e-18), and 2s = f - s f, so that
 * log(1 + f) = f - f^2/2 + s (f^2/2 + R): the large terms f and f^2/2 are exact or kept with their
 * rounding errors, and only a term of the third order rounds.
 *
 * Accuracy: at most 0.7 ulp, measured against mpmath over all positive doubles (subnormal numbers
 * too) in tests/pricing/numerics/elementary.test.ts. log 0 is -Infinity, of a negative number NaN.
 */
import { highWord, productError, sumError, withHighWord } from './bits';
import { LN2_HIGH, LN2_LOW } from './exp';

/** 2/3 z + 2/5 z^2 + ... : what artanh adds to 2s, over s, with z = s^2. */
function artanhSeries(z: number): number {
  return (
    z *
    (2 / 3 +
      z *
        (2 / 5 +
          z *
            (2 / 7 +
              z *
                (2 / 9 +
                  z *
                    (2 / 11 +
                      z *
                        (2 / 13 +
                          z *
                            (2 / 15 +
                              z * (2 / 17 + z * (2 / 19 + z * (2 / 21 + z * (2 / 23)))))))))))
  );
}

/** log(2^k (1 + f + rest)), where `rest` is far below f and -0.3 <= f <= 0.42. */
function logOfParts(k: number, f: number, rest: number): number {
  const square = f * f;
  const halfSquare = 0.5 * square;
  const halfSquareRest = square > 1e-280 ? 0.5 * productError(f, f, square) : 0;
  const s = f / (2 + f);
  const third = s * (halfSquare + artanhSeries(s * s)) - halfSquareRest + rest / (1 + f);
  const sum = f - halfSquare;
  const sumRest = f - sum - halfSquare;
  if (k === 0) return sum + (sumRest + third);
  const whole = k * LN2_HIGH;
  const total = whole + sum;
  return total + (sumError(whole, sum, total) + (sumRest + (third + k * LN2_LOW)));
}

const SQRT2_FRACTION = 0x6a09e;

/** log(x + rest) for a positive normal x. */
function logOfNormal(x: number, rest: number, exponent: number): number {
  const high = highWord(x);
  const fraction = high & 0xfffff;
  const halve = fraction > SQRT2_FRACTION ? 1 : 0;
  const k = (high >> 20) - 1023 + halve;
  const mantissa = withHighWord(x, fraction | ((1023 - halve) << 20));
  return logOfParts(k + exponent, mantissa - 1, rest === 0 ? 0 : (rest / x) * mantissa);
}

export function log(x: number): number {
  if (!(x > 0)) return x === 0 ? -Infinity : NaN;
  if (x === Infinity) return x;
  if (x < 2.2250738585072014e-308) return logOfNormal(x * 18014398509481984, 0, -54);
  return logOfNormal(x, 0, 0);
}

/** log(1 + x) without the loss of digits that the sum would bring for small x. */
export function log1p(x: number): number {
  if (!(x > -1)) return x === -1 ? -Infinity : NaN;
  if (x === 0 || x === Infinity) return x;
  if (x > -0.29 && x < 0.41) return logOfParts(0, x, 0);
  const sum = 1 + x;
  return logOfNormal(sum, sumError(1, x, sum), 0);
}

/**
 * log(a / b) for positive normal a and b whose quotient is normal: the rounding error of the
 * quotient is carried on, so that the result is right to its last bit however near a is to b.
 */
export function logRatio(a: number, b: number): number {
  const ratio = a / b;
  const product = ratio * b;
  const rest = (a - product - productError(ratio, b, product)) / b;
  if (ratio > 0.71 && ratio < 1.41) return logOfParts(0, ratio - 1, rest);
  return logOfNormal(ratio, rest, 0);
}
