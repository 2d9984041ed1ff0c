/**
 * The walks against exact roll-backs (mpmath, 60 digits; rational trees by hand), textbook trees
 * (digits recalled from memory, as their rows say), and what a refused walk must say.
 */
import { rollBack, makePowers } from '@/pricing/lattice/roll-back';
import { levelStep } from '@/pricing/lattice/walk';
import { latticeCrr } from '@/pricing/methods/lattice-crr';
import { latticeSymmetric } from '@/pricing/methods/lattice-symmetric';
import type { Contract, PricingSuccess, SpotMarket } from '@/pricing/contract';
import type { Method, MethodSizes } from '@/pricing/method';
import reference from '@/tests/reference/lattice.json';
import published from '@/tests/reference/published.json';

type TreeInputs = {
  tree: string;
  kind: 'call' | 'put';
  spot: number;
  strike: number;
  rate: number;
  yield: number;
  vol: number;
  T: number;
  steps: number;
};

function priced(method: Method, contract: Contract, market: SpotMarket, sizes: MethodSizes) {
  const result = method.price(contract, market, sizes);
  if (!result.ok) throw new Error(result.message);
  return result;
}

function plainTree(inputs: TreeInputs, exercise: 'european' | 'american'): PricingSuccess {
  const { kind, strike, spot, rate, vol: volatility, T: expiry, steps } = inputs;
  const contract = { payoff: 'vanilla', exercise, kind, strike, expiry } as const;
  const market = { spot, rate, yield: inputs.yield, volatility };
  return priced(latticeCrr, contract, market, { steps, smoothing: 'none' });
}

const relative = (got: number, expected: string) => Math.abs(got / Number(expected) - 1);

describe('lattice-crr is the stated tree, node by node', () => {
  const rows = reference.cases.flatMap(({ id, inputs, expected }) =>
    inputs.tree === 'crr' ? [{ id, inputs: inputs as TreeInputs, expected }] : [],
  );

  it('has rows to check', () => expect(rows.length).toBeGreaterThanOrEqual(8));

  it.each(rows)('$id', ({ inputs, expected }) => {
    const european = plainTree(inputs, 'european');
    const american = plainTree(inputs, 'american');
    expect(relative(european.value, expected.european)).toBeLessThan(1e-13);
    expect(relative(american.value, expected.american)).toBeLessThan(1e-13);
    const { upProbability, upFactor, downFactor } = european.diagnostics;
    expect(relative(upProbability, String(expected.p))).toBeLessThan(1e-14);
    expect(relative(upFactor, String(expected.up))).toBeLessThan(1e-15);
    expect(relative(downFactor, String(expected.down))).toBeLessThan(1e-15);
  });
});

describe('the roll-back on trees of whole numbers (up 2, down ½, growth 5/4, probability ½)', () => {
  const rows = reference.cases.flatMap(({ id, inputs, expected }) =>
    inputs.tree === 'rational' ? [{ id, inputs, expected }] : [],
  );

  it.each(rows)('$id', ({ inputs, expected }) => {
    const { spot, strike, steps } = inputs;
    const kind = inputs.kind === 'call' ? 'call' : 'put';
    const walk = { ...levelStep, step: Math.LN2, up: 0.4, down: 0.4, upProbability: 0.5 };
    const valueOf = (american: boolean) => {
      const terms = { spot, strike, kind, american } as const;
      return rollBack(terms, walk, makePowers(walk.step, steps), steps, 0, 0, null)[0];
    };
    expect(valueOf(false)).toBeCloseTo(Number(expected.european), 13);
    expect(valueOf(true)).toBeCloseTo(Number(expected.american), 13);
  });
});

describe('textbook trees', () => {
  const rows = published.cases.flatMap((row) => {
    const inputs = row.inputs as (TreeInputs & { exercise: 'european' | 'american' }) | undefined;
    return inputs?.tree === 'crr' ? [{ ...row, inputs }] : [];
  });

  it.each(rows)('$inputs.label, $source (from memory: $fromMemory)', (row) => {
    const { value } = plainTree(row.inputs, row.inputs.exercise);
    const { published: digits, computed } = row.expected as { published: string; computed: string };
    expect(Math.abs(value - Number(digits))).toBeLessThanOrEqual(Number(row.errorBound.bound));
    expect(relative(value, computed)).toBeLessThan(1e-11);
  });

  it('has rows to check', () => expect(rows.length).toBeGreaterThanOrEqual(3));
});

const put: Contract = {
  payoff: 'vanilla',
  exercise: 'american',
  kind: 'put',
  strike: 100,
  expiry: 10,
};

describe('a walk that cannot carry the drift', () => {
  const steep = { spot: 100, rate: 0.3, yield: 0, volatility: 0.01 };

  it.each([latticeCrr, latticeSymmetric])(
    '$name refuses it and names the steps that do',
    (method) => {
      const refused = method.price(put, steep, { steps: 1000 });
      expect(refused).toMatchObject({ ok: false, code: 'numerical-failure', path: 'method.steps' });
    },
  );

  it('the advice is good', () => {
    const market = { spot: 100, rate: 0.1, yield: 0, volatility: 0.02 };
    const refused = latticeCrr.price(put, market, { steps: 64 });
    if (refused.ok) throw new Error('64 steps cannot carry this drift');
    const steps = Number(/raise the steps to (\d+)/.exec(refused.message)?.[1]);
    expect(latticeCrr.price(put, market, { steps })).toMatchObject({ ok: true });
  });

  it('asks for more steps where extrapolation has too few', () => {
    const market = { spot: 100, rate: 0.05, yield: 0, volatility: 0.2 };
    const refused = latticeCrr.price(put, market, { steps: 8 });
    expect(refused).toMatchObject({ ok: false, code: 'too-few-steps' });
    expect(latticeCrr.price(put, market, { steps: 8, smoothing: 'none' })).toMatchObject({
      ok: true,
    });
  });
});

it('the estimate of a plain tree covers its error on drift-dominated puts', () => {
  // Value by collocation of the exercise boundary, 128 nodes: 1.79461409156348.
  const market = { spot: 100, rate: 0.1, yield: 0, volatility: 0.1 };
  for (const method of [latticeCrr, latticeSymmetric]) {
    const { value, errorEstimate } = priced(method, put, market, { steps: 101, smoothing: 'none' });
    const error = Math.abs(value - 1.79461409156348);
    expect(error).toBeGreaterThan(0.05);
    expect(errorEstimate).toBeGreaterThanOrEqual(error);
  }
});

it('European extrapolation falls like 1/n², American like 1/n or better', () => {
  const contract = { ...put, exercise: 'european', expiry: 1 } as const;
  const market = { spot: 95, rate: 0.05, yield: 0.02, volatility: 0.25 };
  const fine = priced(latticeCrr, contract, market, { steps: 4000 }).value;
  const errors = [125, 250, 500].map((steps) =>
    Math.abs(priced(latticeCrr, contract, market, { steps }).value - fine),
  );
  expect(Math.log2(errors[0] / errors[1])).toBeGreaterThan(1.8);
  expect(Math.log2(errors[1] / errors[2])).toBeGreaterThan(1.8);
});
