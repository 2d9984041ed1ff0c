import { makePowers, rollBack, type RollBackTerms } from '@/pricing/lattice/roll-back';
import type { WalkStep } from '@/pricing/lattice/walk';

/** Values at the lead + 1 nodes of now, by a roll-back that keeps its tables between calls. */
export type Roll = (
  walk: WalkStep,
  steps: number,
  lead: number,
  shift: number,
  deviations: number | null,
) => Float64Array;

export type MakeRoll = (terms: RollBackTerms) => Roll;

/** The longest lead that is asked for: a table of powers of this much more serves them all. */
export const longestLead = 6;

/** For walks of two branches without drift: their nodes at all instants are two ladders of prices. */
export const levelRoll: MakeRoll = (terms) => {
  const powersBySteps = new Map<number, Float64Array>();
  return (walk, steps, lead, shift, deviations) => {
    let powers = powersBySteps.get(steps);
    if (powers === undefined) {
      powers = makePowers(walk.step, steps + longestLead);
      powersBySteps.set(steps, powers);
    }
    return rollBack(terms, walk, powers, steps, lead, shift, deviations);
  };
};
