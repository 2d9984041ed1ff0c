import { exp, expm1, log } from '@/pricing/numerics/elementary';
import { interpolate, nodeBelow, type LocalValue } from '@/pricing/numerics/interpolation';
import {
  factorTridiagonal,
  makeFactors,
  solveProjected,
  type Tridiagonal,
  type TridiagonalFactors,
} from '@/pricing/numerics/tridiagonal';
import { makePolicySolver } from '@/pricing/heat/policy';

/**
 * The American put as a heat problem with an obstacle, per unit of strike.
 *
 * In x = ln(S/K) the value v = V/K obeys, where it is not exercised,
 *   v_t = ½σ²·v_xx + ν·v_x − r·v,  ν = r − q − ½σ²,  v ≥ 1 − eˣ,  t the time to expiry.
 * This is the heat equation of `european-grid.ts` before its exponential factor e^(αx+βτ) is split
 * off. The factor is left in place here on purpose: with early exercise x cannot follow the
 * forward (the obstacle would move), and α = −ν/σ² makes e^(αx) overflow when the drift dominates.
 * American calls are puts: C(S, K, r, q) = P(K, S, q, r) (change of numeraire), so one problem is
 * left.
 *
 * Grid. The value bends sharply at the strike and at the exercise boundary, which start from the
 * same point. Nodes are x = A·sinh(y), y uniform, the strike on a node, its payoff the mean over
 * the cell; A = 0.35·min(σ√T, 4·|ln B∞|), where B∞ is the perpetual boundary. The lower edge lies
 * just below B∞ (everything beyond is exercised), else 6σ√T and the drift below spot and strike;
 * the upper edge 6σ√T and half the drift above. Time: t = T·(k/N)², because the boundary moves
 * like √t and equal steps would lose the second order; the first two steps are four implicit
 * half-steps (Rannacher 1984), then Crank–Nicolson. In each step the obstacle problem is solved
 * exactly: Brennan–Schwartz where r ≥ 0 (one boundary), iteration on the exercise policy where
 * r < 0 (two boundaries, or none). The last step is again two implicit half-steps: each node that
 * the boundary passes is left with a sawtooth that Crank–Nicolson hardly damps, invisible in the
 * value but 5 % of gamma. Error: second order in both steps.
 */
export type AmericanPut = {
  /** ln(S/K). */
  x: number;
  rate: number;
  yield: number;
  volatility: number;
  expiry: number;
};

export type AmericanNodes = { x: Float64Array; strikeIndex: number };

export type AmericanSolution = {
  /** v and its derivatives in x at the spot. */
  local: LocalValue;
  exercised: boolean;
  /** x of the exercise boundary now; null where nothing on the grid is exercised. */
  boundary: number | null;
  /** Largest ½σ²·Δt/Δx² of all steps and cells: how far from an explicit scheme this is. */
  stability: number;
  /** The drift outruns the diffusion of the cells at the strike or at the spot. */
  firstOrder: boolean;
};

/** Steps at either end that are taken as two implicit half-steps each. */
const openingSteps = 2;
const closingSteps = 1;

/** ln B∞/K of the perpetual put; null where it is never exercised or has two boundaries (r < 0). */
export function perpetualLogBoundary(problem: AmericanPut): number | null {
  const { rate, volatility } = problem;
  if (rate < 0) return null;
  const variance = volatility * volatility;
  const half = 0.5 - (rate - problem.yield) / variance;
  const root = half - Math.sqrt(half * half + (2 * rate) / variance);
  if (!(root < -1e-9)) return null;
  return log(root / (root - 1));
}

export function makeAmericanNodes(problem: AmericanPut, spaceSteps: number): AmericanNodes {
  const deviation = problem.volatility * Math.sqrt(problem.expiry);
  const drift = driftOf(problem) * problem.expiry;
  const perpetual = perpetualLogBoundary(problem);
  const deepest = Math.min(problem.x, 0) - 6 * deviation - Math.max(-drift, 0);
  const justBelow = perpetual === null ? deepest : perpetual - 0.02 * deviation;
  const low = Math.max(deepest, justBelow);
  const high = Math.max(problem.x, 0) + 6 * deviation + 0.5 * Math.max(drift, 0);
  const gap = perpetual === null ? deviation : Math.max(-4 * perpetual, 0.01 * deviation);
  const scale = 0.35 * Math.min(deviation, gap);

  const lowest = asinh(low / scale);
  const step = (asinh(high / scale) - lowest) / spaceSteps;
  const strikeIndex = Math.max(1, Math.ceil(-lowest / step - 1e-9));
  const x = new Float64Array(spaceSteps + 1);
  for (let j = 0; j <= spaceSteps; j++) x[j] = scale * sinh((j - strikeIndex) * step);
  return { x, strikeIndex };
}

/** Spots below the lowest node are exercised at once. Sizes: nodes at least 8, time steps 4. */
export function solveAmericanPut(
  problem: AmericanPut,
  nodes: AmericanNodes,
  timeSteps: number,
): AmericanSolution {
  const { x } = nodes;
  const intervals = x.length - 1;
  const obstacle = new Float64Array(intervals + 1);
  for (let j = 0; j <= intervals; j++) obstacle[j] = -expm1(x[j]);
  const values = payoffOf(nodes, obstacle);
  const stability = stepThroughTime(problem, nodes, values, obstacle, timeSteps);
  const spotIndex = Math.min(Math.max(nodeBelow(x, problem.x), 1), intervals - 1);
  const firstOrder = isUpwinded(problem, x, nodes.strikeIndex) || isUpwinded(problem, x, spotIndex);
  return {
    ...readAt(problem.x, isEverExercised(problem), x, values, obstacle),
    stability,
    firstOrder,
  };
}

function payoffOf(nodes: AmericanNodes, obstacle: Float64Array): Float64Array {
  const { x, strikeIndex } = nodes;
  const values = obstacle.map((intrinsic) => (intrinsic > 0 ? intrinsic : 0));
  const below = 0.5 * (x[strikeIndex] - x[strikeIndex - 1]);
  const above = 0.5 * (x[strikeIndex + 1] - x[strikeIndex]);
  // ∫(1 − eˣ) from −below to 0 is below − (1 − e^−below).
  values[strikeIndex] = (below + expm1(-below)) / (below + above);
  return values;
}

/** Exercise earns r·K − q·S on the strike, which is positive for some S < K only then. */
function isEverExercised({ rate, yield: carry }: AmericanPut): boolean {
  return rate > 0 || carry < rate;
}

type Generator = { lower: Float64Array; upper: Float64Array; rate: number };

/** Whether central differences of drift and diffusion would give a cell a negative weight. */
function isUpwinded(problem: AmericanPut, x: Float64Array, j: number): boolean {
  const variance = problem.volatility * problem.volatility;
  const drift = driftOf(problem);
  return variance < drift * (x[j + 1] - x[j]) || variance < -drift * (x[j] - x[j - 1]);
}

/** v_t = lower·v[j−1] − (lower + upper + r)·v[j] + upper·v[j+1] at inner node j (index j − 1). */
function generatorOf(problem: AmericanPut, x: Float64Array): Generator {
  const variance = problem.volatility * problem.volatility;
  const drift = driftOf(problem);
  const inner = x.length - 2;
  const lower = new Float64Array(inner);
  const upper = new Float64Array(inner);
  for (let j = 1; j <= inner; j++) {
    const left = x[j] - x[j - 1];
    const right = x[j + 1] - x[j];
    if (!isUpwinded(problem, x, j)) {
      lower[j - 1] = (variance - drift * right) / (left * (left + right));
      upper[j - 1] = (variance + drift * left) / (right * (left + right));
    } else {
      // The drift crosses more than the cell can diffuse: difference against it, first order.
      lower[j - 1] = variance / (left * (left + right)) + (drift < 0 ? -drift / left : 0);
      upper[j - 1] = variance / (right * (left + right)) + (drift > 0 ? drift / right : 0);
    }
  }
  return { lower, upper, rate: problem.rate };
}

function stepThroughTime(
  problem: AmericanPut,
  nodes: AmericanNodes,
  values: Float64Array,
  obstacle: Float64Array,
  timeSteps: number,
): number {
  const generator = generatorOf(problem, nodes.x);
  const stepper = makeStepper(generator, values, obstacle, problem.rate >= 0);
  const lowEdge = (time: number) => {
    const held = exp(-problem.rate * time) - exp(nodes.x[0] - problem.yield * time);
    return held > obstacle[0] ? held : obstacle[0];
  };
  let longest = 0;
  let start = 0;
  for (let k = 0; k < timeSteps; k++) {
    const end = problem.expiry * (((k + 1) / timeSteps) * ((k + 1) / timeSteps));
    const length = end - start;
    if (k < openingSteps || k >= timeSteps - closingSteps) {
      stepper(length / 2, 1, lowEdge(start + length / 2));
      stepper(length / 2, 1, lowEdge(end));
    } else {
      stepper(length, 0.5, lowEdge(end));
    }
    if (length > longest) longest = length;
    start = end;
  }
  const narrowest = nodes.x[nodes.strikeIndex + 1] - nodes.x[nodes.strikeIndex];
  const variance = problem.volatility * problem.volatility;
  return (0.5 * variance * longest) / (narrowest * narrowest);
}

function makeStepper(
  generator: Generator,
  values: Float64Array,
  obstacle: Float64Array,
  oneBoundary: boolean,
): (length: number, theta: number, lowEdge: number) => void {
  const inner = values.length - 2;
  const right = new Float64Array(inner);
  const innerObstacle = obstacle.subarray(1, inner + 1);
  const innerValues = values.subarray(1, inner + 1);
  const matrix: Tridiagonal = {
    lower: new Float64Array(inner),
    diagonal: new Float64Array(inner),
    upper: new Float64Array(inner),
  };
  const factors: TridiagonalFactors = makeFactors(inner);
  const solveByPolicy = makePolicySolver(inner);
  return (length, theta, lowEdge) => {
    const explicit = (1 - theta) * length;
    const implicit = theta * length;
    for (let i = 0; i < inner; i++) {
      const a = generator.lower[i];
      const c = generator.upper[i];
      const b = -(a + c) - generator.rate;
      right[i] = values[i + 1] + explicit * (a * values[i] + b * values[i + 1] + c * values[i + 2]);
      matrix.lower[i] = -implicit * a;
      matrix.diagonal[i] = 1 - implicit * b;
      matrix.upper[i] = -implicit * c;
    }
    right[0] -= matrix.lower[0] * lowEdge;
    if (oneBoundary) {
      factorTridiagonal(matrix, factors);
      solveProjected(matrix.lower, factors, right, innerObstacle);
    } else {
      solveByPolicy(matrix, right, innerObstacle, innerValues);
    }
    values[0] = lowEdge;
    values.set(right, 1);
    values[inner + 1] = 0;
  };
}

/** Value and derivatives at `at` by six nodes, taken from the side that is not exercised. */
function readAt(
  at: number,
  mayExercise: boolean,
  x: Float64Array,
  values: Float64Array,
  obstacle: Float64Array,
): Omit<AmericanSolution, 'stability' | 'firstOrder'> {
  const last = x.length - 1;
  const exercisedAt = (j: number) => obstacle[j] > 0 && values[j] - obstacle[j] <= 1e-14;
  const boundary = mayExercise ? boundaryOf(x, values, obstacle, exercisedAt) : null;
  const index = nodeBelow(x, at);
  if (at <= x[0] || (exercisedAt(index) && exercisedAt(index + 1))) {
    const spot = exp(at);
    return { local: { value: 1 - spot, first: -spot, second: -spot }, exercised: true, boundary };
  }
  let from = Math.max(index - 2, 0);
  while (from < index && exercisedAt(from)) from++;
  from = Math.min(from, last - 5);
  return { local: interpolate(x, values, from, 6, at), exercised: false, boundary };
}

/**
 * Where the highest exercised region ends. Smooth pasting makes v − obstacle a parabola that
 * starts at the boundary, so its root continues in a straight line from the first two free nodes.
 */
function boundaryOf(
  x: Float64Array,
  values: Float64Array,
  obstacle: Float64Array,
  exercisedAt: (j: number) => boolean,
): number | null {
  let j = x.length - 3;
  while (j > 0 && !exercisedAt(j)) j--;
  if (!exercisedAt(j)) return null;
  const near = Math.sqrt(Math.max(values[j + 1] - obstacle[j + 1], 0));
  const far = Math.sqrt(Math.max(values[j + 2] - obstacle[j + 2], 0));
  if (!(far > near)) return x[j];
  const straight = x[j + 1] - (near * (x[j + 2] - x[j + 1])) / (far - near);
  return Math.min(Math.max(straight, x[j]), x[j + 1]);
}

function driftOf(problem: AmericanPut): number {
  return problem.rate - problem.yield - 0.5 * problem.volatility * problem.volatility;
}

function sinh(y: number): number {
  const e = expm1(y < 0 ? -y : y);
  const half = 0.5 * (e + e / (e + 1));
  return y < 0 ? -half : half;
}

function asinh(z: number): number {
  const size = z < 0 ? -z : z;
  const y = log(size + Math.sqrt(size * size + 1));
  return z < 0 ? -y : y;
}
