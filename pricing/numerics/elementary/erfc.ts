/**
 * The complementary error function and its scaled form.
 *
 *     erfc(x) = 2/sqrt(pi) * integral from x to infinity of exp(-t^2) dt
 *     erfcx(x) = exp(x^2) erfc(x)
 *
 * |x| < 1/2: 1 - erf(x), erf by its power series, the leading product kept with its rounding error.
 * x >= 1/2: exp(-x^2) F(x) / (1 + 2x), where F(x) = (1 + 2x) erfcx(x) lies between 1.12 and 1.29 and is
 * smooth in w = (x - 3) / (x + 3) (the map of Shepherd & Laframboise 1981). w is cut into five equal
 * pieces, each with a polynomial of degree 13 about its middle; its constant term is held in two
 * parts and the rest is at most 4 % of it, so that the rounding of the rest hardly counts. x^2, the
 * exponential, the product and the quotient are all carried in two parts and rounded once.
 * x <= -1/2: 2 - erfc(-x).
 *
 * Accuracy: erfc at most 0.95 ulp over the whole line, tails and subnormal results included; erfcx at
 * most 2 ulp. Measured against mpmath in tests/pricing/numerics/elementary.test.ts. The coefficients
 * are made by tests/reference/generate/erfc-coefficients.py.
 * Special cases: erfc(-Infinity) = 2, erfc(x) = 0 for x > 27.23; erfcx(x) = Infinity for x < -26.7.
 */
import { productError, scaleByPowerOfTwo, sumError } from './bits';
import { exp, expPair } from './exp';

const TWO_OVER_SQRT_PI = 1.1283791670955126;
const TWO_OVER_SQRT_PI_REST = 1.533545961316588e-17;

const PIECE_START = -0.75;
const PIECE_WIDTH = 0.3125;
/** Constant term in two parts, then the coefficients of the first to the thirteenth power. */
const PIECES = [
  [
    1.2686917927806118, 9.27697211360768e-17, 0.2111028876422674, -0.7190833615212613,
    0.7541824413561411, -0.44450096551435836, 0.14141135627245516, -0.008000094647290564,
    -0.010039389821493145, 0.001764023525631165, 0.0008769222931653886, -0.00016245160424926817,
    -0.00010187107801197611, 7.231986620095534e-6, 1.2412143780682175e-5,
  ],
  [
    1.283626440487407, 6.479577449081598e-17, -0.06509341199978602, -0.2310501516098725,
    0.328775264588822, -0.24452190408075006, 0.10972832004689205, -0.023342855255697372,
    -0.0034246273152681653, 0.0030860785997275163, -4.384343828666455e-5, -0.00035860115361206334,
    1.428178352371734e-5, 4.646599218500408e-5, 9.010463727251217e-7,
  ],
  [
    1.248727295871962, -5.085599349878084e-17, -0.1382281680096708, -0.03608642229952721,
    0.11538860050275818, -0.10894591022701586, 0.06390606138913375, -0.02316758499933086,
    0.002973802778189454, 0.0016653727948033868, -0.000805955877881975, -6.201644250811711e-5,
    0.00012541085346888785, -3.153270693743142e-6, -1.9758787148922283e-5,
  ],
  [
    1.2046591924046046, -1.0059871962715078e-16, -0.13762038035557908, 0.024664363930341687,
    0.028681253574092513, -0.03904471968016692, 0.02844753632942024, -0.014138258345283495,
    0.004434617075380171, -0.0003257479026797725, -0.0004639028885477357, 0.00021023523322020475,
    9.781618714614444e-6, -3.805915004158184e-5, 6.689959251674521e-6,
  ],
  [
    1.1646372384477546, 1.138434017717888e-18, -0.11743713877458013, 0.03559931877061157,
    0.00042367065606506064, -0.010920254224817393, 0.01007289622133298, -0.006111378006723724,
    0.0027145883768649836, -0.0008008710886345413, 5.752667842759148e-5, 8.934730318729192e-5,
    -5.0141187742720594e-5, 5.67981754156001e-6, 7.019839722769152e-6,
  ],
].map((row) => Float64Array.from(row));

const factor = new Float64Array(2);
const pair = new Float64Array(2);

/** Puts (1 + 2x) erfcx(x) into `factor`, for 1/2 <= x <= 30. */
function scaledFactor(x: number): void {
  const w = (x - 3) / (x + 3);
  const piece = Math.min(Math.floor((w - PIECE_START) / PIECE_WIDTH), PIECES.length - 1);
  const v = w - (PIECE_START + (piece + 0.5) * PIECE_WIDTH);
  const c = PIECES[piece];
  let sum = c[14];
  for (let i = 13; i >= 2; i -= 1) sum = sum * v + c[i];
  const small = sum * v + c[1];
  factor[0] = c[0] + small;
  factor[1] = c[0] - factor[0] + small;
}

/** (2/sqrt(pi) - erf(x)/x) / x^2 for |x| <= 1/2, by the power series of erf, without 2/sqrt(pi). */
function erfSeries(z: number): number {
  return (
    1 / 3 -
    z *
      (1 / 10 -
        z *
          (1 / 42 -
            z *
              (1 / 216 -
                z *
                  (1 / 1320 -
                    z *
                      (1 / 9360 -
                        z *
                          (1 / 75600 -
                            z *
                              (1 / 685440 -
                                z *
                                  (1 / 6894720 -
                                    z *
                                      (1 / 76204800 - z * (1 / 918086400 - z / 11975040000))))))))))
  );
}

function erfcNearZero(x: number): number {
  if (x > -1e-17 && x < 1e-17) return 1;
  const z = x * x;
  const leading = TWO_OVER_SQRT_PI * x;
  const small =
    productError(TWO_OVER_SQRT_PI, x, leading) +
    (TWO_OVER_SQRT_PI_REST * x - TWO_OVER_SQRT_PI * x * z * erfSeries(z));
  const sum = 1 - leading;
  return sum + (sumError(1, -leading, sum) - small);
}

/** erfc for 1/2 <= x <= 27.3. */
function erfcOfPositive(x: number): number {
  scaledFactor(x);
  const square = x * x;
  const k = expPair(-square, -productError(x, x, square), pair);
  const product = pair[0] * factor[0];
  const productRest =
    productError(pair[0], factor[0], product) + (pair[0] * factor[1] + pair[1] * factor[0]);
  const divisor = 1 + 2 * x;
  const divisorRest = sumError(1, 2 * x, divisor);
  const quotient = product / divisor;
  const back = quotient * divisor;
  const rest =
    (product -
      back -
      productError(quotient, divisor, back) +
      productRest -
      quotient * divisorRest) /
    divisor;
  return scaleByPowerOfTwo(quotient + rest, k);
}

export function erfc(x: number): number {
  if (x !== x) return x;
  if (x > -0.5 && x < 0.5) return erfcNearZero(x);
  if (x < 0) return x < -6 ? 2 : 2 - erfcOfPositive(-x);
  return x > 27.3 ? 0 : erfcOfPositive(x);
}

/** exp(x^2) erfc(x): keeps the tail of erfc in range, and falls like 1 / (x sqrt(pi)). */
export function erfcx(x: number): number {
  if (x !== x) return x;
  if (x > -0.5 && x < 0.5) return exp(x * x) * erfcNearZero(x);
  if (x >= 0.5) {
    if (x > 30) return erfcxFar(x);
    scaledFactor(x);
    return factor[0] / (1 + 2 * x);
  }
  if (x < -26.7) return Infinity;
  const square = x * x;
  const k = expPair(square, productError(x, x, square), pair);
  return scaleByPowerOfTwo(pair[0] * (2 - erfcOfPositive(-x)), k);
}

/** The asymptotic series to its seventh term, for x > 30. */
function erfcxFar(x: number): number {
  const u = 0.5 / (x * x);
  const leading = (0.5 * TWO_OVER_SQRT_PI) / x;
  return (
    leading - leading * u * (1 - 3 * u * (1 - 5 * u * (1 - 7 * u * (1 - 9 * u * (1 - 11 * u)))))
  );
}
