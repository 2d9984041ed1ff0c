import { longestLead, type Roll } from '@/pricing/lattice/roll';
import type { RollBackTerms } from '@/pricing/lattice/roll-back';
import type { WalkStep } from '@/pricing/lattice/walk';
import { exp, log } from '@/pricing/numerics/elementary';
import { interpolate, type LocalValue } from '@/pricing/numerics/interpolation';

/** The value and its derivatives in x = ln(spot), at the spot and now. */
export type LatticeLocal = LocalValue & { exercised: boolean };

export type LatticeRun = { terms: RollBackTerms; walk: WalkStep; steps: number; roll: Roll };

export type ReadLattice = (run: LatticeRun) => LatticeLocal;

const plainLead = 2;
const smoothLead = longestLead;
const shifts = [-0.75, -0.25, 0.25, 0.75];
const prunedDeviations = 7;

/** The stated tree, every node of it; derivatives by its three nodes of now. */
export function plainLocal({ terms, walk, steps, roll }: LatticeRun): LatticeLocal {
  const values = roll(walk, steps, plainLead, 0, null);
  const x = Float64Array.of(-2 * walk.step, 0, 2 * walk.step);
  const { first, second } = interpolate(x, values, 0, 3, 0);
  return { value: values[1], first, second, exercised: isExercised(terms, values[1], 0) };
}

/**
 * The mean over four walks whose nodes are shifted by −¾, −¼, ¼ and ¾ of a step h (nodes lie 2h
 * apart, so the shifts are even). Where strike and exercise boundary fall between nodes moves the
 * value of a single walk up and down as n grows; over a full period that cancels, and what is left
 * falls smoothly like 1/n, so that it can be extrapolated.
 */
export function smoothLocal({ terms, walk, steps, roll }: LatticeRun): LatticeLocal {
  const deviations = prunedDeviations + walk.step * Math.sqrt(steps);
  const mean: LatticeLocal = { value: 0, first: 0, second: 0, exercised: true };
  for (const fraction of shifts) {
    const shift = shiftOf(terms, walk, steps, fraction);
    const values = roll(walk, steps, smoothLead, shift, deviations);
    const local = readAtSpot(terms, values, walk.step, shift);
    mean.value += local.value / shifts.length;
    mean.first += local.first / shifts.length;
    mean.second += local.second / shifts.length;
    mean.exercised &&= local.exercised;
  }
  return mean;
}

/**
 * The stated tree, less the nodes beyond its reach, read through as many nodes of now as the smooth
 * ones are: for a walk that is laid out for its strike and must not be shifted.
 */
export function prunedLocal({ terms, walk, steps, roll }: LatticeRun): LatticeLocal {
  const deviations = prunedDeviations + walk.step * Math.sqrt(steps);
  const values = roll(walk, steps, smoothLead, 0, deviations);
  const local = readAtSpot(terms, values, walk.step, 0);
  return local.exercised ? local : { ...local, value: values[smoothLead / 2] };
}

/** The shift within (−h, h] that puts the strike at `fraction` of a step from a last node. */
function shiftOf({ spot, strike }: RollBackTerms, walk: WalkStep, steps: number, fraction: number) {
  const { step, drift, growth } = walk;
  const last = growth * steps + smoothLead;
  const place = (log(strike / spot) - steps * drift) / step + fraction - last;
  return (place - 2 * Math.ceil((place - 1) / 2)) * step;
}

/**
 * The polynomial through those nodes of now that are held: the two around the spot and their
 * neighbours up to the exercise boundary, beyond which the value bends.
 */
function readAtSpot(
  terms: RollBackTerms,
  values: Float64Array,
  step: number,
  shift: number,
): LatticeLocal {
  const lead = values.length - 1;
  const x = values.map((_, j) => shift + (2 * j - lead) * step);
  const exercised = (j: number) => isExercised(terms, values[j], x[j]);
  let from = shift > 0 ? lead / 2 - 1 : lead / 2;
  let to = from + 1;
  if (exercised(from) && exercised(to)) {
    const sign = terms.kind === 'call' ? 1 : -1;
    const first = sign * terms.spot;
    return { value: first - sign * terms.strike, first, second: first, exercised: true };
  }
  while (from > 0 && !exercised(from - 1)) from--;
  while (to < lead && !exercised(to + 1)) to++;
  return { ...interpolate(x, values, from, to - from + 1, 0), exercised: false };
}

function isExercised({ spot, strike, kind, american }: RollBackTerms, value: number, x: number) {
  if (!american) return false;
  const price = spot * exp(x);
  const intrinsic = kind === 'call' ? price - strike : strike - price;
  return intrinsic > 0 && value - intrinsic <= 1e-13 * Math.max(price, strike);
}
