import { erfc, exp, log } from '@/pricing/numerics/elementary';
import { logStartOf, type BoundaryProblem } from '@/pricing/spectral/problem';
import { lookedUp, type SpectralTable } from '@/pricing/spectral/tables';

const INVERSE_SQRT_TWO_PI = 0.3989422804014327;
const SQRT_HALF = 0.7071067811865476;

/** Below this the interpolated H has left the range of the unknown: the boundary is taken as X. */
const smallestHeight = 1e-24;
const smallestGap = 1e-12;

/**
 * The smooth-pasting equation of the boundary at every node, and, where asked, its derivatives by
 * the unknowns.
 *
 * With g = √H = ln(X/B), B in strikes, ρ, κ and v the problem's rate, carry and deviation, it is
 *   B(τ)·e^((ρ−κ)τ) = N/D,
 *   N = φ(d₋)/(v√τ) + ρ·∫ e^(ρu)·φ(d₋(u))/(v√(τ−u)) du,
 *   D = φ(d₊)/(v√τ) + Φ(d₊) + κ·∫ e^(κu)·(Φ(d₊(u)) + φ(d₊(u))/(v√(τ−u))) du,
 * d± of B(τ) against the strike over τ, d±(u) of B(τ) against B(u) over τ − u. The residual is the
 * logarithm of left over right. φ(d₊(u)) follows from φ(d₋(u)) by the ratio of the boundaries.
 *
 * The results stand in the table's workspace, where nothing is allocated.
 */
export function evaluateResidual(
  table: SpectralTable,
  problem: BoundaryProblem,
  height: Float64Array,
  derivatives: boolean,
): void {
  const start = logStartOf(problem);
  for (let i = 0; i < table.nodes; i++) {
    evaluateNode(table, problem, height, i, start, derivatives);
  }
}

/** e^(κu) at each point of each node's integral: fill once per problem, before `evaluateResidual`. */
export function fillGrowth({ nodes, points, z, cosine, work }: SpectralTable, carry: number): void {
  for (let i = 0; i < nodes; i++) {
    for (let j = 0; j < points; j++) {
      const root = z[i] * cosine[j];
      work.growth[i * points + j] = carry === 0 ? 1 : exp(carry * root * root);
    }
  }
}

/** Row i. The small arrays hold, per point: g, d₋, φ(d₋)·e^(ρu)·weight, and D's part of the derivative. */
function evaluateNode(
  table: SpectralTable,
  problem: BoundaryProblem,
  height: Float64Array,
  i: number,
  start: number,
  derivatives: boolean,
): void {
  const { nodes, points, sine, inverseSine, weight, lookUp, work } = table;
  const { rate, carry, deviation } = problem;
  const { gap, distance, kernel } = work;
  const root = table.z[i];
  const tau = root * root;
  const drift = (rate - carry) / deviation;
  const width = deviation * root;
  const perWidth = 1 / width;
  const scaled = INVERSE_SQRT_TWO_PI * tau;
  const g = Math.sqrt(height[i]);

  let integral = 0;
  for (let j = 0; j < points; j++) {
    const h = lookedUp(nodes, lookUp, i * points + j, height);
    const other = h > smallestHeight ? Math.sqrt(h) : smallestGap;
    const s = root * sine[j];
    const vs = deviation * s;
    const perVs = inverseSine[j] * perWidth;
    const d = (other - g) * perVs + drift * s - 0.5 * vs;
    const mass = scaled * exp(rate * (tau - s * s) - 0.5 * d * d) * weight[j];
    gap[j] = other;
    distance[j] = d;
    kernel[j] = mass;
    integral += mass * perVs;
  }

  const minus = (start - g) / width + drift * root - 0.5 * width;
  const plus = minus + width;
  const densityMinus = (INVERSE_SQRT_TWO_PI * exp(-0.5 * minus * minus)) / width;
  const densityPlus = (INVERSE_SQRT_TWO_PI * exp(-0.5 * plus * plus)) / width;
  const numerator = densityMinus + rate * integral;
  let denominator = densityPlus + 0.5 * erfc(-plus * SQRT_HALF);

  if (carry !== 0) denominator += carriedPart(table, problem, i, exp(g - (rate - carry) * tau));
  work.residual[i] = start - g + (rate - carry) * tau - log(numerator / denominator);
  if (!derivatives) return;

  const byNumerator = (-minus * densityMinus) / (width * numerator);
  const byDenominator = ((1 - plus / width) * densityPlus) / denominator;
  fillRow(table, problem, i, 1 / numerator, carry === 0 ? 0 : 1 / denominator);
  const own = i * nodes + i;
  work.jacobian[own] += (-1 - (byDenominator - byNumerator) - work.total[0]) / (2 * g);
}

/** D's integral times κ; `scale` is e^((κ−ρ)τ)·X/B(τ), by which φ(d₊) follows from φ(d₋). */
function carriedPart(
  { points, z, sine, inverseSine, weight, work }: SpectralTable,
  { carry, deviation }: BoundaryProblem,
  i: number,
  scale: number,
): number {
  const { gap, distance, kernel, carried, growth } = work;
  const tau = z[i] * z[i];
  const width = deviation * z[i];
  const perWidth = 1 / width;
  let integral = 0;
  for (let j = 0; j < points; j++) {
    const perVs = inverseSine[j] * perWidth;
    const d = distance[j] + width * sine[j];
    const density = kernel[j] * scale * exp(-gap[j]) * perVs;
    const mass = tau * weight[j] * growth[i * points + j] * 0.5 * erfc(-d * SQRT_HALF);
    integral += mass + density;
    carried[j] = carry * (1 - d * perVs) * density;
  }
  return carry * integral;
}

/** Derivatives by the heights that the integrals look up; their sum, by g itself, goes to `total`. */
function fillRow(
  table: SpectralTable,
  { rate, deviation }: BoundaryProblem,
  i: number,
  perNumerator: number,
  perDenominator: number,
): void {
  const { nodes, points, inverseSine, lookUp, work } = table;
  const { gap, distance, kernel, carried, slopes, jacobian } = work;
  const width = deviation * table.z[i];
  const scale = (rate * perNumerator) / (width * width);
  let total = 0;
  for (let j = 0; j < points; j++) {
    let slope = scale * distance[j] * kernel[j] * inverseSine[j] * inverseSine[j];
    if (perDenominator !== 0) slope += carried[j] * perDenominator;
    total += slope;
    // By the height: g = √H, and where H was cut off at zero nothing moves.
    slopes[j] = gap[j] <= smallestGap ? 0 : slope / (2 * gap[j]);
  }
  work.total[0] = total;
  const first = i * points * nodes;
  let k = 0;
  for (; k + 3 < nodes; k += 4) {
    let a = 0;
    let b = 0;
    let c = 0;
    let d = 0;
    for (let j = 0, at = first + k; j < points; j++, at += nodes) {
      const slope = slopes[j];
      a += slope * lookUp[at];
      b += slope * lookUp[at + 1];
      c += slope * lookUp[at + 2];
      d += slope * lookUp[at + 3];
    }
    const to = i * nodes + k;
    jacobian[to] = a;
    jacobian[to + 1] = b;
    jacobian[to + 2] = c;
    jacobian[to + 3] = d;
  }
  for (; k < nodes; k++) {
    let a = 0;
    for (let j = 0, at = first + k; j < points; j++, at += nodes) a += slopes[j] * lookUp[at];
    jacobian[i * nodes + k] = a;
  }
}
