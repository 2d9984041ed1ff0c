import type { Contract, Market } from '@/pricing/contract';
import { carryYield } from '@/pricing/conventions';
import type { WalkStep } from '@/pricing/lattice/walk';
import { exp } from '@/pricing/numerics/elementary';

/** A larger defect than this no longer shrinks as the extrapolation supposes. */
const asymptotic = 0.1;

/**
 * What the extrapolation cannot see. A walk should carry a bond and the spot itself without error;
 * its *defect* is the share of them that it loses or gains over the life of the option (rounding
 * for probabilities matched to the forward, n·(αh)⁴/12 for the symmetric walk). Extrapolation
 * removes a small defect, but not a large one; and where holding and exercising are nearly worth
 * the same, a defect larger than what exercise earns decides for the wrong one at every node, so
 * that all sizes agree on it. In both cases the error may be the defect itself.
 */
export function defectDoubt(
  contract: Contract,
  market: Market,
  walk: WalkStep,
  steps: number,
  value: number,
): number {
  const { strike, expiry, kind, exercise } = contract;
  const { spot, rate } = market;
  const carry = carryYield(market);
  const rise = exp(walk.growth * walk.step);
  const ofBond = (walk.up + walk.middle + walk.down) * exp((rate * expiry) / steps) - 1;
  const moved = walk.up * rise + walk.middle + walk.down / rise;
  const ofSpot = moved * exp(walk.drift + (carry * expiry) / steps) - 1;
  const defect = steps * Math.max(Math.abs(ofBond), Math.abs(ofSpot));
  if (defect > asymptotic) {
    return Math.min(defect, 1) * (strike * exp(-rate * expiry) + spot * exp(-carry * expiry));
  }
  const doubt = defect * (strike + spot);
  const intrinsic = kind === 'call' ? spot - strike : strike - spot;
  const undecided = exercise === 'american' && intrinsic > 0 && value - intrinsic <= doubt;
  const earned = 0.5 * expiry * Math.abs(rate * strike - carry * spot);
  return undecided && doubt > earned ? doubt : 0;
}
