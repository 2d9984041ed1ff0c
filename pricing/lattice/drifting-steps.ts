import type { MakeWalkStep } from '@/pricing/lattice/walk';
import { exp, expm1, log, log1p } from '@/pricing/numerics/elementary';

/** Steps of the walks whose nodes move with the drift, or that have three branches. */

/**
 * Jarrow and Rudd (1983): probability ½ each way, and the drift of the logarithm in the nodes,
 * u, d = e^((r−q−½σ²)Δt ± σ√Δt). It exists for any drift; the forward is missed by a relative
 * σ⁴Δt²/12 a step, an error of first order like the walk's own.
 */
export const jarrowRuddStep: MakeWalkStep = ({ rate, yield: carry, volatility }, timeStep) => {
  const half = 0.5 * exp(-rate * timeStep);
  return {
    step: volatility * Math.sqrt(timeStep),
    drift: (rate - carry - 0.5 * volatility * volatility) * timeStep,
    growth: 1,
    up: half,
    middle: 0,
    down: half,
    upProbability: 0.5,
  };
};

/**
 * Tian (1993): the first three moments of the price itself are matched. With M = e^((r−q)Δt) and
 * V = e^(σ²Δt), u, d = ½MV(V + 1 ± √(V² + 2V − 3)) and p = (M − d)/(u − d). Since ud = (MV)², the
 * drift of the nodes is ln(MV), and cosh(step) = ½(V + 1). It exists for any drift.
 */
export const tianStep: MakeWalkStep = ({ rate, yield: carry, volatility }, timeStep) => {
  const variance = volatility * volatility * timeStep;
  const excess = expm1(variance);
  const step = log1p(0.5 * (excess + Math.sqrt(excess * (excess + 4))));
  const below = expm1(-step);
  const p = (expm1(-variance) - below) / (expm1(step) - below);
  const discount = exp(-rate * timeStep);
  return {
    step,
    drift: (rate - carry) * timeStep + variance,
    growth: 1,
    up: discount * p,
    middle: 0,
    down: discount * (1 - p),
    upProbability: p,
  };
};

/**
 * Three branches, g = σ√(3Δt) apart: the stretch λ = √3 of Kamrad and Ritchken (1991), at which a
 * walk without drift has the fourth moment of the Gaussian too. With y = νΔt/g, up and down together
 * have the probability ⅓ + y², which gives the logarithm its second moment, and are shared so that
 * the forward is met exactly. Null where one of the three is no probability: past |y| of about 0.8.
 */
export const trinomialStep: MakeWalkStep = ({ rate, yield: carry, volatility }, timeStep) => {
  const gap = volatility * Math.sqrt(3 * timeStep);
  const y = ((rate - carry - 0.5 * volatility * volatility) * timeStep) / gap;
  const moves = 1 / 3 + y * y;
  const below = expm1(-gap);
  const gain = expm1((rate - carry) * timeStep);
  const upProbability = (gain - moves * below) / (expm1(gap) - below);
  const downProbability = moves - upProbability;
  if (!(moves < 1 && upProbability > 0 && downProbability > 0)) return null;
  const discount = exp(-rate * timeStep);
  return {
    step: 0.5 * gap,
    drift: 0,
    growth: 2,
    up: discount * upProbability,
    middle: discount * (1 - moves),
    down: discount * downProbability,
    upProbability,
  };
};

/** Past it the inversion gives probabilities so near 0 and 1 that the walk hardly moves. */
const farthestShare = 4;

/**
 * Leisen and Reimer (1996), for an option of this strike: probabilities by inverting the binomial
 * distribution, p = h(d₂) for the bond and p′ = h(d₁) for the spot, and u = M·p′/p,
 * d = M(1 − p′)/(1 − p), M = e^((r−q)Δt). The strike then lies halfway between the two middle nodes
 * of an odd walk. Null where d₁ or d₂ is more than twice the root of the number of steps.
 */
export function leisenReimerStep(logSpotStrike: number): MakeWalkStep {
  return ({ rate, yield: carry, volatility }, timeStep, steps) => {
    const deviation = volatility * Math.sqrt(timeStep * steps);
    const d2 = (logSpotStrike + (rate - carry) * timeStep * steps) / deviation - 0.5 * deviation;
    const d1 = d2 + deviation;
    if (Math.max(d1 * d1, d2 * d2) > farthestShare * steps) return null;
    const p = peizerPratt(d2, steps);
    const ofSpot = peizerPratt(d1, steps);
    const up = log(ofSpot / p);
    const down = log((1 - ofSpot) / (1 - p));
    const discount = exp(-rate * timeStep);
    return {
      step: 0.5 * (up - down),
      drift: (rate - carry) * timeStep + 0.5 * (up + down),
      growth: 1,
      up: discount * p,
      middle: 0,
      down: discount * (1 - p),
      upProbability: p,
    };
  };
}

/**
 * The second inversion of Peizer and Pratt (1968): the p at which a binomial variable of n trials
 * exceeds n/2 with nearly the probability that a normal variable is below z. n is odd.
 */
function peizerPratt(z: number, n: number): number {
  const scaled = z / (n + 1 / 3 + 0.1 / (n + 1));
  const half = 0.5 * Math.sqrt(-expm1(-scaled * scaled * (n + 1 / 6)));
  return z < 0 ? 0.5 - half : 0.5 + half;
}
