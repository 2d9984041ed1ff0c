import { driftingRoll } from '@/pricing/lattice/drifting-roll-back';
import {
  jarrowRuddStep,
  leisenReimerStep,
  tianStep,
  trinomialStep,
} from '@/pricing/lattice/drifting-steps';
import { plainLocal, prunedLocal, smoothLocal, type ReadLattice } from '@/pricing/lattice/local';
import { levelRoll, type MakeRoll } from '@/pricing/lattice/roll';
import { crrStep, symmetricStep, type MakeWalkStep } from '@/pricing/lattice/walk';
import { logRatio } from '@/pricing/numerics/elementary';

/** What tells one lattice from another: its step, how it is rolled back, read and refined. */
export type LatticeKind = {
  stepFor: (spot: number, strike: number) => MakeWalkStep;
  makeRoll: MakeRoll;
  readPlain: ReadLattice;
  readSmooth: ReadLattice;
  /** About steps/divisor: the size of a coarser walk that this one is extrapolated with. */
  part: (steps: number, divisor: number) => number;
  /** The order of the European error that extrapolation cancels; of an American one it is 1. */
  europeanOrder: 1 | 2;
  /**
   * Whether the plain tree's own revaluations give the rates' Greeks of an American option. Where
   * a bump of the rate moves the nodes past the strike they cannot: refined ones are taken then.
   */
  bumpsPlain: boolean;
  /**
   * The estimate of an extrapolated American value: so many times its distance from the one of half
   * the steps, or that one's from the next where this is more. Zero asks for no third value.
   */
  doubt: { last: number; before: number };
  /** Why a step may not exist, in the first part of a sentence. */
  whyNoStep: string;
};

const shared = {
  readPlain: plainLocal,
  readSmooth: smoothLocal,
  part: (steps: number, divisor: number) => Math.ceil(steps / divisor),
  europeanOrder: 1,
  bumpsPlain: true,
  doubt: { last: 3, before: 1 },
  whyNoStep:
    'In one step of this walk the drift outruns the volatility, and its probabilities leave the range from 0 to 1',
} as const;

const level = { ...shared, makeRoll: levelRoll, doubt: { last: 3, before: 0 } } as const;
const drifting = { ...shared, makeRoll: driftingRoll, bumpsPlain: false } as const;

export const crrLattice: LatticeKind = { ...level, stepFor: () => crrStep };
export const symmetricLattice: LatticeKind = { ...level, stepFor: () => symmetricStep };
export const jarrowRuddLattice: LatticeKind = { ...drifting, stepFor: () => jarrowRuddStep };
export const tianLattice: LatticeKind = { ...drifting, stepFor: () => tianStep };
export const trinomialLattice: LatticeKind = {
  ...shared,
  makeRoll: driftingRoll,
  stepFor: () => trinomialStep,
};
export const leisenReimerLattice: LatticeKind = {
  ...shared,
  makeRoll: driftingRoll,
  stepFor: (spot, strike) => leisenReimerStep(logRatio(spot, strike)),
  readPlain: prunedLocal,
  readSmooth: prunedLocal,
  part: (steps, divisor) => Math.ceil(steps / divisor) | 1,
  europeanOrder: 2,
  doubt: { last: 1, before: 0.5 },
  whyNoStep: 'The strike is too many deviations away for so short a walk of this kind',
};
