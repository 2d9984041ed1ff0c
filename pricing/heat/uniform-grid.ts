import { reachOf } from '@/pricing/heat/european-grid';
import type { AmericanPut } from '@/pricing/heat/american-grid';
import { makeObstacleStep } from '@/pricing/heat/obstacle-step';
import { makeThetaStep } from '@/pricing/heat/theta-step';
import { exp, expm1 } from '@/pricing/numerics/elementary';
import { interpolate, nodeBelow, type LocalValue } from '@/pricing/numerics/interpolation';

/**
 * A put, European or American, as heat on a uniform rod: the grid of the two textbook schemes.
 *
 * With t the time to expiry, y = ln(S/K) + (r−q)·t the logarithm of the forward over the strike,
 * τ = σ²t/2 and V = K·e^(−rt)·e^(y/2 − τ/4)·u, the equation is u_τ = u_xx and nothing else, so that
 * one explicit step is exactly the mean over a walk that goes one node left or right with
 * probability λ = k/h² each and stays with 1 − 2λ: it diffuses by h²/(2k) per step, whatever the
 * market. Early exercise is an obstacle that moves with the forward instead of with the grid:
 *   u ≥ a(t)·e^(−y/2) − b(t)·e^(y/2),  a = e^(rt + τ/4),  b = e^(qt + τ/4).
 *
 * Grid: 7σ√T + σ²T/2 to either side of the forward (paths that leave it weigh less than 1e-11), moved
 * by less than a cell to put the strike on a node, where the payoff is its mean over the cell. At
 * the edges u is the larger of the exact heat of the forward, 2·sinh(−y/2)·e^(τ/4), of nothing and of
 * the obstacle. Equal time steps. Error: order 2 in h, order 1 in k.
 */
export type HeatPut = AmericanPut & { american: boolean };

export type UniformSolution = {
  /** v = V/K and its derivatives in ln S, at the spot. */
  local: LocalValue;
  exercised: boolean;
};

export type Scheme = 'explicit' | 'implicit';

/** k/h² of the grid: the same for every contract of one total deviation σ√T. */
export function lambdaOf(deviation: number, spaceSteps: number, timeSteps: number): number {
  const step = (2 * reachOf(deviation)) / spaceSteps;
  return (0.5 * deviation * deviation) / timeSteps / (step * step);
}

export function deviationOf({ volatility, expiry }: AmericanPut): number {
  return volatility * Math.sqrt(expiry);
}

/** y at the spot, now. */
function forwardPlace(problem: AmericanPut): number {
  return problem.x + (problem.rate - problem.yield) * problem.expiry;
}

/** Nodes in y; bumped problems share those of the problem that they are compared with. */
export function makeUniformNodes(problem: AmericanPut, spaceSteps: number): Float64Array {
  const reach = reachOf(deviationOf(problem));
  const step = (2 * reach) / spaceSteps;
  const lowest = forwardPlace(problem) - reach;
  const below = -lowest / step;
  const strikeIsInside = below > 0 && below < spaceSteps;
  const nodes = new Float64Array(spaceSteps + 1);
  for (let j = 0; j <= spaceSteps; j++) {
    nodes[j] = strikeIsInside ? (j - Math.round(below)) * step : lowest + j * step;
  }
  return nodes;
}

export function solveUniformPut(
  problem: HeatPut,
  nodes: Float64Array,
  timeSteps: number,
  scheme: Scheme,
): UniformSolution {
  const { rate, yield: carry, volatility, expiry, american } = problem;
  const intervals = nodes.length - 1;
  const lambda = lambdaOf(deviationOf(problem), intervals, timeSteps);
  const falling = nodes.map((y) => exp(-0.5 * y));
  const rising = nodes.map((y) => exp(0.5 * y));
  const forwardHeat = nodes.map((y, j) => -expm1(y) * falling[j]);
  const heat = payoffHeat(nodes, forwardHeat);

  const obstacle = new Float64Array(intervals + 1).fill(-Infinity);
  const raiseObstacle = (time: number, growth: number) => {
    const a = exp(rate * time) * growth;
    const b = exp(carry * time) * growth;
    for (let j = 0; j <= intervals; j++) obstacle[j] = a * falling[j] - b * rising[j];
  };
  const plainStep = makeThetaStep(lambda, scheme === 'explicit' ? 0 : 1, intervals);
  const obstacleStep = makeObstacleStep(lambda, intervals, rate >= 0);
  for (let m = 1; m <= timeSteps; m++) {
    const time = (expiry * m) / timeSteps;
    const growth = exp(0.125 * volatility * volatility * time);
    if (american) raiseObstacle(time, growth);
    const edge = (j: number) => Math.max(forwardHeat[j] * growth, obstacle[j], 0);
    if (american && scheme === 'implicit') {
      obstacleStep(heat, obstacle, edge(0), edge(intervals));
    } else {
      plainStep(heat, edge(0), edge(intervals));
      if (american) {
        for (let j = 0; j <= intervals; j++) if (heat[j] < obstacle[j]) heat[j] = obstacle[j];
      }
    }
  }
  return readAtSpot(problem, nodes, heat, obstacle);
}

function payoffHeat(nodes: Float64Array, forwardHeat: Float64Array): Float64Array {
  const heat = forwardHeat.map((value) => (value > 0 ? value : 0));
  const strikeIndex = nodes.indexOf(0);
  if (strikeIndex >= 0) {
    // Half a cell below the strike: the integral of 2·sinh(−y/2) is 8·sinh²(h/8).
    const step = nodes[1] - nodes[0];
    const twoSinhEighth = expm1(step / 4) / exp(step / 8);
    heat[strikeIndex] = (2 * twoSinhEighth * twoSinhEighth) / step;
  }
  return heat;
}

/** By up to six nodes around the spot that are all held: the value bends at the exercise boundary. */
function readAtSpot(
  problem: HeatPut,
  nodes: Float64Array,
  heat: Float64Array,
  obstacle: Float64Array,
): UniformSolution {
  const place = forwardPlace(problem);
  const last = nodes.length - 1;
  const index = nodeBelow(nodes, place);
  const exercised = (j: number) => obstacle[j] > 0 && heat[j] <= obstacle[j];
  if (exercised(index) && exercised(index + 1)) {
    const spot = exp(problem.x);
    return { local: { value: 1 - spot, first: -spot, second: -spot }, exercised: true };
  }
  let low = index;
  while (low > Math.max(index - 5, 0) && !exercised(low - 1)) low--;
  let high = index + 1;
  while (high < Math.min(index + 6, last) && !exercised(high + 1)) high++;
  const from = Math.max(low, Math.min(index - 2, high - 5));
  const count = Math.min(6, high - from + 1);
  const u = interpolate(nodes, heat, from, count, place);
  const { rate, expiry } = problem;
  const deviation = deviationOf(problem);
  const scale = exp(0.5 * place - rate * expiry - 0.125 * deviation * deviation);
  return {
    local: {
      value: scale * u.value,
      first: scale * (0.5 * u.value + u.first),
      second: scale * (0.25 * u.value + u.first + u.second),
    },
    exercised: false,
  };
}
