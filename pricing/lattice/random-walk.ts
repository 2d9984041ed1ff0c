import type { Contract, Market } from '@/pricing/contract';
import { carryYield } from '@/pricing/conventions';
import { heatExponents } from '@/pricing/lattice/walk';
import { exp } from '@/pricing/numerics/elementary';
import { normalCdf } from '@/pricing/numerics/normal';

/**
 * The fair walk Sₙ of n steps ±1, and its transition matrix P: half to the left, half to the right.
 *
 * Forward, a distribution x₀ moves to x₀Pⁿ; backward, a function f is averaged to Pⁿf. The number
 * (x₀Pⁿ)f = x₀(Pⁿf) is the same either way, and for a payoff in heat coordinates it is a price:
 * expectation and heat equation are two readings of one matrix product.
 */

/** x₀Pⁿ: the probability of Sₙ = 2j − n at index j. Exact in doubles while n ≤ 53. */
export function walkProbabilities(steps: number): Float64Array {
  const probabilities = new Float64Array(steps + 1);
  probabilities[0] = 1;
  for (let n = 1; n <= steps; n++) {
    for (let j = n; j > 0; j--) {
      probabilities[j] = 0.5 * (probabilities[j] + probabilities[j - 1]);
    }
    probabilities[0] *= 0.5;
  }
  return probabilities;
}

/** Σ pⱼfⱼ, small terms first from both ends, so that the tails are not lost in the middle. */
export function forwardExpectation(probabilities: Float64Array, payoff: Float64Array): number {
  let sum = 0;
  let low = 0;
  let high = payoff.length - 1;
  while (low < high) {
    sum += probabilities[low] * payoff[low] + probabilities[high] * payoff[high];
    low++;
    high--;
  }
  return low === high ? sum + probabilities[low] * payoff[low] : sum;
}

/** Pⁿf at the start, from f at the n + 1 places that the walk can end in. */
export function backwardExpectation(payoff: Float64Array): number {
  const values = payoff.slice();
  for (let n = payoff.length - 1; n > 0; n--) {
    for (let j = 0; j < n; j++) values[j] = 0.5 * (values[j] + values[j + 1]);
  }
  return values[0];
}

export type BothWays = { forward: number; backward: number };

/**
 * The European price on the symmetric walk, V = e^(βτ)·E[e^(−αx)·payoff], once by the walk's
 * distribution and once by averaging back. Null where e^(−αx) at the walk's far ends leaves the
 * range of doubles (long walks under a drift of many deviations).
 */
export function europeanBothWays(
  contract: Contract,
  market: Market,
  steps: number,
): BothWays | null {
  const { strike, expiry, kind } = contract;
  const { spot, rate, volatility } = market;
  const { alpha, beta } = heatExponents({ rate, yield: carryYield(market), volatility });
  const step = volatility * Math.sqrt(expiry / steps);
  if (Math.abs(alpha) * step * steps > 600 || step * steps > 600) return null;
  const sign = kind === 'call' ? 1 : -1;
  const payoff = new Float64Array(steps + 1);
  for (let j = 0; j <= steps; j++) {
    const x = (2 * j - steps) * step;
    const gain = sign * (spot * exp(x) - strike);
    payoff[j] = gain > 0 ? gain * exp(-alpha * x) : 0;
  }
  const decay = exp(0.5 * beta * volatility * volatility * expiry);
  return {
    forward: decay * forwardExpectation(walkProbabilities(steps), payoff),
    backward: decay * backwardExpectation(payoff),
  };
}

export type GaussianDistance = {
  /** sup over x of |P(Sₙ/√n ≤ x) − Φ(x)|. */
  supremum: number;
  /** The end of the walk, 2j − n, at which it is attained first from the left. */
  position: number;
  /** max over j of |P(Sₙ ≤ k) − Φ((k+1)/√n)|, k = 2j − n: both steps of a jump shared out. */
  continuityCorrected: number;
};

/** How far the walk still is from the bell curve; the supremum falls like 1/√(2πn). */
export function gaussianDistance(steps: number): GaussianDistance {
  const probabilities = walkProbabilities(steps);
  const root = Math.sqrt(steps);
  const result: GaussianDistance = { supremum: 0, position: 0, continuityCorrected: 0 };
  let below = 0;
  for (let j = 0; j <= steps; j++) {
    const position = 2 * j - steps;
    const reached = below + probabilities[j];
    const bell = normalCdf(position / root);
    const gap = Math.max(Math.abs(bell - below), Math.abs(reached - bell));
    if (gap > result.supremum) {
      result.supremum = gap;
      result.position = position;
    }
    const corrected = Math.abs(reached - normalCdf((position + 1) / root));
    if (corrected > result.continuityCorrected) result.continuityCorrected = corrected;
    below = reached;
  }
  return result;
}
