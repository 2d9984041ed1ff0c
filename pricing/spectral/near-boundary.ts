import { exp } from '@/pricing/numerics/elementary';
import type { LocalValue } from '@/pricing/numerics/interpolation';
import { normalCdf, normalDensity } from '@/pricing/numerics/normal';
import type { Boundary } from '@/pricing/spectral/boundary';
import { earlyExercisePremium, logBoundaryNow } from '@/pricing/spectral/premium';
import type { BoundaryProblem } from '@/pricing/spectral/problem';

/**
 * The premium with its derivatives in x, beside the boundary too. There the integrands of the
 * derivatives are peaks narrower than the quadrature's spacing; but at the boundary itself all is
 * known: the value is 1 − eˣ, its slope −eˣ (smooth pasting), and with no time value left the
 * equation gives the curvature, ½v²·V″ = ρ·V − (ρ − κ − ½v²)·V′. Between the boundary and a point
 * far enough from it stands the polynomial of fifth degree through both ends' value, slope and
 * curvature. Its reach shrinks with the nodes, and where the drift bends the value sooner.
 */
export function premiumWithDerivatives(
  problem: BoundaryProblem,
  boundary: Boundary,
  x: number,
): LocalValue {
  const { rate, carry, deviation } = problem;
  const direct = earlyExercisePremium(problem, boundary, x);
  const start = logBoundaryNow(problem, boundary);
  const drift = Math.abs(rate - carry - 0.5 * deviation * deviation);
  const reach =
    deviation * Math.min(1.5 / boundary.table.nodes, (0.5 * deviation) / Math.max(drift, 1e-300));
  if (x - start >= reach) return direct;
  const near = premiumAtBoundary(problem, start);
  const far = earlyExercisePremium(problem, boundary, start + reach);
  return { ...hermite(near, far, reach, x - start), value: direct.value };
}

/** What exercise pays less the European put, at the boundary. */
function premiumAtBoundary({ rate, carry, deviation }: BoundaryProblem, x: number): LocalValue {
  const spot = exp(x);
  const plus = (x + rate - carry) / deviation + 0.5 * deviation;
  const held = spot * exp(-carry);
  const slope = -held * normalCdf(-plus);
  const european = exp(-rate) * normalCdf(deviation - plus) + slope;
  const curvature = slope + (held * normalDensity(plus)) / deviation;
  const variance = deviation * deviation;
  const live = (2 * (rate * (1 - spot) + (rate - carry - 0.5 * variance) * spot)) / variance;
  return { value: 1 - spot - european, first: -spot - slope, second: live - curvature };
}

function hermite(from: LocalValue, to: LocalValue, length: number, at: number): LocalValue {
  const square = length * length;
  const t = at / length;
  const a1 = length * from.first;
  const a2 = 0.5 * square * from.second;
  const value = to.value - from.value - a1 - a2;
  const slope = length * to.first - a1 - 2 * a2;
  const bend = square * to.second - 2 * a2;
  const a3 = 10 * value - 4 * slope + 0.5 * bend;
  const a4 = -15 * value + 7 * slope - bend;
  const a5 = 6 * value - 3 * slope + 0.5 * bend;
  return {
    value: from.value + t * (a1 + t * (a2 + t * (a3 + t * (a4 + t * a5)))),
    first: (a1 + t * (2 * a2 + t * (3 * a3 + t * (4 * a4 + t * 5 * a5)))) / length,
    second: (2 * a2 + t * (6 * a3 + t * (12 * a4 + t * 20 * a5))) / square,
  };
}
