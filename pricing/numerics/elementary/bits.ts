/**
 * Access to the bits of a double and exact arithmetic on pairs of doubles: the common ground of the
 * elementary functions. Nothing here rounds in a way that depends on the engine.
 */

const double = new Float64Array(1);
const words = new Int32Array(double.buffer);
/** A machine that stores the low word first keeps the high word at index 1. */
const highIndex = new Uint8Array(new Uint16Array([1]).buffer)[0] === 1 ? 1 : 0;

/** Sign, exponent and the first 20 bits of the fraction, as a signed 32-bit integer. */
export function highWord(x: number): number {
  double[0] = x;
  return words[highIndex];
}

/** `x` with another high word: how a number is scaled to a given binary exponent. */
export function withHighWord(x: number, high: number): number {
  double[0] = x;
  words[highIndex] = high;
  return double[0];
}

/** 2^k for -1022 <= k <= 1023. */
function powerOfTwo(k: number): number {
  double[0] = 0;
  words[highIndex] = (1023 + k) << 20;
  return double[0];
}

/**
 * y * 2^k for 0.5 <= |y| <= 2 and |k| <= 1100, rounded once: a subnormal result is reached by an
 * exact scaling followed by one that rounds, and an overflow is Infinity.
 */
export function scaleByPowerOfTwo(y: number, k: number): number {
  if (k < -1021) return y * powerOfTwo(k + 1000) * powerOfTwo(-1000);
  if (k > 1022) return y * powerOfTwo(k - 1) * 2;
  return y * powerOfTwo(k);
}

/** a + b - sum, exactly, where `sum` is the rounded a + b (Knuth's two-sum). */
export function sumError(a: number, b: number, sum: number): number {
  const virtual = sum - a;
  return a - (sum - virtual) + (b - virtual);
}

/**
 * a * b - product, exactly, where `product` is the rounded a * b (Dekker, with Veltkamp's split).
 * Valid while neither factor exceeds 1e299 and the product is above 1e-290.
 */
export function productError(a: number, b: number, product: number): number {
  const scaledA = a * 134217729;
  const highA = scaledA - (scaledA - a);
  const lowA = a - highA;
  const scaledB = b * 134217729;
  const highB = scaledB - (scaledB - b);
  const lowB = b - highB;
  return lowA * lowB - (product - highA * highB - lowA * highB - highA * lowB);
}
