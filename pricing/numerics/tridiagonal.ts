/**
 * Tridiagonal systems, the inner loop of every grid.
 *
 * Row i reads lower[i]·x[i−1] + diagonal[i]·x[i] + upper[i]·x[i+1] = right[i]. The matrices of the
 * grids are strictly diagonally dominant, so elimination without exchange of rows is stable
 * (G. H. Golub, C. F. Van Loan, Matrix Computations, section 4.3). All arrays belong to the caller
 * and nothing is allocated here, because these loops run once per time step.
 */

export type Tridiagonal = { lower: Float64Array; diagonal: Float64Array; upper: Float64Array };

/**
 * Eliminates from the last row up, so that x[i] = (right'[i] − lower[i]·x[i−1]) · inverse[i] runs
 * from the first row down: the order that the projection of an exercise region at the low end
 * needs. `weight[i]` carries the right side of row i+1 into row i.
 */
export type TridiagonalFactors = { inverse: Float64Array; weight: Float64Array };

export function makeFactors(size: number): TridiagonalFactors {
  return { inverse: new Float64Array(size), weight: new Float64Array(size) };
}

export function factorTridiagonal(matrix: Tridiagonal, factors: TridiagonalFactors): void {
  const { lower, diagonal, upper } = matrix;
  const { inverse, weight } = factors;
  const last = diagonal.length - 1;
  inverse[last] = 1 / diagonal[last];
  weight[last] = 0;
  for (let i = last - 1; i >= 0; i--) {
    const carried = upper[i] * inverse[i + 1];
    weight[i] = carried;
    inverse[i] = 1 / (diagonal[i] - carried * lower[i + 1]);
  }
}

/** Solves in place: `right` holds the right side before and the solution after. */
export function solveTridiagonal(
  lower: Float64Array,
  factors: TridiagonalFactors,
  right: Float64Array,
): void {
  const { inverse, weight } = factors;
  const last = right.length - 1;
  for (let i = last - 1; i >= 0; i--) right[i] -= weight[i] * right[i + 1];
  let previous = 0;
  for (let i = 0; i <= last; i++) {
    previous = (right[i] - lower[i] * previous) * inverse[i];
    right[i] = previous;
  }
}

/**
 * Solves the linear complementarity problem "A·x ≥ right, x ≥ obstacle, one of them equal in each
 * row" in place, where the rows that meet the obstacle are the first ones and connected (Brennan
 * and Schwartz 1977; proved for such regions by Jaillet, Lamberton and Lapeyre 1990).
 */
export function solveProjected(
  lower: Float64Array,
  factors: TridiagonalFactors,
  right: Float64Array,
  obstacle: Float64Array,
): void {
  const { inverse, weight } = factors;
  const last = right.length - 1;
  for (let i = last - 1; i >= 0; i--) right[i] -= weight[i] * right[i + 1];
  let previous = 0;
  for (let i = 0; i <= last; i++) {
    const free = (right[i] - lower[i] * previous) * inverse[i];
    previous = free > obstacle[i] ? free : obstacle[i];
    right[i] = previous;
  }
}
