/**
 * The American option from its exercise boundary. Outside judges: the American reference file
 * (128-node collocation, confirmed there by a grid of another kind), published digits, Merton's perpetual
 * boundary (R. C. Merton, Bell Journal of Economics 4, 1973, section 8), and the closed form where
 * American and European options are worth the same.
 */
import seedrandom from 'seedrandom';
import type { Contract, Market, PricingSuccess } from '@/pricing/contract';
import { price } from '@/pricing/index';
import { closedForm } from '@/pricing/methods/closed-form';
import { heatCrankNicolson } from '@/pricing/methods/heat-crank-nicolson';
import { spectralBoundary } from '@/pricing/methods/spectral-boundary';
import american from '@/tests/reference/american.json';
import published from '@/tests/reference/published.json';
import { contractAndMarket } from './request-arbitraries';

type Terms = { contract: Contract; market: Market };

function priced({ contract, market }: Terms, nodes = 16): PricingSuccess {
  const result = spectralBoundary.price(contract, market, { nodes });
  if (!result.ok) throw new Error(result.message);
  return result;
}

const put: Contract = {
  payoff: 'vanilla',
  exercise: 'american',
  kind: 'put',
  strike: 100,
  expiry: 1,
};
const market: Market = { spot: 100, rate: 0.05, yield: 0.02, volatility: 0.25 };

/** Wider than what a desk meets: up to 30 years, volatility from 0.02, a fifth with a plain carry. */
function randomTerms(count: number, seed: string): Terms[] {
  const draw = seedrandom(seed);
  const between = (min: number, max: number) => min + (max - min) * draw();
  const logBetween = (min: number, max: number) => Math.exp(between(Math.log(min), Math.log(max)));
  return Array.from({ length: count }, () => {
    const kind = draw() < 0.5 ? 'call' : 'put';
    const strike = between(10, 200);
    const expiry = logBetween(0.003, 30);
    const volatility = logBetween(0.02, 1.5);
    const spot = strike * Math.exp(between(-4, 4) * volatility * Math.sqrt(expiry));
    const rate = draw() < 0.1 ? 0 : between(-0.03, 0.2);
    const common = { spot, rate, volatility };
    const carry = draw();
    const otherYield = carry < 0.1 ? 0 : between(-0.03, 0.2);
    return {
      contract: { payoff: 'vanilla', exercise: 'american', kind, strike, expiry },
      market: carry > 0.9 ? { ...common, carry: 'future' } : { ...common, yield: otherYield },
    };
  });
}

describe.each([
  { nodes: 16, value: 2e-8, delta: 1e-6, gamma: 2e-6, perStrike: 2e-5 },
  { nodes: 24, value: 2e-9, delta: 1e-8, gamma: 1e-7, perStrike: 2e-6 },
  { nodes: 32, value: 5e-10, delta: 2e-9, gamma: 1e-8, perStrike: 1e-6 },
  { nodes: 64, value: 1e-11, delta: 1e-9, gamma: 1e-8, perStrike: 1e-6 },
])('$nodes nodes on the American reference cases', ({ nodes, value, delta, gamma, perStrike }) => {
  const rows = american.cases.map(({ id, request, expected, errorBound }) => {
    const asked = contractAndMarket(request);
    const result = priced(asked, nodes);
    const error = Math.abs(result.value - Number(expected.value));
    const { strike } = asked.contract;
    return { id, result, expected, error, strike, bound: Number(errorBound.bound) };
  });

  it('is as close as stated here, of the strike', () => {
    const wrong = rows.filter(({ error, strike }) => error > value * strike);
    expect(wrong.map(({ id, error }) => `${id}: ${error}`)).toEqual([]);
  });

  it('estimates at least its error, beyond the reference’s own, in 95 % of them', () => {
    const covered = rows.filter(
      ({ error, bound, result }) => (result.errorEstimate ?? 0) + bound >= error,
    );
    expect(covered.length).toBeGreaterThanOrEqual(0.95 * rows.length);
  });

  it('has Greeks as close as stated here', () => {
    const wrong = rows.flatMap(({ id, expected, result, strike }) => {
      const asked: Record<string, string | undefined> = expected;
      const bounds = {
        delta,
        gamma,
        vega: perStrike * strike,
        theta: perStrike * strike,
        rho: perStrike * strike,
      };
      return (['delta', 'gamma', 'vega', 'theta', 'rho'] as const)
        .filter((name) => asked[name] !== undefined)
        .filter((name) => Math.abs(result.greeks[name] - Number(asked[name])) > bounds[name])
        .map((name) => `${id} ${name}: ${result.greeks[name]}, not ${asked[name]}`);
    });
    expect(wrong).toEqual([]);
  });
});

it.each([
  // Drift-dominated; the values are of the reference file's kind.
  { rate: 0.1, expiry: 10, value: 1.79461409156348 },
  { rate: 0.2, expiry: 1, value: 0.903612068303437 },
])('drift-dominated, rate $rate over $expiry years', ({ rate, expiry, value }) => {
  const asked = {
    contract: { ...put, expiry },
    market: { spot: 100, rate, yield: 0, volatility: 0.1 },
  };
  expect(Math.abs(priced(asked).value - value)).toBeLessThan(2e-6);
  expect(Math.abs(priced(asked, 64).value - value)).toBeLessThan(1e-9);
});

describe('published digits', () => {
  const printed = published.cases.flatMap((row) =>
    row.request?.contract.exercise === 'american' ? [{ ...row, request: row.request }] : [],
  );

  it.each(printed)('$expected.published for $id: $source (from memory: $fromMemory)', (row) => {
    const { published: digits } = row.expected as { published: string };
    const result = priced(contractAndMarket(row.request));
    const halfDigit = Number(row.errorBound.bound);
    expect(Math.abs(result.value - Number(digits))).toBeLessThanOrEqual(halfDigit);
  });
});

it('4,000 random puts and calls: each converges, is never exercised, or says why not', () => {
  let converged = 0;
  let neverExercised = 0;
  let twoBoundaries = 0;
  for (const asked of randomTerms(4000, 'four thousand')) {
    const { diagnostics, warnings } = priced(asked);
    if (warnings.length > 0) {
      expect(warnings.map(({ code }) => code)).toEqual(['two-boundaries']);
      twoBoundaries++;
    } else if (diagnostics.iterations > 0) converged++;
    else neverExercised++;
  }
  expect(converged).toBeGreaterThan(2500);
  expect(converged + neverExercised + twoBoundaries).toBe(4000);
});

it('the estimate covers 95 % of random cases and is sharp in 80 %, against 64 nodes', () => {
  let compared = 0;
  let covered = 0;
  let real = 0;
  let sharp = 0;
  for (const asked of randomTerms(300, 'estimates')) {
    const { value, errorEstimate, warnings, diagnostics } = priced(asked);
    if (warnings.length > 0 || diagnostics.iterations === 0 || errorEstimate === null) continue;
    const error = Math.abs(value - priced(asked, 64).value);
    const rounding = 1e-14 * Math.max(asked.contract.strike, asked.market.spot);
    compared++;
    if (error <= errorEstimate) covered++;
    if (error <= 10 * rounding) continue;
    real++;
    if (errorEstimate <= 30 * error) sharp++;
  }
  expect(compared).toBeGreaterThan(150);
  expect(covered).toBeGreaterThanOrEqual(0.95 * compared);
  expect(real).toBeGreaterThan(50);
  expect(sharp).toBeGreaterThanOrEqual(0.8 * real);
});

it('tiny rates, whose boundary is worth nothing, give a value all the same', () => {
  for (const rate of [5e-324, 1e-60, 1e-17, 1e-12, 1e-8, 1e-6, 1e-4]) {
    for (const carry of [0, rate, -rate, 2 * rate]) {
      const asked = { contract: put, market: { ...market, rate, yield: carry } };
      const { value, errorEstimate } = priced(asked);
      const european = closedForm.price({ ...put, exercise: 'european' }, asked.market, {});
      if (!european.ok) throw new Error(european.message);
      // Early exercise earns interest at most, on the strike or on the spot.
      const most = 300 * rate + (errorEstimate ?? 0);
      expect(Math.abs(value - european.value)).toBeLessThanOrEqual(most);
    }
  }
});

describe('the boundary', () => {
  it.each([
    { rate: 0.05, carry: 0.02, volatility: 0.25 },
    { rate: 0.08, carry: 0.1, volatility: 0.4 },
    { rate: 0.04, carry: 0, volatility: 0.3 },
  ])('of a century is Merton’s perpetual one: %p', ({ rate, carry, volatility }) => {
    const variance = volatility * volatility;
    const half = 0.5 - (rate - carry) / variance;
    const root = half - Math.sqrt(half * half + (2 * rate) / variance);
    const perpetual = (100 * root) / (root - 1);
    const asked = {
      contract: { ...put, expiry: 100 },
      market: { spot: 100, rate, yield: carry, volatility },
    };
    const { diagnostics, value } = priced(asked, 64);
    // What a century leaves out is worth less than the discounted strike, e^(−4) at the lowest rate.
    expect(Math.abs(diagnostics.exerciseBoundary / perpetual - 1)).toBeLessThan(2e-2);
    const merton = (100 - perpetual) * (100 / perpetual) ** root;
    expect(value).toBeLessThan(merton);
    expect(merton - value).toBeLessThan(100 * Math.exp(-rate * 100));
  });

  it('is where the option is worth its exercise, and no kink is left there', () => {
    for (const kind of ['put', 'call'] as const) {
      const contract = { ...put, kind };
      const { exerciseBoundary } = priced({ contract, market }, 32).diagnostics;
      const sign = kind === 'put' ? 1 : -1;
      const at = (share: number) =>
        priced(
          { contract, market: { ...market, spot: exerciseBoundary * (1 + sign * share) } },
          32,
        );
      expect(at(-1e-6).value).toBe(sign * (100 - exerciseBoundary * (1 - sign * 1e-6)));
      expect(at(-1e-6).greeks).toMatchObject({ delta: -sign, gamma: 0, theta: 0 });
      expect(Math.abs(at(1e-6).greeks.delta + sign)).toBeLessThan(1e-4);
      expect(Math.abs(at(1e-6).greeks.theta)).toBeLessThan(1e-3);
      const live = 2 * (0.05 * 100 - 0.02 * exerciseBoundary) * sign;
      const gamma = live / (0.0625 * exerciseBoundary * exerciseBoundary);
      expect(at(1e-6).greeks.gamma / gamma - 1).toBeLessThan(1e-3);
    }
  });

  it('starts at the strike, or where the interest on it equals the yield of the spot', () => {
    const start = (rate: number, carry: number) =>
      priced({ contract: put, market: { spot: 100, rate, yield: carry, volatility: 0.2 } })
        .diagnostics.exerciseBoundaryAtExpiry;
    expect(start(0.05, 0.02)).toBe(100);
    expect(start(0.04, 0.08)).toBeCloseTo(50, 12);
  });
});

it('a call is the put with spot and strike, rate and yield exchanged', () => {
  const call = priced({
    contract: { ...put, kind: 'call', strike: 110 },
    market: { spot: 90, rate: 0.03, yield: 0.07, volatility: 0.3 },
  });
  const twin = priced({
    contract: { ...put, strike: 90 },
    market: { spot: 110, rate: 0.07, yield: 0.03, volatility: 0.3 },
  });
  expect(Math.abs(call.value - twin.value)).toBeLessThan(1e-13 * 110);
  expect(Math.abs(call.greeks.rho - (twin.greeks.yieldRho ?? NaN))).toBeLessThan(1e-8 * 110);
});

it.each([
  { kind: 'call', rate: 0.05, yield: 0 },
  { kind: 'put', rate: 0, yield: 0.03 },
  { kind: 'put', rate: -0.01, yield: 0.02 },
] as const)(
  'a $kind at rate $rate, yield $yield is worth its European twin (Merton 1973)',
  (row) => {
    const contract = { ...put, kind: row.kind };
    const rates = { spot: 95, rate: row.rate, yield: row.yield, volatility: 0.2 };
    const european = closedForm.price({ ...contract, exercise: 'european' }, rates, {});
    expect(priced({ contract, market: rates }).value).toBe(european.ok && european.value);
  },
);

describe('what it leaves to the grid', () => {
  const negative = { spot: 95, rate: -0.02, yield: -0.06, volatility: 0.2 };

  it('two boundaries: the grid’s value, and a warning that says so', () => {
    const result = priced({ contract: { ...put, expiry: 2 }, market: negative });
    expect(result.warnings).toMatchObject([{ code: 'two-boundaries' }]);
    const sizes = { spaceSteps: 400, timeSteps: 200 };
    const grid = heatCrankNicolson.price({ ...put, expiry: 2 }, negative, sizes);
    expect(result.value).toBe(grid.ok && grid.value);
  });

  it('is refused with the grid’s reason where the grid cannot either', () => {
    const asked = { ...negative, volatility: 9 };
    const result = spectralBoundary.price({ ...put, expiry: 50 }, asked, {});
    expect(result).toMatchObject({ ok: false, code: 'numerical-failure' });
  });
});

it('prices American exercise only, within its caps', () => {
  const method = { name: 'spectral-boundary', nodes: 24 };
  expect(price({ contract: put, market, method })).toMatchObject({ ok: true, method });
  const european = { ...put, exercise: 'european' };
  expect(price({ contract: european, market, method })).toMatchObject({
    ok: false,
    code: 'method-does-not-price',
  });
  for (const [nodes, code] of [
    [15, 'too-few-steps'],
    [65, 'too-many-steps'],
    [20.5, 'out-of-range'],
  ]) {
    const asked = { contract: put, market, method: { ...method, nodes } };
    expect(price(asked)).toMatchObject({ ok: false, code, path: 'method.nodes' });
  }
});
