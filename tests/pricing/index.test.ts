/** The engine's door: what is chosen when nothing is said, tolerances, routes and their verdict. */
import type { Contract, Market, PricingSuccess } from '@/pricing/contract';
import {
  compareRoutes,
  engineVersion,
  methodSummaries,
  price,
  priceRoutes,
  routesFor,
} from '@/pricing/index';
import { closedForm } from '@/pricing/methods/closed-form';

const european: Contract = {
  payoff: 'vanilla',
  exercise: 'european',
  kind: 'put',
  strike: 100,
  expiry: 1,
};
const american: Contract = { ...european, exercise: 'american' };
const market: Market = { spot: 98, rate: 0.05, yield: 0.02, volatility: 0.25 };

function priced(input: unknown): PricingSuccess {
  const result = price(input);
  if (!result.ok) throw new Error(result.message);
  return result;
}

it('chooses the closed form where there is one, else the grid', () => {
  expect(priced({ contract: european, market }).method.name).toBe('closed-form');
  expect(priced({ contract: american, market }).method.name).toBe('heat-crank-nicolson');
});

it.each([undefined, null, 7, 'price', [], {}, { contract: european }])(
  'answers %p with a failure, never a throw',
  (input) => {
    expect(price(input)).toMatchObject({ ok: false, message: expect.stringMatching(/\.$/) });
  },
);

describe('a tolerance', () => {
  it.each([1e-2, 1e-3, 1e-4])('of %p is held, by the estimate and in truth', (tolerance) => {
    const result = priced({ contract: american, market, method: { tolerance } });
    expect(result.errorEstimate).toBeLessThanOrEqual(tolerance);
    const sizes = { spaceSteps: 1600, timeSteps: 800 };
    const fine = priced({
      contract: american,
      market,
      method: { name: 'heat-crank-nicolson', ...sizes },
    });
    expect(Math.abs(result.value - fine.value)).toBeLessThanOrEqual(tolerance);
  });

  it('is met by no more work than it needs', () => {
    const sizeOf = (tolerance: number) => {
      const { method } = priced({ contract: american, market, method: { tolerance } });
      return (method.spaceSteps ?? 0) * (method.timeSteps ?? 0) + (method.steps ?? 0);
    };
    expect(sizeOf(1e-2)).toBeLessThan(sizeOf(1e-4));
  });

  it('of a European contract costs one formula', () => {
    const result = priced({ contract: european, market, method: { tolerance: 1e-6 } });
    expect(result.method).toEqual({ name: 'closed-form' });
  });

  it('that nothing holds is a failure that names the best there is', () => {
    const result = price({ contract: american, market, method: { tolerance: 1e-12 } });
    expect(result).toMatchObject({ ok: false, code: 'tolerance-not-reached' });
    expect(result.ok ? '' : result.message).toMatch(/smallest estimate reached is \d/);
  });
});

describe('routes', () => {
  it('are three, the most accurate first', () => {
    expect(routesFor(european, market)).toEqual([
      'closed-form',
      'heat-crank-nicolson',
      'lattice-symmetric',
    ]);
    expect(routesFor(american, market)).toEqual([
      'heat-crank-nicolson',
      'lattice-symmetric',
      'lattice-crr',
    ]);
  });

  it.each([european, american])('of a $exercise put agree within a thousandth', (contract) => {
    const routes = priceRoutes(contract, market);
    expect(routes.map(({ name }) => name)).toEqual(routesFor(contract, market));
    expect(compareRoutes(routes, 1e-3)).toMatchObject({ verdict: 'agree', refuted: false });
  });

  it('that failed are left out of the verdict', () => {
    const [first] = priceRoutes(european, market);
    const failed = {
      ok: false,
      code: 'numerical-failure',
      path: 'method.steps',
      message: 'No.',
    } as const;
    const routes = [first, { name: 'lattice-crr', result: failed } as const];
    expect(compareRoutes(routes, 1).verdict).toBe('one-route');
  });
});

it('lists every method with words for its users', () => {
  expect(methodSummaries.length).toBeGreaterThanOrEqual(4);
  for (const { label, summary } of methodSummaries) {
    expect(label).toMatch(/^[A-Z]/);
    expect(summary.length).toBeGreaterThan(60);
  }
});

it('prices put and call of two boundaries (negative rates, yield below them) alike by all routes', () => {
  const negative = { spot: 95, rate: -0.02, yield: -0.06, volatility: 0.2 };
  const routes = priceRoutes({ ...american, expiry: 2 }, negative);
  expect(compareRoutes(routes, 5e-3)).toMatchObject({ verdict: 'agree', refuted: false });
  const floor = closedForm.price({ ...european, expiry: 2 }, negative, {});
  const [{ result }] = routes;
  if (!result.ok || !floor.ok) throw new Error('both are priced');
  expect(result.value).toBeGreaterThan(floor.value + 0.01);
});

it('has a version to record', () => expect(engineVersion).toMatch(/^\d+\.\d+\.\d+$/));
