/** Hilbert's matrix has an inverse of whole numbers in closed form (M.-D. Choi, Amer. Math. Monthly 90, 1983). */
import { solveDense } from '@/pricing/numerics/dense';

it('solves Hilbert’s matrix of four rows', () => {
  const matrix = Float64Array.from({ length: 16 }, (_, at) => 1 / ((at >> 2) + (at & 3) + 1));
  const right = Float64Array.of(1, 0, 0, 0);
  solveDense(4, matrix, right);
  [16, -120, 240, -140].forEach((number, i) => expect(right[i]).toBeCloseTo(number, 9));
});

it('takes another row where a pivot is zero', () => {
  const right = Float64Array.of(3, 5);
  solveDense(2, Float64Array.of(0, 1, 1, 0), right);
  expect([...right]).toEqual([5, 3]);
});
