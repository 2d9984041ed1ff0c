/**
 * The trees whose nodes drift, or that have three branches, against exact roll-backs of the stated
 * trees (mpmath, 60 digits: `lattice.json`; `trinomial.json`, made by `generate/trinomial.py`), and
 * what they promise besides.
 */
import type { Contract, MethodName } from '@/pricing/contract';
import { driftingRoll } from '@/pricing/lattice/drifting-roll-back';
import { leisenReimerStep } from '@/pricing/lattice/drifting-steps';
import { methodNamed } from '@/pricing/registry';
import reference from '@/tests/reference/lattice.json';
import trinomial from '@/tests/reference/trinomial.json';

const methodOf: Partial<Record<string, MethodName>> = {
  'jarrow-rudd': 'lattice-jarrow-rudd',
  tian: 'lattice-tian',
  trinomial: 'lattice-trinomial',
  'leisen-reimer-2': 'lattice-leisen-reimer',
};

const rows = [...reference.cases, ...trinomial.cases].flatMap(({ id, inputs, expected }) => {
  const name = methodOf[inputs.tree];
  const numbers: Record<string, string | number | undefined> = expected;
  return name === undefined || !('vol' in inputs) ? [] : [{ id, name, inputs, expected: numbers }];
});

const relative = (got: number, expected: string | number | undefined) =>
  Math.abs(got / Number(expected) - 1);

it.each(Object.values(methodOf))('%s has rows to check', (name) => {
  expect(rows.filter((row) => row.name === name).length).toBeGreaterThanOrEqual(2);
});

describe.each(rows)('$name is the stated tree: $id', ({ name, inputs, expected }) => {
  const { strike, spot, rate, vol: volatility = NaN, T: expiry = NaN, steps } = inputs;
  const kind = inputs.kind === 'call' ? 'call' : 'put';
  const market = { spot, rate: Number(rate), yield: Number(inputs.yield), volatility };

  it.each(['european', 'american'] as const)('%s', (exercise) => {
    const contract = { payoff: 'vanilla', exercise, kind, strike, expiry } as const;
    const result = methodNamed(name).price(contract, market, { steps, smoothing: 'none' });
    if (!result.ok) throw new Error(result.message);
    // The tree of Leisen and Reimer takes logarithms of nearly equal probabilities.
    expect(relative(result.value, expected[exercise])).toBeLessThan(1e-12);
    const { upProbability, upFactor, downFactor } = result.diagnostics;
    expect(relative(upProbability, expected.p)).toBeLessThan(1e-13);
    expect(relative(upFactor, expected.up)).toBeLessThan(1e-14);
    expect(relative(downFactor, expected.down)).toBeLessThan(1e-14);
  });
});

const put: Contract = {
  payoff: 'vanilla',
  exercise: 'american',
  kind: 'put',
  strike: 100,
  expiry: 1,
};
const market = { spot: 96, rate: 0.05, yield: 0.01, volatility: 0.25 };
const steep = { spot: 100, rate: 0.9, yield: -0.9, volatility: 0.001 };

it.each(['lattice-jarrow-rudd', 'lattice-tian'] as const)('%s bears any drift', (name) => {
  expect(methodNamed(name).price(put, steep, {})).toMatchObject({ ok: true });
});

it.each(['lattice-trinomial', 'lattice-leisen-reimer'] as const)(
  '%s refuses a drift that leaves it no walk, with advice',
  (name) => {
    const refused = methodNamed(name).price(put, steep, {});
    expect(refused).toMatchObject({ ok: false, code: 'numerical-failure', path: 'method.steps' });
  },
);

it('the advice of a refused trinomial walk is good', () => {
  const tree = methodNamed('lattice-trinomial');
  const drifting = { ...market, rate: 0.6, volatility: 0.05 };
  const refused = tree.price(put, drifting, { steps: 64 });
  if (refused.ok) throw new Error('64 steps cannot carry this drift');
  const steps = Number(/raise the steps to (\d+)/.exec(refused.message)?.[1]);
  expect(tree.price(put, drifting, { steps })).toMatchObject({ ok: true });
});

describe('lattice-leisen-reimer', () => {
  const tree = methodNamed('lattice-leisen-reimer');

  it('refuses an even number of steps and names the odd one above', () => {
    expect(tree.price(put, market, { steps: 500 })).toMatchObject({
      ok: false,
      code: 'out-of-range',
      path: 'method.steps',
      message: expect.stringContaining('501'),
    });
  });

  it('leaves out only what moves the value by less than 3e-12 of the strike', () => {
    for (const spot of [60, 96, 150]) {
      for (const [kind, steps] of [
        ['put', 501],
        ['call', 1001],
      ] as const) {
        const terms = { spot, strike: 100, kind, american: true };
        const makeStep = leisenReimerStep(Math.log(spot / 100));
        const walk = makeStep({ rate: 0.05, yield: 0.08, volatility: 0.25 }, 1 / steps, steps);
        if (walk === null) throw new Error('this walk exists');
        const roll = driftingRoll(terms);
        const [whole] = roll(walk, steps, 0, 0, null);
        const [pruned] = roll(walk, steps, 0, 0, 7 + walk.step * Math.sqrt(steps));
        expect(Math.abs(whole - pruned)).toBeLessThan(3e-12 * 100);
      }
    }
  });

  it('is of second order for European options without any smoothing', () => {
    const european = { ...put, exercise: 'european' } as const;
    const exact = methodNamed('closed-form').price(european, market, {});
    const errors = [125, 251, 503].map((steps) => {
      const plain = tree.price(european, market, { steps, smoothing: 'none' });
      if (!plain.ok || !exact.ok) throw new Error('these terms can be priced');
      return Math.abs(plain.value - exact.value);
    });
    expect(Math.log2(errors[0] / errors[1])).toBeCloseTo(2, 1);
    expect(Math.log2(errors[1] / errors[2])).toBeCloseTo(2, 1);
  });
});
