/**
 * The explicit and the implicit grid: the reference cases, the walk that an explicit step is, and
 * the limit past which it is one no longer.
 */
import type { Contract, SpotMarket } from '@/pricing/contract';
import type { MethodSizes } from '@/pricing/method';
import { price } from '@/pricing/index';
import { heatExplicit } from '@/pricing/methods/heat-explicit';
import { heatImplicit } from '@/pricing/methods/heat-implicit';
import american from '@/tests/reference/american.json';
import european from '@/tests/reference/european.json';
import { contractAndMarket } from './request-arbitraries';

const schemes = [heatExplicit, heatImplicit];

const put: Contract = {
  payoff: 'vanilla',
  exercise: 'european',
  kind: 'put',
  strike: 100,
  expiry: 1,
};
const market: SpotMarket = { spot: 100, rate: 0.05, yield: 0.02, volatility: 0.2 };

function valueOf(sizes: MethodSizes, contract = put, at = market): number {
  const result = heatExplicit.price(contract, at, sizes);
  if (!result.ok) throw new Error(result.message);
  return result.value;
}

describe.each(schemes)('$name', (method) => {
  // american.json: collocation of the exercise boundary with 128 nodes, confirmed by a fine grid.
  const rows = american.cases.map(({ id, request, expected }) => {
    const terms = contractAndMarket(request);
    const result = method.price(terms.contract, terms.market, {});
    if (!result.ok) throw new Error(`${id}: ${result.message}`);
    const error = Math.abs(result.value - Number(expected.value));
    return { id, strike: terms.contract.strike, error, estimate: result.errorEstimate ?? 0 };
  });

  it('is within 1e-4 of the strike on the American reference cases', () => {
    expect(rows.filter(({ error, strike }) => error > 1e-4 * strike)).toEqual([]);
  });

  it('estimates at least its error in 95 % of them, and at most thirty times it in 80 %', () => {
    const covered = rows.filter(({ error, estimate }) => estimate >= error);
    expect(covered.length).toBeGreaterThanOrEqual(0.95 * rows.length);
    const sharp = rows.filter(({ error, estimate }) => estimate <= 30 * error);
    expect(sharp.length).toBeGreaterThanOrEqual(0.8 * rows.length);
  });

  // european.json: mpmath, 60 digits.
  it('is within 1e-5 of strike or spot, the larger, on the European reference cases', () => {
    const wrong = european.cases.filter(({ request, expected }) => {
      const terms = contractAndMarket(request);
      const result = method.price(terms.contract, terms.market, {});
      if (!result.ok) throw new Error(result.message);
      return (
        Math.abs(result.value - Number(expected.value)) >
        1e-5 * Math.max(terms.contract.strike, terms.market.spot)
      );
    });
    expect(wrong.map(({ id }) => id)).toEqual([]);
  });
});

describe('the explicit step', () => {
  it('is the expectation of the payoff over a walk that moves with probability λ each way', () => {
    // Forward at the strike, so that the spot is a node; 8 moves do not reach the edge at 16.
    const flat: SpotMarket = { spot: 100, rate: 0, yield: 0, volatility: 0.2 };
    const [intervals, moves] = [32, 8];
    const step = (2 * (7 * 0.2 + 0.5 * 0.2 ** 2)) / intervals;
    const lambda = (0.5 * 0.2 ** 2) / moves / step ** 2;
    let distribution = [1];
    for (let m = 0; m < moves; m++) {
      const before = distribution;
      const at = (i: number) => before[i] ?? 0;
      distribution = Array.from(
        { length: before.length + 2 },
        (_, i) => lambda * at(i) + (1 - 2 * lambda) * at(i - 1) + lambda * at(i - 2),
      );
    }
    const heat = (y: number) => 2 * Math.sinh(Math.max(-y, 0) / 2);
    const atStrike = (8 * Math.sinh(step / 8) ** 2) / step;
    const mean = distribution.reduce((sum, weight, i) => {
      const y = (i - moves) * step;
      return sum + weight * (i === moves ? atStrike : heat(y));
    }, 0);
    expect(distribution.reduce((sum, weight) => sum + weight, 0)).toBeCloseTo(1, 14);
    const plain = valueOf({ spaceSteps: 32, timeSteps: 8, smoothing: 'none' }, put, flat);
    expect(plain).toBeCloseTo(100 * Math.exp(-(0.2 ** 2) / 8) * mean, 12);
  });

  const sizes = { spaceSteps: 192, timeSteps: 100 };

  it('is refused past k/h² = ½, with a number of time steps that will do', () => {
    const asked = { contract: put, market, method: { name: 'heat-explicit', ...sizes } };
    const refused = price(asked);
    if (refused.ok) throw new Error('it was priced');
    expect(refused).toMatchObject({ code: 'past-stability-limit', path: 'method.timeSteps' });
    const advised = Number(/at least (\d+) time steps/.exec(refused.message)?.[1]);
    expect(price({ ...asked, method: { ...asked.method, timeSteps: advised } }).ok).toBe(true);
    const few = price({ ...asked, method: { ...asked.method, timeSteps: advised - 16 } });
    expect(few.ok).toBe(false);
  });

  it('advises fewer space steps where no allowed number of time steps will do', () => {
    const method = { name: 'heat-explicit', spaceSteps: 2000, timeSteps: 4000 } as const;
    const refused = price({ contract: put, market, method });
    expect(refused).toMatchObject({ code: 'past-stability-limit', path: 'method.spaceSteps' });
  });

  it('runs past the limit when asked to, says why it is unstable, and is', () => {
    const result = heatExplicit.price(put, market, { ...sizes, beyondStability: true });
    if (!result.ok) throw new Error(result.message);
    const { stabilityNumber: lambda, amplification, stayProbability } = result.diagnostics;
    expect(lambda).toBeGreaterThan(0.5);
    expect(stayProbability).toBeLessThan(0);
    // |1 − 4λs| of the shortest wave of the grid, s = sin²(π(N − 1)/2N).
    const shortest = Math.sin((Math.PI * 191) / 384) ** 2;
    expect(amplification).toBeCloseTo(4 * lambda * shortest - 1, 12);
    expect(Math.abs(result.value)).toBeGreaterThan(1e6);
    expect(result.method.beyondStability).toBe(true);
    expect(result.warnings).toMatchObject([{ code: 'past-stability-limit' }]);
  });

  it('ends in a failure, never in Infinity, where it grows beyond what a double holds', () => {
    const far = { spaceSteps: 4000, timeSteps: 1000, beyondStability: true };
    const result = heatExplicit.price(put, market, far);
    expect(result).toMatchObject({ ok: false, code: 'numerical-failure' });
  });

  it('takes the setting as true or false only', () => {
    const method = { name: 'heat-explicit', beyondStability: 'yes' };
    const refused = price({ contract: put, market, method });
    expect(refused).toMatchObject({ ok: false, path: 'method.beyondStability' });
  });
});

it('the implicit grid has no such limit', () => {
  const coarse = heatImplicit.price(put, market, { spaceSteps: 1600, timeSteps: 100 });
  if (!coarse.ok) throw new Error(coarse.message);
  expect(coarse.diagnostics.stabilityNumber).toBeGreaterThan(50);
  expect(coarse.diagnostics.amplification).toBeLessThan(1);
  expect(Math.abs(coarse.value - 6.330080627549926)).toBeLessThan(1e-3);
});
