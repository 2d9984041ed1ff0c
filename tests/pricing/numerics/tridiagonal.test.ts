/** Tridiagonal solvers and the two ways to keep above an obstacle, checked by their own equations. */
import fc from 'fast-check';
import { makePolicySolver } from '@/pricing/heat/policy';
import { interpolate, nodeBelow } from '@/pricing/numerics/interpolation';
import {
  factorTridiagonal,
  makeFactors,
  solveProjected,
  solveTridiagonal,
  type Tridiagonal,
} from '@/pricing/numerics/tridiagonal';

const rows = fc.integer({ min: 2, max: 40 }).chain((size) =>
  fc.array(
    fc.record({
      lower: fc.double({ min: 0, max: 5, noNaN: true }),
      upper: fc.double({ min: 0, max: 5, noNaN: true }),
      right: fc.double({ min: -1, max: 1, noNaN: true }),
    }),
    { minLength: size, maxLength: size },
  ),
);

/** An M-matrix, as every grid makes: 1 + what flows out on the diagonal. */
function systemOf(given: { lower: number; upper: number; right: number }[]) {
  const matrix: Tridiagonal = {
    lower: Float64Array.from(given, ({ lower }) => -lower),
    diagonal: Float64Array.from(given, ({ lower, upper }) => 1 + lower + upper),
    upper: Float64Array.from(given, ({ upper }) => -upper),
  };
  return { matrix, right: Float64Array.from(given, ({ right }) => right) };
}

function residual({ lower, diagonal, upper }: Tridiagonal, x: Float64Array, right: Float64Array) {
  return x.map((value, i) => {
    const left = i > 0 ? lower[i] * x[i - 1] : 0;
    const next = i < x.length - 1 ? upper[i] * x[i + 1] : 0;
    return diagonal[i] * value + left + next - right[i];
  });
}

const largest = (values: Float64Array) => Math.max(...values.map(Math.abs));

it('solves what it was given', () => {
  fc.assert(
    fc.property(rows, (given) => {
      const { matrix, right } = systemOf(given);
      const factors = makeFactors(right.length);
      factorTridiagonal(matrix, factors);
      const x = right.slice();
      solveTridiagonal(matrix.lower, factors, x);
      expect(largest(residual(matrix, x, right))).toBeLessThan(1e-13);
    }),
    { seed: 20260103 },
  );
});

it('by policy, every row holds its equation or its obstacle and breaks neither', () => {
  fc.assert(
    fc.property(rows, fc.double({ min: 0, max: 9, noNaN: true }), (given, wave) => {
      const { matrix, right } = systemOf(given);
      const obstacle = right.map((_, i) => Math.sin(wave * i));
      const x = right.slice();
      makePolicySolver(right.length)(matrix, x, obstacle, right);
      const held = residual(matrix, x, right);
      for (let i = 0; i < x.length; i++) {
        expect(x[i] - obstacle[i]).toBeGreaterThanOrEqual(-1e-13);
        expect(held[i]).toBeGreaterThanOrEqual(-1e-12);
        expect(Math.min(x[i] - obstacle[i], held[i])).toBeLessThan(1e-12);
      }
    }),
    { seed: 20260104 },
  );
});

it('by projection, a put’s one exercise region gives the same as by policy', () => {
  const size = 60;
  const given = Array.from({ length: size }, () => ({ lower: 3, upper: 2.5, right: 0 }));
  const { matrix } = systemOf(given);
  const obstacle = Float64Array.from({ length: size }, (_, i) => 1 - Math.exp((i - 30) / 15));
  const before = obstacle.map((intrinsic) => Math.max(intrinsic, 0));
  const right = before.map((value) => value * 0.99);
  const byPolicy = right.slice();
  makePolicySolver(size)(matrix, byPolicy, obstacle, before);
  const factors = makeFactors(size);
  factorTridiagonal(matrix, factors);
  const byProjection = right.slice();
  solveProjected(matrix.lower, factors, byProjection, obstacle);
  expect(largest(byPolicy.map((value, i) => value - byProjection[i]))).toBeLessThan(1e-13);
});

it('interpolation is exact for polynomials of its degree, derivatives too', () => {
  const nodes = Float64Array.of(-1, 0, 0.5, 2, 3, 5);
  const f = (x: number) => 1 + x * (2 + x * (-1 + x * (0.5 + x * (0.25 - 0.125 * x))));
  const { value, first, second } = interpolate(nodes, nodes.map(f), 0, 6, 1.5);
  expect(value).toBeCloseTo(f(1.5), 13);
  expect(first).toBeCloseTo(2 - 2 * 1.5 + 1.5 * 1.5 ** 2 + 1.5 ** 3 - 0.625 * 1.5 ** 4, 12);
  expect(second).toBeCloseTo(-2 + 3 * 1.5 + 3 * 1.5 ** 2 - 2.5 * 1.5 ** 3, 12);
});

it('finds the node below, and the ends', () => {
  const nodes = Float64Array.of(-1, 0, 2, 3);
  expect([-5, -1, -0.5, 0, 2.5, 3, 9].map((x) => nodeBelow(nodes, x))).toEqual([
    0, 0, 0, 1, 2, 2, 2,
  ]);
});
