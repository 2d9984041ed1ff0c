import { jStat } from 'jstat';
import { log } from '@/pricing/numerics/elementary';

export type FittedOrder = { order: number; standardError: number; halfWidth: number };

/**
 * The order p of errors that fall like C·n^(−p): the slope of the straight line through the points
 * (ln n, −ln e) by least squares, its standard error √(Σ residual² / (m − 2) / Σ(x − x̄)²), and half
 * the width of its 95 % interval by Student's t with m − 2 degrees of freedom. At least three
 * points of different sizes with errors above zero.
 */
export function fitOrder(sizes: readonly number[], errors: readonly number[]): FittedOrder {
  const count = sizes.length;
  const x = sizes.map((size) => log(size));
  const y = errors.map((error) => -log(error));
  const meanX = mean(x);
  const meanY = mean(y);
  let spread = 0;
  let shared = 0;
  for (let i = 0; i < count; i++) {
    spread += (x[i] - meanX) * (x[i] - meanX);
    shared += (x[i] - meanX) * (y[i] - meanY);
  }
  const order = shared / spread;
  let residual = 0;
  for (let i = 0; i < count; i++) {
    const gap = y[i] - meanY - order * (x[i] - meanX);
    residual += gap * gap;
  }
  const standardError = Math.sqrt(residual / (count - 2) / spread);
  return { order, standardError, halfWidth: jStat.studentt.inv(0.975, count - 2) * standardError };
}

function mean(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}
