/**
 * exp and expm1.
 *
 * With k the integer nearest to x / ln 2, exp(x) = 2^k exp(r), r = x - k ln 2, |r| <= 0.3466. ln 2 is
 * held in two parts, of which the first has so few bits that k times it is exact, so that r is known
 * to more than 85 bits. exp(r) = 1 + r + r^2/2 + r^3 (1/6 + ...) is the power series to r^14; what is
 * left out is below 1e-19. The sum 1 + r is kept with its rounding error, so that only the last
 * addition rounds visibly.
 *
 * Accuracy: at most 0.75 ulp (`exp`), 0.6 ulp (`expm1`), measured against mpmath over the whole line
 * in tests/pricing/numerics/elementary.test.ts. Overflow gives Infinity, results below the smallest
 * normal number are rounded once more, NaN stays NaN.
 */
import { productError, scaleByPowerOfTwo, sumError } from './bits';

const INVERSE_LN2 = 1.4426950408889634;
/** ln 2 to 42 bits, so that its product with an integer of 11 bits is exact, and the rest. */
export const LN2_HIGH = 3048493539143 / 4398046511104;
export const LN2_LOW = 5.497923018708371e-14;

/** Beyond these exp overflows to Infinity, and is nearer to 0 than to the smallest subnormal. */
const OVERFLOW = 709.782712893384;
const UNDERFLOW = -745.1332191019412;

/** (exp(r) - 1 - r - r^2/2) / r^3 by its power series. */
function cubicSeries(r: number): number {
  return (
    1 / 6 +
    r *
      (1 / 24 +
        r *
          (1 / 120 +
            r *
              (1 / 720 +
                r *
                  (1 / 5040 +
                    r *
                      (1 / 40320 +
                        r *
                          (1 / 362880 +
                            r *
                              (1 / 3628800 +
                                r *
                                  (1 / 39916800 +
                                    r *
                                      (1 / 479001600 +
                                        r * (1 / 6227020800 + r * (1 / 87178291200)))))))))))
  );
}

export function exp(x: number): number {
  if (x !== x) return x;
  if (x > OVERFLOW) return Infinity;
  if (x < UNDERFLOW) return 0;
  const k = Math.floor(x * INVERSE_LN2 + 0.5);
  const high = x - k * LN2_HIGH;
  const low = k * LN2_LOW;
  const r = high - low;
  const rest = high - r - low;
  const sum = 1 + r;
  const y = sum + (1 - sum + r + (rest + r * r * (0.5 + r * cubicSeries(r))));
  return k === 0 ? y : scaleByPowerOfTwo(y, k);
}

/**
 * exp(high + low) = (pair[0] + pair[1]) * 2^k with a relative error below 2^-59; k is returned. The
 * argument lies between -800 and 800, and `low` is a rounding error of `high`.
 */
export function expPair(high: number, low: number, pair: Float64Array): number {
  const k = Math.floor(high * INVERSE_LN2 + 0.5);
  const reduced = high - k * LN2_HIGH;
  const shift = low - k * LN2_LOW;
  const r = reduced + shift;
  const rest = reduced - r + shift;
  const square = r * r;
  const halfSquare = 0.5 * square;
  const halfSquareRest = 0.5 * productError(r, r, square);
  const first = 1 + r;
  const firstRest = 1 - first + r;
  const second = first + halfSquare;
  const secondRest = first - second + halfSquare;
  const tail =
    secondRest + (firstRest + (square * r * cubicSeries(r) + (halfSquareRest + rest * (1 + r))));
  pair[0] = second + tail;
  pair[1] = second - pair[0] + tail;
  return k;
}

const pair = new Float64Array(2);

/** exp(x) - 1 without the loss of digits that the difference would bring for small x. */
export function expm1(x: number): number {
  if (x !== x || x === 0) return x;
  if (x > OVERFLOW) return Infinity;
  if (x < -40) return -1;
  if (x > -0.3 && x < 0.3) {
    const square = x * x;
    if (square < 1e-36) return x;
    const halfSquareRest = square > 1e-280 ? 0.5 * productError(x, x, square) : 0;
    const sum = x + 0.5 * square;
    const rest = x - sum + 0.5 * square;
    return sum + (rest + (halfSquareRest + square * x * cubicSeries(x)));
  }
  const k = expPair(x, 0, pair);
  // Past 2^60 the one is far below the last bit, and scaling the whole avoids an early overflow.
  if (k > 60) return scaleByPowerOfTwo(pair[0], k);
  const high = scaleByPowerOfTwo(pair[0], k);
  const low = scaleByPowerOfTwo(pair[1], k);
  const sum = high - 1;
  return sum + (sumError(high, -1, sum) + low);
}
