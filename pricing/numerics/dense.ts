/**
 * Solves matrix·x = right by Gauss's elimination with the largest pivot of each column. `matrix` (row
 * by row, `size` squared) is overwritten, and `right` becomes the solution. A singular matrix
 * gives numbers that are not finite, which the caller has to look for anyway.
 */
export function solveDense(size: number, matrix: Float64Array, right: Float64Array): void {
  for (let i = 0; i < size; i++) {
    let pivot = i;
    for (let k = i + 1; k < size; k++) {
      if (Math.abs(matrix[k * size + i]) > Math.abs(matrix[pivot * size + i])) pivot = k;
    }
    if (pivot !== i) swapRows(size, matrix, right, i, pivot);
    const inverse = 1 / matrix[i * size + i];
    for (let k = i + 1; k < size; k++) {
      const factor = matrix[k * size + i] * inverse;
      for (let c = i + 1; c < size; c++) matrix[k * size + c] -= factor * matrix[i * size + c];
      right[k] -= factor * right[i];
    }
  }
  for (let i = size - 1; i >= 0; i--) {
    let sum = right[i];
    for (let c = i + 1; c < size; c++) sum -= matrix[i * size + c] * right[c];
    right[i] = sum / matrix[i * size + i];
  }
}

function swapRows(
  size: number,
  matrix: Float64Array,
  right: Float64Array,
  a: number,
  b: number,
): void {
  for (let c = 0; c < size; c++) {
    const kept = matrix[a * size + c];
    matrix[a * size + c] = matrix[b * size + c];
    matrix[b * size + c] = kept;
  }
  const kept = right[a];
  right[a] = right[b];
  right[b] = kept;
}
