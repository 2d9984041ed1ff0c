import { makeThetaStep } from '@/pricing/heat/theta-step';
import { exp, expm1 } from '@/pricing/numerics/elementary';
import { interpolate, nodeBelow, type LocalValue } from '@/pricing/numerics/interpolation';

/**
 * The European option as heat that spreads on a rod.
 *
 * With F = S·e^((r−q)T) the forward, x = ln(F/K), τ = σ²T/2 and V = K·e^(−rT)·e^(x/2 − τ/4)·u, the
 * Black–Scholes equation becomes u_τ = u_xx with no drift and no reaction left, and a call's payoff
 * becomes u(x,0) = 2·sinh(x/2) for x > 0, else 0. Measuring x by the forward instead of the spot
 * takes the drift out exactly, so a drift-dominated contract is no harder than another, and the
 * exponents stay within a few times σ√T. A put at x is a call at −x, and the side in the money is
 * the other one plus the forward's own value; hence one problem is left: the call at z = −|x|.
 *
 * Grid: uniform, the strike on a node, reach 7σ√T + σ²T/2 on both sides (beyond it the value out
 * of the money is below 1e-12 of the strike and is taken as 0). The payoff's kink is replaced by
 * its mean over the cell, which keeps the second order (Kreiss, Thomée and Widlund 1970); the
 * first two steps are four implicit half-steps (Rannacher 1984), then Crank–Nicolson. Upper edge:
 * 2·sinh(x/2)·e^(τ/4), the exact value of the forward's own heat; lower edge: 0.
 */
export type EuropeanHeat = { local: LocalValue; lambda: number };

const implicitSteps = 2;

/** Half the width of the grid for a total deviation σ√T. */
export function reachOf(deviation: number): number {
  return 7 * deviation + 0.5 * deviation * deviation;
}

/** u and its derivatives in z at `z` ≤ 0; both sizes at least 4. */
export function solveEuropeanHeat(
  z: number,
  deviation: number,
  spaceSteps: number,
  timeSteps: number,
): EuropeanHeat {
  const heatTime = 0.5 * deviation * deviation;
  const step = (2 * reachOf(deviation)) / spaceSteps;
  const timeStep = heatTime / timeSteps;
  const lambda = timeStep / (step * step);
  const strikeIndex = spaceSteps >> 1;
  const nodes = new Float64Array(spaceSteps + 1);
  const heat = new Float64Array(spaceSteps + 1);
  for (let j = 0; j <= spaceSteps; j++) {
    nodes[j] = (j - strikeIndex) * step;
    heat[j] = j > strikeIndex ? twoSinhHalf(nodes[j]) : 0;
  }
  const twoSinhEighth = expm1(step / 4) / exp(step / 8);
  heat[strikeIndex] = (2 * twoSinhEighth * twoSinhEighth) / step;

  const edge = heat[spaceSteps];
  const damping = makeThetaStep(lambda / 2, 1, spaceSteps);
  const stepping = makeThetaStep(lambda, 0.5, spaceSteps);
  for (let m = 0; m < timeSteps; m++) {
    const end = edge * exp(0.25 * (m + 1) * timeStep);
    if (m < implicitSteps) {
      damping(heat, 0, edge * exp(0.25 * (m + 0.5) * timeStep));
      damping(heat, 0, end);
    } else {
      stepping(heat, 0, end);
    }
  }
  const from = Math.min(Math.max(nodeBelow(nodes, z) - 2, 0), spaceSteps - 5);
  return { local: interpolate(nodes, heat, from, 6, z), lambda };
}

/** 2·sinh(x/2) without cancellation near 0. */
function twoSinhHalf(x: number): number {
  return expm1(x) / exp(0.5 * x);
}
