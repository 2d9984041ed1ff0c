/**
 * sin and cos.
 *
 * x = n pi/2 + r with |r| <= pi/4, r known in two parts. Up to 2^20 pi/2 the multiple is taken off in
 * four parts of pi/2, of which three have 33 bits, so that their products with n are exact; that
 * keeps r right to its last bit even for the doubles nearest to a multiple of pi/2 (2^-62 away).
 * Larger arguments are multiplied by 2/pi in integers of any length (Payne and Hanek's idea); that is
 * slow, and no price needs it. Then the power series, the first terms with their rounding errors.
 *
 * Accuracy: at most 0.75 ulp, measured against mpmath over the whole line in
 * tests/pricing/numerics/elementary.test.ts. An infinite argument gives NaN.
 */
import { productError, sumError } from './bits';

const TWO_OVER_PI = 0.6366197723675814;
const HALF_PI = 1.5707963267948966;
const HALF_PI_REST = 6.123233995736766e-17;
/** pi/2 = PART_1 + PART_2 + PART_3 + PART_4, three of 33 bits and the rest. */
const PART_1 = 1.5707963267341256;
const PART_2 = 6.077100506303966e-11;
const PART_3 = 2.0222662487111665e-21;
const PART_4 = 8.4784276603689e-32;

/** Past this the product of n with a part of 33 bits would no longer be exact. */
const LARGE = 1647099;

/** 2/pi to 1280 bits behind the point. */
const LARGE_BITS = 1280n;
const LARGE_TWO_OVER_PI = BigInt(
  '0x' +
    'a2f9836e4e441529fc2757d1f534ddc0db6295993c439041fe5163abdebbc561b7246e3a424dd2e0' +
    '06492eea09d1921cfe1deb1cb129a73ee88235f52ebb4484e99c7026b45f7e413991d639835339f4' +
    '9c845f8bbdf9283b1ff897ffde05980fef2f118b5a0a6d1f6d367ecf27cb09b74f463f669e5fea2d' +
    '7527bac7ebe5f17b3d0739f78a5292ea6bfb5fb11f8d5d0856033046fc7b6babf0cfbc209af4361d',
);

const remainder = new Float64Array(2);

/** Puts r and its tail into `remainder`, and returns n modulo 4. */
function reduce(x: number): number {
  if (x > LARGE || x < -LARGE) return reduceLarge(x);
  const n = Math.floor(x * TWO_OVER_PI + 0.5);
  const first = x - n * PART_1;
  const second = first - n * PART_2;
  const secondRest = sumError(first, -n * PART_2, second);
  const third = second - n * PART_3;
  const thirdRest = sumError(second, -n * PART_3, third);
  const tail = secondRest + (thirdRest - n * PART_4);
  remainder[0] = third + tail;
  remainder[1] = third - remainder[0] + tail;
  return n & 3;
}

function reduceLarge(x: number): number {
  // An argument of this size is an integer, or becomes one when shifted by 32 bits.
  const magnitude = Math.abs(x);
  const shifted = magnitude < 9007199254740992;
  const integer = BigInt(shifted ? magnitude * 4294967296 : magnitude);
  const bits = shifted ? LARGE_BITS + 32n : LARGE_BITS;
  const product = integer * LARGE_TWO_OVER_PI;
  const quarter = (product + (1n << (bits - 1n))) >> bits;
  const fraction = (product - (quarter << bits)) >> (bits - 200n);
  const high = Number(fraction);
  const low = Number(fraction - BigInt(high));
  const scale = 6.223015277861142e-61;
  const f = high * scale;
  const product0 = f * HALF_PI;
  const tail = productError(f, HALF_PI, product0) + (f * HALF_PI_REST + low * scale * HALF_PI);
  const r = product0 + tail;
  const rest = product0 - r + tail;
  const n = Number(quarter & 3n);
  remainder[0] = x < 0 ? -r : r;
  remainder[1] = x < 0 ? -rest : rest;
  return x < 0 ? (4 - n) & 3 : n;
}

/** sin(r + rest) for |r| <= pi/4. */
function sineSeries(r: number, rest: number): number {
  const z = r * r;
  const series =
    -1 / 6 +
    z *
      (1 / 120 +
        z *
          (-1 / 5040 +
            z *
              (1 / 362880 +
                z *
                  (-1 / 39916800 +
                    z * (1 / 6227020800 + z * (-1 / 1307674368000 + z / 355687428096000))))));
  return r + (z * r * series + rest * (1 - 0.5 * z));
}

/** cos(r + rest) for |r| <= pi/4. */
function cosineSeries(r: number, rest: number): number {
  const z = r * r;
  const halfSquareRest = z > 1e-280 ? 0.5 * productError(r, r, z) : 0;
  const series =
    1 / 24 +
    z *
      (-1 / 720 +
        z *
          (1 / 40320 +
            z *
              (-1 / 3628800 +
                z *
                  (1 / 479001600 +
                    z * (-1 / 87178291200 + z * (1 / 20922789888000 - z / 6402373705728000))))));
  const sum = 1 - 0.5 * z;
  const sumRest = 1 - sum - 0.5 * z;
  return sum + (sumRest + (z * z * series - halfSquareRest - r * rest));
}

export function sin(x: number): number {
  if (x > -0.785 && x < 0.785) return x === 0 ? x : sineSeries(x, 0);
  if (x - x !== 0) return NaN;
  const n = reduce(x);
  const value =
    (n & 1) === 0
      ? sineSeries(remainder[0], remainder[1])
      : cosineSeries(remainder[0], remainder[1]);
  return (n & 2) === 0 ? value : -value;
}

export function cos(x: number): number {
  if (x > -0.785 && x < 0.785) return cosineSeries(x, 0);
  if (x - x !== 0) return NaN;
  const n = reduce(x);
  const value =
    (n & 1) === 0
      ? cosineSeries(remainder[0], remainder[1])
      : sineSeries(remainder[0], remainder[1]);
  return n === 1 || n === 2 ? -value : value;
}
