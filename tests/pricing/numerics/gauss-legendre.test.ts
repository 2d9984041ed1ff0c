/** Points and weights as printed in Abramowitz & Stegun, Handbook of Mathematical Functions, table 25.4. */
import { gaussLegendre } from '@/pricing/numerics/gauss-legendre';

it('has the five points and weights of the printed table', () => {
  const { points, weights } = gaussLegendre(5, -1, 1);
  const printed = [
    { point: 0, weight: 0.568888888888889 },
    { point: 0.538469310105683, weight: 0.478628670499366 },
    { point: 0.906179845938664, weight: 0.236926885056189 },
  ];
  printed.forEach(({ point, weight }, i) => {
    expect(points[2 + i]).toBeCloseTo(point, 15);
    expect(points[2 - i]).toBeCloseTo(-point, 15);
    expect(weights[2 + i]).toBeCloseTo(weight, 15);
  });
});

it.each([2, 7, 24, 120])('with %i points is exact for a polynomial of the highest degree', (n) => {
  const { points, weights } = gaussLegendre(n, 0, 1);
  const degree = 2 * n - 1;
  const integral = points.reduce((sum, x, i) => sum + weights[i] * x ** degree, 0);
  expect(integral * (degree + 1)).toBeCloseTo(1, 12);
  expect(weights.reduce((sum, weight) => sum + weight, 0)).toBeCloseTo(1, 13);
});
