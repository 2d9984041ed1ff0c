import { solveDense } from '@/pricing/numerics/dense';
import type { BoundaryProblem } from '@/pricing/spectral/problem';
import { evaluateResidual, fillGrowth } from '@/pricing/spectral/residual';
import type { SpectralTable } from '@/pricing/spectral/tables';

/** A step takes at most this share of any unknown, which must stay positive. */
const largestShare = 0.7;
/** Residuals at rounding do not fall any more; there is nothing to track back from. */
const roundingOfResidual = 1e-13;
const shortestStep = 1e-3;

/**
 * Newton's iteration for the heights at the nodes, in place; halves a step that did not lessen the
 * largest residual. Stops where the last step moved no height by more than `tolerance` of itself: the
 * error left is about its square. Answers the number of rounds, or null where they did not suffice.
 */
export function solveHeights(
  table: SpectralTable,
  problem: BoundaryProblem,
  height: Float64Array,
  tolerance: number,
  mostRounds: number,
): number | null {
  const { nodes, work } = table;
  const { residual, jacobian, before, step } = work;
  fillGrowth(table, problem.carry);
  let last = Infinity;
  let share = 1;
  for (let round = 1; round <= mostRounds; round++) {
    evaluateResidual(table, problem, height, true);
    const size = largestOf(residual);
    const worse = !(size < last) && last > roundingOfResidual;
    if (round > 1 && worse && share > shortestStep) {
      share *= 0.5;
      for (let i = 0; i < nodes; i++) height[i] = before[i] - share * step[i];
      continue;
    }
    last = size;
    solveDense(nodes, jacobian, residual);
    let largest = 0;
    share = 1;
    for (let i = 0; i < nodes; i++) {
      const change = residual[i] / height[i];
      if (change * share > largestShare) share = largestShare / change;
      if (!(Math.abs(change) <= largest)) largest = Math.abs(change);
    }
    for (let i = 0; i < nodes; i++) {
      before[i] = height[i];
      step[i] = residual[i];
      height[i] -= share * residual[i];
    }
    if (largest < tolerance) return round;
  }
  return null;
}

/** Infinity where a residual is not a number, so that the step before is halved. */
function largestOf(values: Float64Array): number {
  let largest = 0;
  for (let i = 0; i < values.length; i++) {
    const size = Math.abs(values[i]);
    if (!(size < 1e9)) return Infinity;
    if (size > largest) largest = size;
  }
  return largest;
}
