/**
 * The fair walk: exact binomial probabilities, its mass, its distance to the bell curve (reference
 * values: exact binomials against the normal distribution at 60 digits, mpmath), and the price as
 * the same number forward and backward.
 */
import fc from 'fast-check';
import {
  backwardExpectation,
  europeanBothWays,
  forwardExpectation,
  gaussianDistance,
  walkProbabilities,
} from '@/pricing/lattice/random-walk';
import { latticeSymmetric } from '@/pricing/methods/lattice-symmetric';
import reference from '@/tests/reference/random-walk.json';

/** n over j by whole numbers. */
function binomial(n: number, j: number): bigint {
  let result = 1n;
  for (let i = 1; i <= j; i++) result = (result * BigInt(n - j + i)) / BigInt(i);
  return result;
}

it.each([0, 1, 2, 3, 10, 53])('%i steps have exactly the binomial probabilities', (steps) => {
  const exact = Array.from(
    { length: steps + 1 },
    (_, j) => Number(binomial(steps, j)) / 2 ** steps,
  );
  expect(Array.from(walkProbabilities(steps))).toEqual(exact);
});

it.each([1, 10, 100, 1000])('the mass of %i steps is 1 and the mean is 0', (steps) => {
  const probabilities = walkProbabilities(steps);
  const ones = new Float64Array(steps + 1).fill(1);
  const places = ones.map((_, j) => 2 * j - steps);
  expect(Math.abs(forwardExpectation(probabilities, ones) - 1)).toBeLessThan(1e-14);
  expect(Math.abs(forwardExpectation(probabilities, places))).toBeLessThan(1e-12);
  const squares = places.map((place) => place * place);
  expect(backwardExpectation(squares)).toBeCloseTo(steps, 9);
});

describe('distance to the bell curve', () => {
  it.each(reference.cases.map(({ inputs, expected }) => ({ ...inputs, ...expected })))(
    '$steps steps',
    ({ steps, supDistance, supDistanceContinuityCorrected, atPosition }) => {
      const distance = gaussianDistance(steps);
      expect(Math.abs(distance.supremum / Number(supDistance) - 1)).toBeLessThan(1e-11);
      // A difference of two numbers near ½, so that its rounding is absolute.
      const gap = distance.continuityCorrected - Number(supDistanceContinuityCorrected);
      expect(Math.abs(gap)).toBeLessThan(1e-13);
      expect(Math.abs(distance.position)).toBe(Math.abs(Number(atPosition)));
    },
  );

  it('falls like 1/sqrt(2 pi n)', () => {
    const scaled = [16, 64, 256, 1024].map((n) => gaussianDistance(n).supremum * Math.sqrt(n));
    const limit = 1 / Math.sqrt(2 * Math.PI);
    expect(Math.abs(scaled[3] / limit - 1)).toBeLessThan(0.002);
    expect(scaled.every((value, i) => i === 0 || value > scaled[i - 1])).toBe(true);
  });
});

const terms = fc.record({
  contract: fc.record({
    payoff: fc.constant('vanilla' as const),
    exercise: fc.constant('european' as const),
    kind: fc.constantFrom('call' as const, 'put' as const),
    strike: fc.double({ min: 50, max: 200, noNaN: true }),
    expiry: fc.double({ min: 0.01, max: 5, noNaN: true }),
  }),
  market: fc.record({
    spot: fc.double({ min: 50, max: 200, noNaN: true }),
    rate: fc.double({ min: -0.02, max: 0.1, noNaN: true }),
    yield: fc.double({ min: -0.02, max: 0.1, noNaN: true }),
    volatility: fc.double({ min: 0.1, max: 0.8, noNaN: true }),
  }),
  steps: fc.integer({ min: 1, max: 300 }),
});

it('the price is the same by the distribution forward and by the expectation backward', () => {
  fc.assert(
    fc.property(terms, ({ contract, market, steps }) => {
      const both = europeanBothWays(contract, market, steps);
      if (both === null) throw new Error('these terms stay within the range of doubles');
      expect(Math.abs(both.forward - both.backward)).toBeLessThanOrEqual(1e-12 * both.backward);
    }),
    { seed: 20260101, numRuns: 200 },
  );
});

it('and is the value of the plain tree, whose weights carry the heat factor from node to node', () => {
  fc.assert(
    fc.property(terms, ({ contract, market, steps }) => {
      const both = europeanBothWays(contract, market, steps);
      const result = latticeSymmetric.price(contract, market, { steps, smoothing: 'none' });
      // A walk of few steps under a strong drift is refused; what is priced must be the same number.
      if (both === null || !result.ok) return;
      const tolerance = 1e-12 * Math.max(both.backward, 1e-3 * contract.strike);
      expect(Math.abs(result.value - both.backward)).toBeLessThanOrEqual(tolerance);
    }),
    { seed: 20260102, numRuns: 100 },
  );
});

it('says nothing where the heat factor would leave the range of doubles', () => {
  const contract = { payoff: 'vanilla', exercise: 'european', kind: 'call', strike: 1 } as const;
  const market = { spot: 1, rate: 0.5, yield: 0, volatility: 0.02 };
  expect(europeanBothWays({ ...contract, expiry: 1 }, market, 1000)).toBeNull();
});
