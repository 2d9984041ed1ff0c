import type { RollBackTerms } from '@/pricing/lattice/roll-back';
import type { Roll } from '@/pricing/lattice/roll';
import type { WalkStep } from '@/pricing/lattice/walk';
import { exp } from '@/pricing/numerics/elementary';

/** Levels between two prices by `exp`; those between follow by one product each. */
const anchorEvery = 32;

/**
 * Backward induction on any walk of `walk.ts`, its nodes drifting or not, of two branches or three.
 *
 * The walk starts before now, so that now holds lead + 1 nodes at shift + (2j − lead)·step from
 * ln(spot); `age` steps later there are lead + growth·age + 1 of them, moved by age·drift. The price
 * at node j is the level's own factor times e^((2j − last)·step), `last` the highest node at expiry:
 * one table for the whole walk, kept from roll to roll as long as step and size stay. Both factors
 * stay below e^600, and their product is a price on the walk.
 *
 * Nodes that are met with a probability below 1e-11 are left out as in `roll-back.ts`.
 */
export function driftingRoll(terms: RollBackTerms): Roll {
  const { spot, strike, american } = terms;
  const sign = terms.kind === 'call' ? 1 : -1;
  let prices = new Float64Array(0);
  let values = new Float64Array(0);
  let tableStep = NaN;
  let tableLast = -1;

  function prepare(step: number, last: number): void {
    if (values.length <= last) {
      prices = new Float64Array(last + 1);
      values = new Float64Array(last + 1);
      tableLast = -1;
    }
    if (step === tableStep && last === tableLast) return;
    for (let j = 0; j <= last; j++) prices[j] = exp((2 * j - last) * step);
    tableStep = step;
    tableLast = last;
  }

  return (walk, steps, lead, shift, deviations) => {
    const { step, drift, growth, up, middle, down } = walk;
    const last = lead + growth * steps;
    prepare(step, last);
    const factorAt = (age: number) =>
      sign * spot * exp(shift + age * drift + growth * (steps - age) * step);
    const backwards = exp(growth * step - drift);
    const owed = sign * strike;

    let factor = factorAt(steps);
    for (let j = 0; j <= last; j++) {
      const gain = factor * prices[j] - owed;
      values[j] = gain > 0 ? gain : 0;
    }
    const { mean, variance } = indexMoments(walk);
    for (let age = steps - 1; age >= 0; age--) {
      factor = age % anchorEvery === 0 ? factorAt(age) : factor * backwards;
      const highest = lead + growth * age;
      const spread = deviations === null ? highest : deviations * Math.sqrt(age * variance) + 1;
      const low = Math.max(0, Math.floor(age * mean - spread));
      const high = Math.min(highest, Math.ceil(age * mean + spread) + lead);
      if (growth === 2) {
        if (american) betterOfThree(values, prices, low, high, down, middle, up, factor, owed);
        else meanOfThree(values, low, high, down, middle, up);
      } else if (american) betterOfTwo(values, prices, low, high, down, up, factor, owed);
      else meanOfTwo(values, low, high, down, up);
    }
    return values.slice(0, lead + 1);
  };
}

/** Mean and variance, per step, of the index of the node that the walk is at. */
function indexMoments({ growth, up, middle, down }: WalkStep): { mean: number; variance: number } {
  const total = up + middle + down;
  const toTop = up / total;
  const toMiddle = middle / total;
  const mean = growth * toTop + toMiddle;
  return { mean, variance: growth * growth * toTop + toMiddle - mean * mean };
}

function meanOfTwo(values: Float64Array, low: number, high: number, down: number, up: number) {
  let here = values[low];
  for (let j = low; j <= high; j++) {
    const next = values[j + 1];
    values[j] = down * here + up * next;
    here = next;
  }
}

function betterOfTwo(
  values: Float64Array,
  prices: Float64Array,
  low: number,
  high: number,
  down: number,
  up: number,
  factor: number,
  owed: number,
): void {
  let here = values[low];
  for (let j = low; j <= high; j++) {
    const next = values[j + 1];
    const held = down * here + up * next;
    const taken = factor * prices[j] - owed;
    values[j] = held > taken ? held : taken;
    here = next;
  }
}

function meanOfThree(
  values: Float64Array,
  low: number,
  high: number,
  down: number,
  middle: number,
  up: number,
): void {
  let here = values[low];
  let next = values[low + 1];
  for (let j = low; j <= high; j++) {
    const after = values[j + 2];
    values[j] = down * here + middle * next + up * after;
    here = next;
    next = after;
  }
}

function betterOfThree(
  values: Float64Array,
  prices: Float64Array,
  low: number,
  high: number,
  down: number,
  middle: number,
  up: number,
  factor: number,
  owed: number,
): void {
  let here = values[low];
  let next = values[low + 1];
  for (let j = low; j <= high; j++) {
    const after = values[j + 2];
    const held = down * here + middle * next + up * after;
    const taken = factor * prices[j] - owed;
    values[j] = held > taken ? held : taken;
    here = next;
    next = after;
  }
}
