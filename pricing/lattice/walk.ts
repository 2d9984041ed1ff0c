import { exp, expm1 } from '@/pricing/numerics/elementary';

/**
 * One step of a recombining walk in x = ln(spot): by drift ± step where it has two branches, by
 * drift and drift ± 2·step where it has three, so that the nodes of one instant always lie 2·step
 * apart. The weights hold the probability and the discount of the step; the value before it is
 * down·V⁻ + middle·V⁰ + up·V⁺. `growth` is the number of nodes that a step adds: 1 or 2.
 */
export type WalkStep = {
  step: number;
  drift: number;
  growth: 1 | 2;
  up: number;
  middle: number;
  down: number;
  upProbability: number;
};

export type WalkTerms = { rate: number; yield: number; volatility: number };

/** The step of a walk of so many steps of so long; null where it does not exist. */
export type MakeWalkStep = (terms: WalkTerms, timeStep: number, steps: number) => WalkStep | null;

/** Two branches, as far up as down. */
export const levelStep = { drift: 0, growth: 1, middle: 0 } as const;

/**
 * Cox, Ross and Rubinstein (1979): u = e^(σ√Δt), d = 1/u and p = (e^((r−q)Δt) − d)/(u − d), which
 * matches the forward exactly. p is a probability only while |r−q|·√Δt < σ, nearly.
 */
export const crrStep: MakeWalkStep = ({ rate, yield: carry, volatility }, timeStep) => {
  const step = volatility * Math.sqrt(timeStep);
  const down = expm1(-step);
  const p = (expm1((rate - carry) * timeStep) - down) / (expm1(step) - down);
  if (!(p > 0 && p < 1)) return null;
  const discount = exp(-rate * timeStep);
  return { ...levelStep, step, up: discount * p, down: discount * (1 - p), upProbability: p };
};

/**
 * The plain walk with probability ½ each way, in heat coordinates: V = e^(αx+βτ)·u, τ = σ²t/2, with
 * α = −ν/σ², β = −α² − 2r/σ², ν = r − q − ½σ². The heat equation u_τ = u_xx then becomes
 * u(x, τ+k) = ½u(x−h, τ) + ½u(x+h, τ) with h² = 2k, that is h = σ√Δt. Rolling V instead of u puts
 * the factor between neighbours into the weights, ½e^(βk ± αh), which is the same arithmetic
 * without ever forming e^(αx), so that nothing overflows. The weights are positive for any drift,
 * but their sum e^(βk)·cosh(αh) is the discount factor only up to a relative (αh)⁴/12 per step:
 * past |αh| = 1 the walk has lost the drift and is refused.
 */
export const symmetricStep: MakeWalkStep = ({ rate, yield: carry, volatility }, timeStep) => {
  const { alpha, beta } = heatExponents({ rate, yield: carry, volatility });
  const step = volatility * Math.sqrt(timeStep);
  const tilt = alpha * step;
  if (!(tilt > -1 && tilt < 1)) return null;
  const decay = 0.5 * exp(0.5 * beta * step * step);
  const up = decay * exp(-tilt);
  const down = decay * exp(tilt);
  return { ...levelStep, step, up, down, upProbability: up / (up + down) };
};

/** α and β of V = e^(αx+βτ)·u. */
export function heatExponents({ rate, yield: carry, volatility }: WalkTerms): {
  alpha: number;
  beta: number;
} {
  const variance = volatility * volatility;
  const alpha = 0.5 - (rate - carry) / variance;
  return { alpha, beta: -alpha * alpha - (2 * rate) / variance };
}
