/**
 * The verdict of a cross-check: what several routes to one price say together.
 *
 * For a pair with values vᵢ, vⱼ and error estimates eᵢ, eⱼ, d = |vᵢ − vⱼ| and the tolerance τ:
 *
 *   agree      d ≤ τ and both estimates ≤ τ
 *   wide       not so, but d ≤ eᵢ + eⱼ: the routes do not contradict each other, they are too rough
 *   disagree   the rest
 *   one-route  nothing to compare with: a single route, an estimate that is unknown, or routes that
 *              share all their machinery, so that one mistake would move both alike
 *
 * Besides, an estimate is refuted whenever d > eᵢ + eⱼ + rounding, whatever τ is: at least one of the
 * two is wrong about itself. The worst pair decides: disagree before wide before agree, and the
 * larger distance among equals. All routes price one model, so that "agree" speaks of the
 * computation, never of the model.
 */
import type { MethodName, Verdict } from '@/pricing/contract';

export type ComparedRoute = {
  name: MethodName;
  value: number;
  errorEstimate: number | null;
  /** What a wrong value could come from, in words that all methods share. */
  machinery: readonly string[];
};

export type WorstPair = { first: MethodName; second: MethodName; distance: number };

export type RouteVerdict = { verdict: Verdict; refuted: boolean; worst: WorstPair | null };

type PairVerdict = WorstPair & { verdict: Exclude<Verdict, 'one-route'>; refuted: boolean };

const severity = { agree: 0, wide: 1, disagree: 2 };

/** A few roundings of the larger value: what two exact routes may differ by. */
const roundingShare = 8 * 2.220446049250313e-16;

export function judgeRoutes(routes: readonly ComparedRoute[], tolerance: number): RouteVerdict {
  if (!(tolerance >= 0)) throw new RangeError(`a tolerance cannot be ${tolerance}`);
  let worst: PairVerdict | null = null;
  let refuted = false;
  for (let i = 0; i < routes.length; i++) {
    for (let j = i + 1; j < routes.length; j++) {
      const pair = judgePair(routes[i], routes[j], tolerance);
      if (pair === null) continue;
      refuted ||= pair.refuted;
      if (worst === null || isWorse(pair, worst)) worst = pair;
    }
  }
  if (worst === null) return { verdict: 'one-route', refuted: false, worst: null };
  const { first, second, distance, verdict } = worst;
  return { verdict, refuted, worst: { first, second, distance } };
}

function judgePair(a: ComparedRoute, b: ComparedRoute, tolerance: number): PairVerdict | null {
  if (a.errorEstimate === null || b.errorEstimate === null || sharesAll(a, b)) return null;
  const distance = Math.abs(a.value - b.value);
  const errors = a.errorEstimate + b.errorEstimate;
  const largestError = Math.max(a.errorEstimate, b.errorEstimate);
  const rounding = roundingShare * Math.max(Math.abs(a.value), Math.abs(b.value));
  const agree = distance <= tolerance && largestError <= tolerance;
  const verdict = agree ? 'agree' : distance <= errors ? 'wide' : 'disagree';
  return {
    first: a.name,
    second: b.name,
    distance,
    verdict,
    refuted: distance > errors + rounding,
  };
}

function isWorse(a: PairVerdict, b: PairVerdict): boolean {
  const gap = severity[a.verdict] - severity[b.verdict];
  return gap > 0 || (gap === 0 && a.distance > b.distance);
}

/** The same set of names; a route that only names some of the other's has its own ways to fail. */
function sharesAll(a: ComparedRoute, b: ComparedRoute): boolean {
  return (
    a.machinery.every((part) => b.machinery.includes(part)) &&
    b.machinery.every((part) => a.machinery.includes(part))
  );
}
