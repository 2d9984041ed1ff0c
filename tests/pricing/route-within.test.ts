/** One route, refined to a tolerance: as coarse as its own estimate allows, and made again from it. */
import type { Contract, Market, MethodName } from '@/pricing/contract';
import { price, priceRouteWithin } from '@/pricing/index';

const market: Market = { spot: 212.4, rate: 0.026, carry: 'future', volatility: 0.245 };
const put = (exercise: Contract['exercise'], expiry = 0.8): Contract => ({
  payoff: 'vanilla',
  exercise,
  kind: 'put',
  strike: 210,
  expiry,
});

const routes: [Contract['exercise'], MethodName][] = [
  ['european', 'closed-form'],
  ['european', 'heat-crank-nicolson'],
  ['american', 'heat-crank-nicolson'],
  ['american', 'lattice-symmetric'],
  ['american', 'lattice-crr'],
];

test.each(routes)('%s by %s: holds the tolerance, by its own name', (exercise, name) => {
  const contract = put(exercise);
  for (const tolerance of [1e-1, 1e-2, 1e-3]) {
    const result = priceRouteWithin(contract, market, name, tolerance);
    if (!result.ok) throw new Error(result.message);
    expect(result.method.name).toBe(name);
    expect(result.errorEstimate).toBeLessThanOrEqual(tolerance);
    // The settings that it reports give the same bits again.
    expect(price({ contract, market, method: result.method })).toEqual(result);
  }
});

test('what no size of it holds gives the finest within its longest work, and says how far that is', () => {
  const contract = put('american');
  const usual = price({ contract, market, method: { name: 'heat-crank-nicolson' } });
  const result = priceRouteWithin(contract, market, 'heat-crank-nicolson', 1e-12);
  if (!result.ok || !usual.ok) throw new Error('both give a value');
  expect(result.errorEstimate).toBeGreaterThan(1e-12);
  expect(result.errorEstimate).toBeLessThan(usual.errorEstimate ?? 0);
  const { spaceSteps = 0, timeSteps = 0 } = result.method;
  const { spaceSteps: usualSpace = 0, timeSteps: usualTime = 0 } = usual.method;
  expect(spaceSteps * timeSteps).toBeLessThanOrEqual(16 * usualSpace * usualTime);
});

test('a request that cannot be priced is a failure, not a value', () => {
  const result = priceRouteWithin(put('european', -1), market, 'closed-form', 1e-3);
  expect(result).toMatchObject({ ok: false });
  const route = priceRouteWithin(put('american'), market, 'closed-form', 1e-3);
  expect(route).toMatchObject({ ok: false, code: 'method-does-not-price' });
});
