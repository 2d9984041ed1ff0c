import type { Contract, Market } from '@/pricing/contract';
import { rateBumpOf, type RateSensitivities } from '@/pricing/greeks';
import { solveDense } from '@/pricing/numerics/dense';
import type { Boundary } from '@/pricing/spectral/boundary';
import { earlyExercisePremium } from '@/pricing/spectral/premium';
import { problemOf, regionsOf, type BoundaryProblem } from '@/pricing/spectral/problem';
import { evaluateResidual, fillGrowth } from '@/pricing/spectral/residual';

/**
 * A two-hundredth of the move that a grid needs: the collocation's error moves smoothly with the rates and
 * its rounding is near 1e-15, so that the difference is wrong by its own square only.
 */
const shareOfGridBump = 0.005;
const mostHalvings = 12;

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
 * The premium's derivatives by rate and yield. How the boundary moves follows from its equation: the
 * heights' slopes solve J·H′ = −R′, J the derivatives by the heights and R′ the residuals' difference in
 * the rate. The premium is then the difference of second order along rate and heights together.
 * Where the exercise region changes its kind within a bump (rate zero, or rate and yield equal) the
 * boundary has a kink, and the differences are taken to one side of it. Null where none is free.
 */
export function premiumRates(
  contract: Contract,
  market: Market,
  boundary: Boundary,
  x: number,
  unit: number,
): { bump: number; sensitivities: RateSensitivities } | null {
  const bump = bumpOf(contract, market);
  const problem = problemOf(contract, market, 0, 0);
  const { table, height } = boundary;
  fillGrowth(table, problem.carry);
  evaluateResidual(table, problem, height, true);
  const jacobian = table.work.jacobian.slice();
  const along = (rateBy: number, yieldBy: number) =>
    slopeAlong(boundary, jacobian, x, bump, (by) =>
      problemOf(contract, market, by * rateBy, by * yieldBy),
    );
  if ('carry' in market) {
    const both = along(1, 1);
    return both === null ? null : { bump, sensitivities: { rho: unit * both, yieldRho: null } };
  }
  const rho = along(1, 0);
  const yieldRho = along(0, 1);
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
  { table, height }: Boundary,
  jacobian: Float64Array,
  x: number,
  bump: number,
  moved: (by: number) => BoundaryProblem,
): number | null {
  const free = freeDifference(bump, moved);
  if (free === null) return null;
  const { difference, size } = free;
  const slope = new Float64Array(table.nodes);
  for (const { bumps, weight } of difference) {
    const problem = moved(bumps * size);
    fillGrowth(table, problem.carry);
    evaluateResidual(table, problem, height, false);
    for (let i = 0; i < slope.length; i++) slope[i] -= (weight / size) * table.work.residual[i];
  }
  table.work.jacobian.set(jacobian);
  solveDense(table.nodes, table.work.jacobian, slope);
  let sum = 0;
  for (const { bumps, weight } of difference) {
    const at = { table, height: height.map((h, i) => h + bumps * size * slope[i]), rounds: 0 };
    sum += weight * earlyExercisePremium(moved(bumps * size), at, x).value;
  }
  return sum / size;
}

/** The difference, and the largest size of its bumps, that stays within one kind of region. */
function freeDifference(
  bump: number,
  moved: (by: number) => BoundaryProblem,
): { difference: Difference; size: number } | null {
  const kind = regionsOf(moved(0));
  for (let halvings = 0, size = bump; halvings < mostHalvings; halvings++, size /= 2) {
    const difference = [central, upwards, downwards].find((candidate) =>
      candidate.every(({ bumps }) => regionsOf(moved(bumps * size)) === kind),
    );
    if (difference) return { difference, size };
  }
  return null;
}
