import { cos, sin } from '@/pricing/numerics/elementary';
import { gaussLegendre } from '@/pricing/numerics/gauss-legendre';

const PI = 3.141592653589793;

/**
 * Everything that depends on the number of nodes only, made once per size, with the working
 * arrays of a solve. Root time z runs over [0, 1]: the unit of time is the expiry.
 *
 * Nodes are the Chebyshev extrema z_i = (1 + cos(πi/n))/2, i < n; the n-th, z = 0, is where the
 * unknown vanishes. Within a node's integral, u = τ·cos²θ and τ − u = τ·sin²θ by Gauss and Legendre in θ:
 * the integrands are smooth at both ends, and z·cosθ, where the boundary is looked up, does not
 * depend on the contract.
 */
export type SpectralTable = {
  nodes: number;
  points: number;
  z: Float64Array;
  sine: Float64Array;
  inverseSine: Float64Array;
  cosine: Float64Array;
  /** Weight in θ times the derivative of cos²θ. */
  weight: Float64Array;
  /** Row (i, j) gives H at z_i·cosθ_j from H at the nodes. */
  lookUp: Float64Array;
  premium: PremiumTable;
  work: Workspace;
};

/** For the value: θ = (π/2)·y², whose points crowd where the time since exercise is short. */
export type PremiumTable = {
  points: number;
  sine: Float64Array;
  weight: Float64Array;
  lookUp: Float64Array;
};

export type Workspace = {
  /** Residuals, then the Newton step. */
  residual: Float64Array;
  jacobian: Float64Array;
  before: Float64Array;
  step: Float64Array;
  /** Per point of one node's integral. */
  gap: Float64Array;
  distance: Float64Array;
  kernel: Float64Array;
  carried: Float64Array;
  slopes: Float64Array;
  /** e^(κτ·cos²θ) per node and point: the same in all rounds of a solve. */
  growth: Float64Array;
  /** One number handed from one part of a row to the next. */
  total: Float64Array;
};

const made = new Map<number, SpectralTable>();

export function spectralTable(nodes: number): SpectralTable {
  const known = made.get(nodes);
  if (known) return known;
  const table = makeTable(nodes);
  made.set(nodes, table);
  return table;
}

/** 24 points for 16 nodes, 40 for 24, 56 for 32, 120 for 64. */
const pointsOf = (nodes: number) => Math.max(Math.ceil(1.5 * nodes), 2 * nodes - 8);

function makeTable(nodes: number): SpectralTable {
  const points = pointsOf(nodes);
  const rule = gaussLegendre(points, 0, PI / 2);
  const z = new Float64Array(nodes);
  for (let i = 0; i < nodes; i++) z[i] = (1 + cos((PI * i) / nodes)) / 2;
  const sine = rule.points.map(sin);
  const cosine = rule.points.map(cos);
  const lookUp = new Float64Array(nodes * points * nodes);
  for (let i = 0; i < nodes; i++) {
    for (let j = 0; j < points; j++) {
      const from = (i * points + j) * nodes;
      interpolationRow(z, z[i] * cosine[j], lookUp.subarray(from, from + nodes));
    }
  }
  return {
    nodes,
    points,
    z,
    sine,
    inverseSine: sine.map((s) => 1 / s),
    cosine,
    weight: rule.weights.map((weight, j) => 2 * weight * sine[j] * cosine[j]),
    lookUp,
    premium: makePremiumTable(z),
    work: makeWorkspace(nodes, points),
  };
}

function makePremiumTable(z: Float64Array): PremiumTable {
  const nodes = z.length;
  const points = 2 * nodes;
  const rule = gaussLegendre(points, 0, 1);
  const sine = new Float64Array(points);
  const weight = new Float64Array(points);
  const lookUp = new Float64Array(points * nodes);
  for (let j = 0; j < points; j++) {
    const y = rule.points[j];
    const theta = 0.5 * PI * y * y;
    sine[j] = sin(theta);
    weight[j] = 2 * rule.weights[j] * PI * y * sine[j] * cos(theta);
    interpolationRow(z, cos(theta), lookUp.subarray(j * nodes, (j + 1) * nodes));
  }
  return { points, sine, weight, lookUp };
}

function makeWorkspace(nodes: number, points: number): Workspace {
  return {
    residual: new Float64Array(nodes),
    jacobian: new Float64Array(nodes * nodes),
    before: new Float64Array(nodes),
    step: new Float64Array(nodes),
    gap: new Float64Array(points),
    distance: new Float64Array(points),
    kernel: new Float64Array(points),
    carried: new Float64Array(points),
    slopes: new Float64Array(points),
    growth: new Float64Array(nodes * points),
    total: new Float64Array(1),
  };
}

/** Barycentric weights of the nodes z for the polynomial at a point; where z = 0 its value is 0. */
export function interpolationRow(z: Float64Array, at: number, row: Float64Array): void {
  const nodes = z.length;
  let total = 0;
  let sign = 1;
  for (let i = 0; i <= nodes; i++) {
    const gap = at - (i < nodes ? z[i] : 0);
    if (gap === 0) {
      row.fill(0);
      if (i < nodes) row[i] = 1;
      return;
    }
    const share = (sign * (i === 0 || i === nodes ? 0.5 : 1)) / gap;
    if (i < nodes) row[i] = share;
    total += share;
    sign = -sign;
  }
  for (let i = 0; i < nodes; i++) row[i] /= total;
}

/**
 * The polynomial through H at the nodes, by one row of interpolation weights. Four sums at a time: one
 * alone would wait for each addition to end before the next.
 */
export function lookedUp(
  nodes: number,
  lookUp: Float64Array,
  row: number,
  height: Float64Array,
): number {
  let a = 0;
  let b = 0;
  let c = 0;
  let d = 0;
  let k = 0;
  let at = row * nodes;
  for (; k + 3 < nodes; k += 4, at += 4) {
    a += lookUp[at] * height[k];
    b += lookUp[at + 1] * height[k + 1];
    c += lookUp[at + 2] * height[k + 2];
    d += lookUp[at + 3] * height[k + 3];
  }
  for (; k < nodes; k++, at++) a += lookUp[at] * height[k];
  return a + b + (c + d);
}
