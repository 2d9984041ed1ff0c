import { cos } from '@/pricing/numerics/elementary';

const PI = 3.141592653589793;

export type Quadrature = { points: Float64Array; weights: Float64Array };

/**
 * The rule of Gauss and Legendre on an interval, points rising. The roots of the Legendre polynomial
 * come by Newton's iteration from the cosines that Tricomi's estimate gives; exact for polynomials
 * of degree 2·count − 1.
 */
export function gaussLegendre(count: number, from: number, to: number): Quadrature {
  const points = new Float64Array(count);
  const weights = new Float64Array(count);
  for (let i = 0; i < count; i++) {
    let root = cos((PI * (i + 0.75)) / (count + 0.5));
    let slope = 0;
    for (let round = 0; round < 20; round++) {
      let value = 1;
      let before = 0;
      for (let k = 0; k < count; k++) {
        const earlier = before;
        before = value;
        value = ((2 * k + 1) * root * before - k * earlier) / (k + 1);
      }
      slope = (count * (root * value - before)) / (root * root - 1);
      const step = value / slope;
      root -= step;
      if (Math.abs(step) < 1e-15) break;
    }
    points[count - 1 - i] = from + (to - from) * 0.5 * (1 + root);
    weights[count - 1 - i] = (to - from) / ((1 - root * root) * slope * slope);
  }
  return { points, weights };
}
