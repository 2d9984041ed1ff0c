import type { Contract, Market } from '@/pricing/contract';
import { rateBumpOf, type RateSensitivities } from '@/pricing/greeks';
import { solveNearby, type Boundary } from '@/pricing/spectral/boundary';
import { earlyExercisePremium } from '@/pricing/spectral/premium';
import { problemOf, regionsOf, type BoundaryProblem } from '@/pricing/spectral/problem';

/**
 * A fiftieth of the move that a grid needs: the collocation's error moves smoothly with the rates and
 * its rounding is near 1e-15, so that the difference is wrong by its own square only.
 */
const shareOfGridBump = 0.02;

/** By how many bumps the market is moved, and with which weight the value counts. */
type Difference = readonly { bumps: number; weight: number }[];

const central: Difference = [
  { bumps: 1, weight: 0.5 },
  { bumps: -1, weight: -0.5 },
];
const upwards: Difference = [
  { bumps: 0, weight: -1.5 },
  { bumps: 1, weight: 2 },
  { bumps: 2, weight: -0.5 },
];
const downwards: Difference = upwards.map(({ bumps, weight }) => ({
  bumps: bumps === 0 ? 0 : -bumps,
  weight: -weight,
}));

/**
 * The premium's derivatives by rate and yield, by differences of second order between boundaries that
 * are solved anew. Where the exercise region changes its kind within a bump (rate zero, or rate
 * and yield equal), the boundary has a kink there: the difference is then taken to one side.
 * Null where a moved boundary does not converge.
 */
export function premiumRates(
  contract: Contract,
  market: Market,
  boundary: Boundary,
  x: number,
  unit: number,
): { bump: number; sensitivities: RateSensitivities } | null {
  const bump = bumpOf(contract, market);
  const along = (rateBy: number, yieldBy: number) =>
    slopeAlong(boundary, x, bump, (bumps) =>
      problemOf(contract, market, bumps * bump * rateBy, bumps * bump * yieldBy),
    );
  if ('carry' in market) {
    const both = along(1, 1);
    return both === null ? null : { bump, sensitivities: { rho: unit * both, yieldRho: null } };
  }
  const rho = along(1, 0);
  const yieldRho = rho === null ? null : along(0, 1);
  if (rho === null || yieldRho === null) return null;
  return { bump, sensitivities: { rho: unit * rho, yieldRho: unit * yieldRho } };
}

const bumpOf = (contract: Contract, market: Market) =>
  shareOfGridBump * rateBumpOf(market, contract.expiry);

/** Whether an option that is never exercised would be, with rate or yield moved by a bump. */
export function changesWithinBump(contract: Contract, market: Market): boolean {
  const bump = bumpOf(contract, market);
  const moves =
    'carry' in market
      ? [[1, 1]]
      : [
          [1, 0],
          [0, 1],
        ];
  return moves.some(([rate, carry]) =>
    [bump, -bump].some(
      (by) => regionsOf(problemOf(contract, market, by * rate, by * carry)) !== 'none',
    ),
  );
}

function slopeAlong(
  boundary: Boundary,
  x: number,
  bump: number,
  moved: (bumps: number) => BoundaryProblem,
): number | null {
  const kind = regionsOf(moved(0));
  const staysFor = (difference: Difference) =>
    difference.every(({ bumps }) => regionsOf(moved(bumps)) === kind);
  const difference = [central, upwards, downwards].find(staysFor) ?? central;
  let sum = 0;
  for (const { bumps, weight } of difference) {
    const problem = moved(bumps);
    const regions = regionsOf(problem);
    if (regions === 'none') continue;
    const solved = regions === 'two' ? null : solveNearby(problem, boundary);
    if (solved === null) return null;
    sum += weight * earlyExercisePremium(problem, solved, x).value;
  }
  return sum / bump;
}
