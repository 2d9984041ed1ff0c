/** Studies of known cases: the orders are the textbook ones of each scheme. */
import type {
  Contract,
  MethodName,
  SpotMarket,
  StudyReference,
  StudyRow,
} from '@/pricing/contract';
import { sizeLimits } from '@/pricing/conventions';
import { fitOrder } from '@/pricing/study/fit-order';
import { settledDigits } from '@/pricing/study/settled-digits';
import {
  planLadder,
  runStudyRow,
  studiedMethods,
  studyReference,
  summariseStudy,
  theoreticalOrder,
} from '@/pricing/study';

const put: Contract = {
  payoff: 'vanilla',
  exercise: 'european',
  kind: 'put',
  strike: 100,
  expiry: 1,
};
const american: Contract = { ...put, exercise: 'american' };
const market: SpotMarket = { spot: 105, rate: 0.05, yield: 0.02, volatility: 0.25 };
const atTheMoney: SpotMarket = { ...market, spot: 100 };

function referenceOf(contract: Contract, at: SpotMarket): StudyReference {
  const reference = studyReference(contract, at);
  if ('ok' in reference) throw new Error(reference.message);
  return reference;
}

function study(name: MethodName, contract: Contract, at: SpotMarket, rows: number) {
  const order = theoreticalOrder(name, contract.exercise);
  if (order === null) throw new Error(`${name} has nothing to refine`);
  const reference = referenceOf(contract, at);
  const run = planLadder(name, contract, at, { rows }).map((step) =>
    runStudyRow(contract, at, step),
  );
  return { run, reference, ...summariseStudy(run, order, reference) };
}

describe('the ladder', () => {
  const names = studiedMethods(put, market);

  it('is there for every method but the exact one', () => {
    expect(names).toContain('heat-explicit');
    expect(names).not.toContain('closed-form');
    expect(planLadder('closed-form', put, market, { rows: 6 })).toEqual([]);
  });

  it.each(names)('%s: every size at least doubles, and none passes a cap', (name) => {
    const steps = planLadder(name, put, market, { rows: 12 }).filter((step) => !step.pastLimit);
    for (const series of ['all', 'odd', 'even'] as const) {
      const own = steps.filter((step) => step.series === series);
      for (let i = 1; i < own.length; i++) {
        expect(own[i].size).toBeGreaterThanOrEqual(2 * own[i - 1].size);
      }
    }
    for (const { settings } of steps) {
      expect(settings.smoothing).toBe('none');
      for (const size of ['spaceSteps', 'timeSteps', 'steps'] as const) {
        expect(settings[size] ?? 0).toBeLessThanOrEqual(sizeLimits[size].max);
      }
    }
    expect(steps.map(({ ordinal }) => ordinal)).toEqual(steps.map((_, i) => i));
  });

  it('of a walk has odd and even lengths, each with its own doubling', () => {
    const steps = planLadder('lattice-crr', put, market, { rows: 3 });
    const sizesOf = (series: string) =>
      steps.filter((step) => step.series === series).map(({ size }) => size);
    expect(sizesOf('even')).toEqual([64, 128, 256]);
    expect(sizesOf('odd')).toEqual([65, 131, 263]);
  });

  it('of the explicit grid quarters the time step, and ends with one row past the limit', () => {
    const steps = planLadder('heat-explicit', put, market, { rows: 3, firstSize: 64 });
    const stable = steps.filter(({ pastLimit }) => !pastLimit).map(({ settings }) => settings);
    expect(stable.map(({ spaceSteps }) => spaceSteps)).toEqual([64, 128, 256]);
    const [first, second] = stable.map(({ timeSteps }) => timeSteps ?? 0);
    expect(second).toBe(4 * first);
    expect(steps.at(-1)).toMatchObject({ pastLimit: true, settings: { beyondStability: true } });
  });

  it('starts at the size that is asked for', () => {
    const [first] = planLadder('heat-crank-nicolson', put, market, { rows: 3, firstSize: 80 });
    expect(first.settings).toMatchObject({ spaceSteps: 80, timeSteps: 40 });
  });
});

describe('the observed order', () => {
  it.each([
    ['heat-crank-nicolson', put, 2],
    ['heat-crank-nicolson', american, 2],
    ['heat-explicit', put, 2],
    ['heat-explicit', american, 2],
    ['heat-implicit', put, 1],
    ['heat-implicit', american, 1],
  ] as const)('of %s, %o, is %d', (name, contract, order) => {
    const { fits } = study(name, contract, market, 5);
    expect(fits).toMatchObject([{ series: 'all', points: 5, verdict: 'as-expected' }]);
    expect(Math.abs((fits[0].order ?? 0) - order)).toBeLessThan(0.15);
  });

  it('of the explicit grid at fixed k/h² is 1 in the time steps', () => {
    const { run, rows } = study('heat-explicit', put, market, 5);
    const stable = run.filter(({ pastLimit }) => !pastLimit);
    const timeSteps = stable.map(({ settings }) => settings.timeSteps ?? 0);
    const errors = stable.map(({ ordinal }) => rows[ordinal].error ?? 0);
    expect(fitOrder(timeSteps, errors).order).toBeCloseTo(1, 2);
  });

  // With the strike at the spot the plain tree's error is C/n with one C for odd and one for even n
  // (F. and M. Diener, Mathematical Finance 14, 2004).
  it('of the plain tree at the money is 1, from either side for odd and even lengths', () => {
    const { run, fits, reference } = study('lattice-crr', put, atTheMoney, 5);
    expect(fits.map(({ series }) => series)).toEqual(['odd', 'even']);
    for (const fit of fits) {
      expect(fit.verdict).toBe('as-expected');
      expect(Math.abs((fit.order ?? 0) - 1)).toBeLessThan(0.02);
    }
    const signs = (series: string) =>
      new Set(
        run.flatMap((row) =>
          row.series === series && row.result.ok
            ? [Math.sign(row.result.value - reference.value)]
            : [],
        ),
      );
    expect(signs('odd')).toEqual(new Set([1]));
    expect(signs('even')).toEqual(new Set([-1]));
  });

  it('is not claimed where the errors wander too much for one', () => {
    const { fits } = study('lattice-crr', american, market, 4);
    for (const { verdict, halfWidth } of fits) {
      if (halfWidth !== null && halfWidth > 0.5) expect(verdict).toBe('not-determined');
    }
    expect(fits.some(({ verdict }) => verdict === 'not-determined')).toBe(true);
  });
});

describe('the verdict', () => {
  const reference: StudyReference = {
    method: { name: 'closed-form' },
    value: 10,
    errorEstimate: 1e-9,
  };
  const rowsWith = (errors: number[]): StudyRow[] =>
    errors.map((error, ordinal) => ({
      ordinal,
      series: 'all',
      size: 50 * 2 ** ordinal,
      settings: { name: 'heat-crank-nicolson' },
      pastLimit: false,
      result: {
        ok: true,
        value: 10 + error,
        errorEstimate: null,
        greeks: { delta: 0, gamma: 0, vega: 0, theta: 0, rho: 0, yieldRho: 0 },
        method: { name: 'heat-crank-nicolson' },
        diagnostics: {},
        warnings: [],
      },
    }));
  const halving = [1e-2, 5e-3, 2.5e-3, 1.25e-3];

  it('tells a lower order from a higher one', () => {
    expect(summariseStudy(rowsWith(halving), 2, reference).fits[0].verdict).toBe('lower');
    expect(summariseStudy(rowsWith(halving), 0.5, reference).fits[0].verdict).toBe('higher');
  });

  it('is not given for two rows, and grows with the rows that are there', () => {
    const two = summariseStudy(rowsWith(halving.slice(0, 2)), 1, reference);
    expect(two.fits).toMatchObject([{ points: 2, order: null, verdict: 'not-determined' }]);
    expect(two.rows[1]).toMatchObject({ richardson: expect.closeTo(10, 12) });
    expect(two.rows[1].ratio).toBeCloseTo(2, 9);
    expect(two.rows[1].order).toBeCloseTo(1, 9);
  });

  it('leaves out rows whose error is no larger than what the reference may be wrong by', () => {
    const rough = { ...reference, errorEstimate: 1e-3 };
    const { rows, fits } = summariseStudy(rowsWith(halving), 1, rough);
    expect(rows.map(({ belowReference }) => belowReference)).toEqual([false, false, true, true]);
    expect(fits[0]).toMatchObject({ points: 2, verdict: 'not-determined' });
  });
});

describe('past the stability limit', () => {
  it('the row shows how it grows and takes no part in the order', () => {
    const { run, rows, fits } = study('heat-explicit', put, market, 4);
    const past = run.at(-1);
    if (!past?.result.ok) throw new Error('the row has no value');
    expect(past.pastLimit).toBe(true);
    expect(past.result.diagnostics.amplification).toBeGreaterThan(1.9);
    expect(rows.at(-1)?.error).toBeGreaterThan(1000);
    expect(rows.at(-1)).toMatchObject({ order: null, richardson: null, settledDigits: 0 });
    expect(fits[0].points).toBe(4);
  });
});

describe('settled digits', () => {
  it.each([
    [13.286272, [13.247372, 13.237562], 3],
    [13.237562, [13.235094, 13.234478], 4],
    [1.9999, [2.0001], 0],
    [9.99, [10.01], 0],
    [-1.25, [-1.26], 2],
    [-0.1, [0.1], 0],
    [0.00123, [0.00128], 5],
    [5, [], 0],
  ])('of %d before %p are %d', (value, later, digits) => {
    expect(settledDigits(value, later)).toBe(digits);
  });

  it('only ever grow down a converging ladder', () => {
    const { rows } = study('heat-crank-nicolson', put, market, 6);
    const digits = rows.map((row) => row.settledDigits);
    expect(digits.at(-1)).toBeGreaterThanOrEqual(5);
    expect([...digits].sort((a, b) => a - b)).toEqual(digits);
  });
});

it('the reference is the closed form where there is one, else the finest concentrated grid', () => {
  expect(referenceOf(put, market).method.name).toBe('closed-form');
  const { method, errorEstimate } = referenceOf(american, market);
  expect(method).toMatchObject({ name: 'heat-crank-nicolson', smoothing: 'richardson' });
  expect(errorEstimate).toBeLessThan(1e-5);
});
