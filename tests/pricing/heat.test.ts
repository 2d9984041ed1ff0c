/**
 * The heat step against its amplification factors (mpmath, 60 digits), and the observed order of
 * the solver that is made of it.
 */
import type { Contract, SpotMarket } from '@/pricing/contract';
import { compactTheta, makeThetaStep } from '@/pricing/heat/theta-step';
import { closedForm } from '@/pricing/methods/closed-form';
import { heatCrankNicolson } from '@/pricing/methods/heat-crank-nicolson';
import type { MethodSizes } from '@/pricing/method';
import reference from '@/tests/reference/heat.json';

function thetaOf(scheme: string, lambda: number): number {
  switch (scheme) {
    case 'explicit':
      return 0;
    case 'implicit':
      return 1;
    case 'crank-nicolson':
      return 0.5;
    case 'compact':
      return compactTheta(lambda);
    default:
      throw new Error(`no scheme is called ${scheme}`);
  }
}

function sineMode(intervals: number, mode: number): Float64Array {
  return Float64Array.from({ length: intervals + 1 }, (_, i) =>
    Math.sin((mode * Math.PI * i) / intervals),
  );
}

const stepped = reference.cases.flatMap(({ id, inputs, expected }) => {
  const { scheme, lambda, intervals, mode, steps } = inputs;
  const { amplification, amplificationToSteps, nodes } = expected;
  return scheme && lambda && intervals && mode && steps && amplification && nodes
    ? [{ id, scheme, lambda, intervals, mode, steps, amplification, amplificationToSteps, nodes }]
    : [];
});

describe('sin(mode·πx) under the step that the solver uses', () => {
  it('has rows of all four schemes', () => {
    expect(new Set(stepped.map(({ scheme }) => scheme)).size).toBe(4);
  });

  it.each(stepped)('$id: $scheme, λ = $lambda, mode $mode is multiplied by its factor', (row) => {
    const { intervals, mode, lambda } = row;
    const before = sineMode(intervals, mode);
    const after = before.slice();
    makeThetaStep(lambda, thetaOf(row.scheme, lambda), intervals)(after, 0, 0);
    const factor = Number(row.amplification);
    const largest = Math.max(...before.map((value, i) => Math.abs(after[i] - factor * value)));
    expect(largest).toBeLessThan(1e-13);
  });

  it.each(stepped)('$id: and $steps steps end where they should', (row) => {
    const values = sineMode(row.intervals, row.mode);
    const step = makeThetaStep(row.lambda, thetaOf(row.scheme, row.lambda), row.intervals);
    for (let m = 0; m < row.steps; m++) step(values, 0, 0);
    // Rounding feeds every mode; an unstable step multiplies the worst of them in the same measure.
    const scale = Math.max(1, Math.abs(Number(row.amplificationToSteps)));
    for (const { i, u } of row.nodes) {
      expect(Math.abs(values[i] - Number(u))).toBeLessThan(1e-13 * scale * row.steps);
    }
  });
});

describe('the explicit step', () => {
  const limits = reference.cases.flatMap(({ id, inputs, expected }) =>
    inputs.quantity === 'stability-limit' && inputs.intervals && expected.lambdaMax
      ? [{ id, intervals: inputs.intervals, limit: Number(expected.lambdaMax) }]
      : [],
  );

  const growth = (intervals: number, lambda: number) => {
    const values = sineMode(intervals, intervals - 1);
    const before = values[1];
    makeThetaStep(lambda, 0, intervals)(values, 0, 0);
    return Math.abs(values[1] / before);
  };

  it.each(limits)('$id: on $intervals intervals the fastest mode grows from λ = $limit', (row) => {
    expect(growth(row.intervals, row.limit * 0.999)).toBeLessThan(1);
    expect(growth(row.intervals, row.limit * 1.001)).toBeGreaterThan(1);
  });

  it('at λ = ½ is the average over a fair coin', () => {
    const values = Float64Array.of(0, 1, 5, 2, 0);
    makeThetaStep(0.5, 0, 4)(values, 0, 0);
    expect(Array.from(values)).toEqual([0, 2.5, 1.5, 2.5, 0]);
  });
});

const call: Contract = {
  payoff: 'vanilla',
  exercise: 'european',
  kind: 'call',
  strike: 100,
  expiry: 1,
};

function gridValue(contract: Contract, market: SpotMarket, sizes: MethodSizes): number {
  const result = heatCrankNicolson.price(contract, market, sizes);
  if (!result.ok) throw new Error(result.message);
  return result.value;
}

/** Least-squares slope of ln(error) against ln(1/n). */
function observedOrder(sizes: number[], errors: number[]): number {
  const x = sizes.map((n) => -Math.log(n));
  const y = errors.map((error) => Math.log(error));
  const mean = (values: number[]) => values.reduce((sum, v) => sum + v, 0) / values.length;
  const [mx, my] = [mean(x), mean(y)];
  const covariance = x.reduce((sum, v, i) => sum + (v - mx) * (y[i] - my), 0);
  return covariance / x.reduce((sum, v) => sum + (v - mx) ** 2, 0);
}

describe('observed order of the plain scheme', () => {
  const sizes = [100, 200, 400, 800];
  const plain = (contract: Contract, market: SpotMarket) =>
    sizes.map((n) =>
      gridValue(contract, market, { spaceSteps: n, timeSteps: n / 2, smoothing: 'none' }),
    );

  it.each([
    { spot: 100, rate: 0.05, yield: 0, volatility: 0.2 },
    { spot: 90, rate: 0.02, yield: 0.05, volatility: 0.4 },
    { spot: 115, rate: -0.01, yield: 0.01, volatility: 0.3 },
  ])('is 2 for a European call at $spot, volatility $volatility', (market) => {
    const exact = closedForm.price(call, market, {});
    if (!exact.ok) throw new Error(exact.message);
    const errors = plain(call, market).map((value) => Math.abs(value - exact.value));
    expect(Math.abs(observedOrder(sizes, errors) - 2)).toBeLessThan(0.15);
  });

  it.each([
    // Values by collocation of the exercise boundary, 128 nodes.
    { spot: 40, strike: 40, rate: 0.06, volatility: 0.2, value: 2.3195742485934 },
    { spot: 44, strike: 40, rate: 0.06, volatility: 0.4, value: 3.9527848660075 },
  ])('is 2 for an American put at $spot, volatility $volatility', (row) => {
    const contract = { ...call, exercise: 'american', kind: 'put', strike: row.strike } as const;
    const market = { spot: row.spot, rate: row.rate, yield: 0, volatility: row.volatility };
    const errors = plain(contract, market).map((value) => Math.abs(value - row.value));
    expect(Math.abs(observedOrder(sizes, errors) - 2)).toBeLessThan(0.15);
  });
});

describe('the exercise boundary', () => {
  const put = { ...call, exercise: 'american', kind: 'put' } as const;
  const boundaryOf = (contract: Contract, market: SpotMarket) => {
    const result = heatCrankNicolson.price(contract, market, {});
    if (!result.ok) throw new Error(result.message);
    return result.diagnostics.exerciseBoundary;
  };

  it('approaches that of the perpetual put, K·λ/(λ − 1) with λ the negative root (Merton 1973)', () => {
    const market = { spot: 100, rate: 0.05, yield: 0, volatility: 0.2 };
    const perpetual = 100 / (1 + 0.2 ** 2 / (2 * 0.05));
    const boundary = boundaryOf({ ...put, expiry: 60 }, market);
    expect(Math.abs(boundary / perpetual - 1)).toBeLessThan(0.01);
    expect(boundaryOf({ ...put, expiry: 1 }, market)).toBeGreaterThan(boundary);
  });

  it('is mirrored by put and call: spot and strike, rate and yield exchanged', () => {
    const putBoundary = boundaryOf(put, { spot: 95, rate: 0.06, yield: 0.02, volatility: 0.3 });
    const mirrored = { spot: 100, rate: 0.02, yield: 0.06, volatility: 0.3 };
    const callBoundary = boundaryOf({ ...put, kind: 'call', strike: 95 }, mirrored);
    expect((putBoundary / 100) * (callBoundary / 95)).toBeCloseTo(1, 12);
  });

  it('is not there where exercise never pays', () => {
    const market = { spot: 100, rate: 0.05, yield: 0, volatility: 0.2 };
    expect(boundaryOf({ ...put, kind: 'call' }, market)).toBeUndefined();
    expect(boundaryOf(put, { ...market, rate: -0.01, yield: 0.01 })).toBeUndefined();
  });
});

describe('refusals', () => {
  const market = { spot: 100, rate: 0.05, yield: 0, volatility: 0.2 };

  it.each([
    [{ spaceSteps: 16 }, 'method.spaceSteps'],
    [{ timeSteps: 4 }, 'method.timeSteps'],
  ])('%o is too few', (sizes, path) => {
    const result = heatCrankNicolson.price(call, market, sizes);
    expect(result).toMatchObject({ ok: false, code: 'too-few-steps', path });
  });

  it('a deviation past what doubles hold is refused with advice', () => {
    const wild = { ...market, volatility: 9 };
    const result = heatCrankNicolson.price({ ...call, expiry: 50 }, wild, {});
    expect(result).toMatchObject({ ok: false, code: 'numerical-failure' });
  });
});
