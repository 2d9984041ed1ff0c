import { exp, log } from '@/pricing/numerics/elementary';
import { solveHeights } from '@/pricing/spectral/newton';
import { logStartOf, type BoundaryProblem } from '@/pricing/spectral/problem';
import {
  interpolationRow,
  lookedUp,
  spectralTable,
  type SpectralTable,
} from '@/pricing/spectral/tables';

/** H = ln²(B/X) at the nodes of a table: how far the boundary has gone from where it starts. */
export type Boundary = { table: SpectralTable; height: Float64Array; rounds: number };

const mostRounds = 30;
/** Relative move of a height at which the iteration ends; the error left is about its square. */
const fineTolerance = 1e-5;
const otherTolerance = 1e-4;
const roughTolerance = 1e-2;
const smallestHeight = 1e-12;

/** The sizes on the way to `nodes`: a few to start from, three quarters to measure the error by. */
export function sizesTo(nodes: number): number[] {
  const check = 2 * Math.round(0.375 * nodes);
  if (check <= 10) return [check, nodes];
  return check <= 32 ? [8, check, nodes] : [8, 24, check, nodes];
}

/** The boundary asked for, and one of another size that tells how far it may be wrong. */
export type SolvedBoundary = { asked: Boundary; other: Boundary };

/**
 * Size after size, each started from the one before; null where the nodes asked for do not converge.
 * Where the drift outruns the deviation by far, few nodes have no solution at all: a size that
 * fails is passed over, and if it was to be the other one, half as many nodes more take its place.
 */
export function solveBoundary(problem: BoundaryProblem, nodes: number): SolvedBoundary | null {
  let before: Boundary | null = null;
  let asked: Boundary | null = null;
  for (const size of sizesTo(nodes)) {
    before = asked;
    asked = solveAfter(before, problem, size, toleranceOf(size / nodes));
  }
  if (asked === null) return null;
  const other = before ?? solveAfter(asked, problem, Math.round(1.5 * nodes), otherTolerance);
  return other && { asked, other };
}

function toleranceOf(share: number): number {
  if (share < 0.7) return roughTolerance;
  return share < 1 ? otherTolerance : fineTolerance;
}

/** From the solution before, where there is one and it leads there, else from a first guess. */
function solveAfter(
  before: Boundary | null,
  problem: BoundaryProblem,
  nodes: number,
  tolerance: number,
): Boundary | null {
  const table = spectralTable(nodes);
  const from = (height: Float64Array) => solveFrom(problem, table, height, tolerance);
  const solved = before && from(refined(before, table));
  return solved ?? from(firstGuess(problem, table)) ?? from(slowGuess(problem, table));
}

function solveFrom(
  problem: BoundaryProblem,
  table: SpectralTable,
  height: Float64Array,
  tolerance: number,
): Boundary | null {
  const rounds = solveHeights(table, problem, height, tolerance, mostRounds);
  return rounds === null ? null : { table, height, rounds };
}

/** ln(B∞/K): the boundary of the option without expiry. */
function logPerpetual({ rate, carry, deviation }: BoundaryProblem): number {
  const variance = deviation * deviation;
  const half = 0.5 - (rate - carry) / variance;
  // The negative root λ, without the difference of two large numbers where `half` is positive.
  const wide = Math.sqrt(half * half + (2 * rate) / variance);
  const root = half > 0 ? (-2 * rate) / variance / (half + wide) : half - wide;
  return log(root / (root - 1));
}

/** From X to the perpetual boundary exponentially in √τ, with the slope that it has near expiry. */
function firstGuess(problem: BoundaryProblem, { nodes, z }: SpectralTable): Float64Array {
  const start = logStartOf(problem);
  const ratio = Math.min(exp(logPerpetual(problem) - start), 1 - 1e-6);
  const height = new Float64Array(nodes);
  for (let i = 0; i < nodes; i++) {
    const fall = exp((-2 * problem.deviation * z[i]) / (1 - ratio));
    const gap = log(ratio + (1 - ratio) * fall);
    height[i] = Math.max(gap * gap, 1e-14);
  }
  return height;
}

/** A quarter as steep, for a boundary that falls on and on: without interest it has no limit. */
function slowGuess({ deviation }: BoundaryProblem, { z }: SpectralTable): Float64Array {
  return z.map((root) => 0.25 * deviation * deviation * root * root);
}

/**
 * The polynomial of another solution; below its smallest node, where a polynomial knows nothing of
 * the law near expiry, H/τ continues in a straight line in ln √τ.
 */
function refined({ table, height: coarse }: Boundary, { nodes, z }: SpectralTable): Float64Array {
  const last = table.nodes - 1;
  const end = table.z[last];
  const endSlope = coarse[last] / (end * end);
  const beforeEnd = table.z[last - 1];
  const beforeSlope = coarse[last - 1] / (beforeEnd * beforeEnd);
  const bend = (beforeSlope - endSlope) / log(beforeEnd / end);
  const row = new Float64Array(table.nodes);
  const height = new Float64Array(nodes);
  for (let i = 0; i < nodes; i++) {
    if (z[i] < end) {
      const slope = endSlope + bend * log(z[i] / end);
      height[i] = Math.max(slope, 0.3 * endSlope) * z[i] * z[i];
    } else {
      interpolationRow(table.z, z[i], row);
      height[i] = lookedUp(table.nodes, row, 0, coarse);
    }
    if (!(height[i] > smallestHeight)) height[i] = smallestHeight;
  }
  return height;
}
