/** The fitted order against scipy's linregress and Student's t (`reference/generate/order-fit.py`). */
import { fitOrder } from '@/pricing/study/fit-order';
import reference from '@/tests/reference/order-fit.json';

it.each(reference.cases)('$id', ({ sizes, errors, expected }) => {
  const fit = fitOrder(sizes, errors);
  expect(Math.abs(fit.order - expected.order)).toBeLessThan(1e-11);
  expect(Math.abs(fit.standardError - expected.standardError)).toBeLessThan(1e-11);
  // The quantile comes from jstat, which is good to about 1e-9.
  expect(Math.abs(fit.halfWidth / expected.halfWidth - 1)).toBeLessThan(1e-8);
});

it('finds a pure power exactly', () => {
  const sizes = [10, 20, 40, 80];
  const fit = fitOrder(
    sizes,
    sizes.map((n) => 7 / n ** 3),
  );
  expect(fit.order).toBeCloseTo(3, 12);
  expect(fit.standardError).toBeLessThan(1e-12);
});
