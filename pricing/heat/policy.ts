import {
  factorTridiagonal,
  makeFactors,
  solveTridiagonal,
  type Tridiagonal,
} from '@/pricing/numerics/tridiagonal';

/**
 * Solves "A·x ≥ right, x ≥ obstacle, one of them equal in each row" for any shape of the exercise
 * region, by iteration on the policy: solve with the rows that are exercised now replaced by
 * x = obstacle, choose again row by row, until the choice stays (Howard 1960; for an M-matrix the
 * iterates rise and the number of choices is finite, so it ends). It starts from the region that
 * `before`, the previous time level, exercised, and then mostly needs two or three solves. The
 * solution replaces `right`.
 */
export type PolicySolver = (
  matrix: Tridiagonal,
  right: Float64Array,
  obstacle: Float64Array,
  before: Float64Array,
) => void;

/** A solver for systems of `size` rows; it owns its working arrays, because it runs in each step. */
export function makePolicySolver(size: number): PolicySolver {
  const chosen: Tridiagonal = {
    lower: new Float64Array(size),
    diagonal: new Float64Array(size),
    upper: new Float64Array(size),
  };
  const factors = makeFactors(size);
  const solution = new Float64Array(size);
  const exercised = new Uint8Array(size);
  return (matrix, right, obstacle, before) => {
    for (let i = 0; i < size; i++) exercised[i] = before[i] <= obstacle[i] ? 1 : 0;
    for (let round = 0; round <= size; round++) {
      for (let i = 0; i < size; i++) {
        const stop = exercised[i] === 1;
        chosen.lower[i] = stop ? 0 : matrix.lower[i];
        chosen.diagonal[i] = stop ? 1 : matrix.diagonal[i];
        chosen.upper[i] = stop ? 0 : matrix.upper[i];
        solution[i] = stop ? obstacle[i] : right[i];
      }
      factorTridiagonal(chosen, factors);
      solveTridiagonal(chosen.lower, factors, solution);
      if (!choose(matrix, right, obstacle, solution, exercised)) break;
    }
    right.set(solution);
  };
}

/** Takes the better of holding and exercising in each row; says whether any row changed. */
function choose(
  matrix: Tridiagonal,
  right: Float64Array,
  obstacle: Float64Array,
  solution: Float64Array,
  exercised: Uint8Array,
): boolean {
  const last = right.length - 1;
  let changed = false;
  for (let i = 0; i <= last; i++) {
    let held = matrix.diagonal[i] * solution[i] - right[i];
    if (i > 0) held += matrix.lower[i] * solution[i - 1];
    if (i < last) held += matrix.upper[i] * solution[i + 1];
    const stop = solution[i] - obstacle[i] < held ? 1 : 0;
    if (stop !== exercised[i]) {
      exercised[i] = stop;
      changed = true;
    }
  }
  return changed;
}
