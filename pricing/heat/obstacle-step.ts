import { makePolicySolver } from '@/pricing/heat/policy';
import { factorTridiagonal, makeFactors, solveProjected } from '@/pricing/numerics/tridiagonal';

/** Advances `values` in place and keeps them on or above `obstacle`; the edges are given. */
export type ObstacleStep = (
  values: Float64Array,
  obstacle: Float64Array,
  newLower: number,
  newUpper: number,
) => void;

/**
 * The implicit step of `theta-step.ts` (θ = 1) with early exercise solved exactly in the step: by
 * projection where the exercised nodes are the lowest ones (`oneBoundary`), else by iteration on the
 * exercise policy.
 */
export function makeObstacleStep(
  lambda: number,
  intervals: number,
  oneBoundary: boolean,
): ObstacleStep {
  const inner = intervals - 1;
  const right = new Float64Array(inner);
  const matrix = {
    lower: new Float64Array(inner).fill(-lambda),
    diagonal: new Float64Array(inner).fill(1 + 2 * lambda),
    upper: new Float64Array(inner).fill(-lambda),
  };
  const factors = makeFactors(inner);
  factorTridiagonal(matrix, factors);
  const solveByPolicy = oneBoundary ? null : makePolicySolver(inner);
  return (values, obstacle, newLower, newUpper) => {
    const before = values.subarray(1, intervals);
    const innerObstacle = obstacle.subarray(1, intervals);
    right.set(before);
    right[0] += lambda * newLower;
    right[inner - 1] += lambda * newUpper;
    if (solveByPolicy) solveByPolicy(matrix, right, innerObstacle, before);
    else solveProjected(matrix.lower, factors, right, innerObstacle);
    values[0] = newLower;
    values.set(right, 1);
    values[intervals] = newUpper;
  };
}
