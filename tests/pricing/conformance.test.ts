/**
 * What `pricing/method.ts` asks of every method, over the whole registry and over random requests
 * (fixed seeds). A new entry of the registry is held to it without a line here.
 *
 * The truth is the closed form where one prices the contract; for American exercise the grid of
 * 400 × 200, whose own estimate is allowed for.
 */
import fc from 'fast-check';
import type { Contract, Market, PricingResult, PricingSuccess } from '@/pricing/contract';
import { methodNames, pricedExercises } from '@/pricing/contract';
import type { Method } from '@/pricing/method';
import { closedForm } from '@/pricing/methods/closed-form';
import { heatCrankNicolson } from '@/pricing/methods/heat-crank-nicolson';
import { price } from '@/pricing/index';
import { methods } from '@/pricing/registry';

type Terms = { contract: Contract; market: Market };

const between = (min: number, max: number) => fc.double({ min, max, noNaN: true });
const logBetween = (min: number, max: number) =>
  between(Math.log(min), Math.log(max)).map((x) => Math.exp(x));

/** What a desk meets: spots within four deviations of the strike, rates of either sign. */
function deskTerms(exercise: Contract['exercise']): fc.Arbitrary<Terms> {
  return fc
    .record({
      kind: fc.constantFrom('call' as const, 'put' as const),
      strike: between(10, 200),
      expiry: logBetween(0.01, 5),
      volatility: logBetween(0.05, 0.9),
      moneyness: between(-4, 4),
      rate: between(-0.02, 0.15),
      carry: fc.oneof(between(-0.02, 0.12), fc.constant('future' as const)),
    })
    .map(({ kind, strike, expiry, volatility, moneyness, rate, carry }) => {
      const spot = strike * Math.exp(moneyness * volatility * Math.sqrt(expiry));
      const contract = { payoff: 'vanilla', exercise, kind, strike, expiry } as const;
      const market =
        carry === 'future'
          ? { spot, rate, carry, volatility }
          : { spot, rate, yield: carry, volatility };
      return { contract, market };
    });
}

/** Everything that `checkRequest` lets through, to its limits. */
const anyTerms: fc.Arbitrary<Terms> = fc
  .record({
    kind: fc.constantFrom('call' as const, 'put' as const),
    exercise: fc.constantFrom(...pricedExercises),
    strike: logBetween(1e-8, 1e11),
    spot: logBetween(1e-8, 1e11),
    expiry: logBetween(1.1e-6, 99),
    volatility: logBetween(1.1e-5, 9.9),
    rate: between(-1, 1),
    carry: fc.oneof(between(-1, 1), fc.constant('future' as const)),
  })
  .map(({ kind, exercise, strike, spot, expiry, volatility, rate, carry }) => ({
    contract: { payoff: 'vanilla', exercise, kind, strike, expiry },
    market:
      carry === 'future'
        ? { spot, rate, carry, volatility }
        : { spot, rate, yield: carry, volatility },
  }));

function sample(terms: fc.Arbitrary<Terms>, count: number, seed: number): Terms[] {
  return fc.sample(terms, { numRuns: count, seed });
}

function priced(method: Method, { contract, market }: Terms): PricingSuccess {
  const result = method.price(contract, market, {});
  if (!result.ok) throw new Error(`${method.name}: ${result.message}`);
  return result;
}

function numbersOf({ value, errorEstimate, greeks, diagnostics }: PricingSuccess): number[] {
  const given = [value, errorEstimate, ...Object.values(greeks), ...Object.values(diagnostics)];
  return given.filter((number) => number !== null && number !== undefined);
}

const intrinsicOf = ({ contract, market }: Terms) =>
  Math.max(0, (contract.kind === 'call' ? 1 : -1) * (market.spot - contract.strike));

const roundingOf = ({ contract, market }: Terms) => 1e-12 * Math.max(contract.strike, market.spot);

const runs = methods.flatMap((method) =>
  pricedExercises
    .filter((exercise) => {
      const [{ contract, market }] = sample(deskTerms(exercise), 1, 1);
      return method.prices(contract, market);
    })
    .map((exercise) => ({ name: method.name, exercise, method })),
);

it('the registry holds each method of the contract once', () => {
  expect(methods.map(({ name }) => name).sort()).toEqual([...methodNames].sort());
});

it('no two methods share all of their machinery', () => {
  const sets = methods.map(({ machinery }) => [...machinery].sort().join());
  expect(new Set(sets).size).toBe(methods.length);
});

describe.each(runs)('$name, $exercise', ({ method, exercise }) => {
  const desk = sample(deskTerms(exercise), 40, 41);
  const results = desk.map((terms) => ({ ...terms, terms, result: priced(method, terms) }));

  it('gives finite numbers or a failure with advice, to the limits of what may be asked', () => {
    for (const terms of sample(anyTerms, 60, 42)) {
      const contract = { ...terms.contract, exercise };
      const result: PricingResult = method.price(contract, terms.market, {});
      const asked = JSON.stringify(terms);
      if (result.ok) {
        expect({ asked, finite: numbersOf(result).every(Number.isFinite) }).toEqual({
          asked,
          finite: true,
        });
      } else {
        expect(result.message).toMatch(/\w.*\.$/);
      }
    }
  });

  it('gives the same bits again, and in any order: nothing is kept between calls', () => {
    const again = [...desk].reverse().map((terms) => priced(method, terms));
    expect(again.reverse()).toEqual(results.map(({ result }) => result));
  });

  it('does not touch its input', () => {
    const [terms] = desk;
    const before = structuredClone(terms);
    priced(method, terms);
    expect(terms).toEqual(before);
  });

  it('reports the settings it used, and they make the number again', () => {
    for (const { contract, market, result } of results.slice(0, 10)) {
      const { name, ...settings } = result.method;
      expect(name).toBe(method.name);
      expect(settings).toEqual(method.defaultSettings);
      expect(method.price(contract, market, settings)).toEqual(result);
      const coarse = method.price(contract, market, method.coarsestSettings);
      if (coarse.ok) expect(coarse.method).toEqual({ name, ...method.coarsestSettings });
    }
  });

  it('is never below zero or below what exercise pays now', () => {
    const floor = (terms: Terms) => (exercise === 'american' ? intrinsicOf(terms) : 0);
    const wrong = results.filter(({ terms, result }) => result.value < floor(terms));
    expect(wrong).toEqual([]);
  });

  it('is homogeneous: spot and strike scaled together scale the value', () => {
    for (const { terms, contract, market, result: one } of results.slice(0, 10)) {
      const scaled = {
        contract: { ...contract, strike: 8 * contract.strike },
        market: { ...market, spot: 8 * market.spot },
      };
      const eight = priced(method, scaled);
      const tolerance = 8 * roundingOf(terms);
      expect(Math.abs(eight.value - 8 * one.value)).toBeLessThan(tolerance);
      expect(Math.abs(eight.greeks.delta - one.greeks.delta)).toBeLessThan(1e-9);
    }
  });

  it('estimates at least its error in 95 % of the cases', () => {
    const truth = exercise === 'european' ? closedForm : heatCrankNicolson;
    const fine = exercise === 'european' ? {} : { spaceSteps: 400, timeSteps: 200 };
    const covered = results.filter(({ terms, result: { value, errorEstimate } }) => {
      const best = truth.price(terms.contract, terms.market, fine);
      if (!best.ok) throw new Error(best.message);
      const doubt = (best.errorEstimate ?? 0) + roundingOf(terms);
      return errorEstimate === null || Math.abs(value - best.value) <= errorEstimate + doubt;
    });
    expect(covered.length).toBeGreaterThanOrEqual(0.95 * desk.length);
  });

  it('has a delta, a theta, a vega and a rho that are the slopes of its own value', () => {
    // An option that is best exercised now has kinks instead: its slopes belong to one side each.
    const alive = results.filter(({ result }) => result.greeks.gamma !== 0).slice(0, 8);
    expect(alive.length).toBe(8);
    const slopes = alive.flatMap(({ terms, result }) => slopesOf(method, terms, result));
    expect(slopes.filter(({ gap, bound }) => gap > bound)).toEqual([]);
  });

  it('has warnings with a code and a sentence', () => {
    for (const { result } of results) {
      for (const { code, message } of result.warnings) {
        expect(code).toMatch(/^[a-z-]+$/);
        expect(message).toMatch(/^[A-Z].*\.$/);
      }
    }
  });
});

/**
 * Central differences of the method's own value. A kink of the discretisation moves them by its
 * error over the move, so that the bound is a hundredth of each slope's natural size.
 */
function slopesOf(method: Method, { contract, market }: Terms, { greeks }: PricingSuccess) {
  const { strike, expiry } = contract;
  const { spot, rate, volatility } = market;
  const deviation = volatility * Math.sqrt(expiry);
  const slope = (move: number, moved: (by: number) => Terms) =>
    (priced(method, moved(move)).value - priced(method, moved(-move)).value) / (2 * move);
  const ofSpot = slope(0.1 * deviation * spot, (by) => ({
    contract,
    market: { ...market, spot: spot + by },
  }));
  const ofTime = slope(0.05 * expiry, (by) => ({
    contract: { ...contract, expiry: expiry + by },
    market,
  }));
  const ofVolatility = slope(0.05 * volatility, (by) => ({
    contract,
    market: { ...market, volatility: volatility + by },
  }));
  const rateMove = Math.min(0.004, (0.05 * volatility) / Math.sqrt(expiry));
  const ofRate = slope(rateMove, (by) => ({ contract, market: { ...market, rate: rate + by } }));
  const size = Math.max(strike, spot);
  const asked = JSON.stringify({ contract, market });
  return [
    { asked, name: 'delta', gap: Math.abs(greeks.delta - ofSpot), bound: 0.01 },
    {
      asked,
      name: 'theta',
      gap: Math.abs(greeks.theta + ofTime),
      bound: (0.01 * size * (deviation + 0.2 * expiry)) / expiry,
    },
    {
      asked,
      name: 'vega',
      gap: Math.abs(greeks.vega - ofVolatility),
      bound: 0.015 * size * Math.sqrt(expiry),
    },
    { asked, name: 'rho', gap: Math.abs(greeks.rho - ofRate), bound: 0.015 * size * expiry + 1e-6 },
  ];
}

describe('between methods', () => {
  const american = methods.filter((method) =>
    runs.some((run) => run.method === method && run.exercise === 'american'),
  );

  it.each(american)('$name: American is worth at least European', (method) => {
    for (const terms of sample(deskTerms('american'), 40, 43)) {
      const european = { ...terms.contract, exercise: 'european' } as const;
      const floor = closedForm.price(european, terms.market, {});
      if (!floor.ok) throw new Error(floor.message);
      const { value, errorEstimate } = priced(method, terms);
      expect(value).toBeGreaterThanOrEqual(floor.value - (errorEstimate ?? 0));
    }
  });

  it('estimates are refuted in fewer than 5 % of the comparisons', () => {
    let compared = 0;
    let refuted = 0;
    for (const exercise of pricedExercises) {
      for (const terms of sample(deskTerms(exercise), 40, 44)) {
        const results = runs
          .filter((run) => run.exercise === exercise)
          .map(({ method }) => priced(method, terms));
        for (const a of results) {
          for (const b of results.slice(results.indexOf(a) + 1)) {
            if (a.errorEstimate === null || b.errorEstimate === null) continue;
            const errors = a.errorEstimate + b.errorEstimate + roundingOf(terms);
            compared++;
            if (Math.abs(a.value - b.value) > errors) refuted++;
          }
        }
      }
    }
    expect(refuted).toBeLessThan(0.05 * compared);
  });
});

describe('refusals by name, at the door', () => {
  const [{ contract, market }] = sample(deskTerms('american'), 1, 45);

  it.each(methods)('$name says what it does not price', (method) => {
    for (const exercise of pricedExercises) {
      const asked = { contract: { ...contract, exercise }, market, method: { name: method.name } };
      const result = price(asked);
      if (method.prices(asked.contract, market)) expect(result).toMatchObject({ ok: true });
      else expect(result).toMatchObject({ ok: false, code: 'method-does-not-price' });
    }
  });

  it.each(methods)('$name keeps to the caps', (method) => {
    for (const size of ['spaceSteps', 'timeSteps', 'steps'] as const) {
      if (method.defaultSettings[size] === undefined) continue;
      for (const [steps, code] of [
        [100_000, 'too-many-steps'],
        [0, 'too-few-steps'],
      ] as const) {
        const asked = { contract, market, method: { name: method.name, [size]: steps } };
        expect(price(asked)).toMatchObject({ ok: false, code, path: `method.${size}` });
      }
    }
  });
});
