import { erfc, exp } from '@/pricing/numerics/elementary';
import type { LocalValue } from '@/pricing/numerics/interpolation';
import type { Boundary } from '@/pricing/spectral/boundary';
import { logStartOf, type BoundaryProblem } from '@/pricing/spectral/problem';
import { lookedUp } from '@/pricing/spectral/tables';

const INVERSE_SQRT_TWO_PI = 0.3989422804014327;
const SQRT_HALF = 0.7071067811865476;

/** ln(B/K) now, a whole expiry ahead. */
export function logBoundaryNow(problem: BoundaryProblem, { height }: Boundary): number {
  return logStartOf(problem) - Math.sqrt(height[0]);
}

/**
 * What early exercise adds to the European put, per unit of strike (Kim 1990), at x = ln(S/K) above
 * the boundary: interest on the strike less yield of the spot while it is exercised,
 *   ∫ ρ·e^(−ρu)·Φ(−d₋) − κ·eˣ·e^(−κu)·Φ(−d₊) du,  d± of S against B(1 − u) over u.
 * The boundary is the same for every spot, so that the derivatives in x are those of d± and eˣ.
 */
export function earlyExercisePremium(
  problem: BoundaryProblem,
  { table, height }: Boundary,
  x: number,
): LocalValue {
  const { points, sine, weight, lookUp } = table.premium;
  const { rate, carry, deviation } = problem;
  const start = logStartOf(problem);
  const spot = exp(x);
  let value = 0;
  let first = 0;
  let second = 0;
  for (let j = 0; j < points; j++) {
    const h = lookedUp(table.nodes, lookUp, j, height);
    const logBoundary = start - (h > 0 ? Math.sqrt(h) : 0);
    const s = sine[j];
    const vs = deviation * s;
    const u = s * s;
    const minus = (x - logBoundary) / vs + ((rate - carry) * s) / deviation - 0.5 * vs;
    const interest = rate * exp(-rate * u);
    const density = (INVERSE_SQRT_TWO_PI * exp(-rate * u - 0.5 * minus * minus)) / vs;
    // φ(d₊) of the spot leg is φ(d₋) of the strike leg times the boundary.
    const yielded = carry * exp(logBoundary) * density;
    const jump = rate * density - yielded;
    const dividend =
      carry === 0 ? 0 : carry * spot * exp(-carry * u) * 0.5 * erfc((minus + vs) * SQRT_HALF);
    value += weight[j] * (interest * 0.5 * erfc(minus * SQRT_HALF) - dividend);
    first -= weight[j] * (jump + dividend);
    second += weight[j] * ((jump * minus) / vs + yielded - dividend);
  }
  return { value, first, second };
}
