import {
  factorTridiagonal,
  makeFactors,
  solveTridiagonal,
  type Tridiagonal,
} from '@/pricing/numerics/tridiagonal';

/**
 * One time step of the heat equation u_τ = u_xx on a uniform grid: the θ family.
 *
 *   (1 − θλδ²) uᵐ⁺¹ = (1 + (1−θ)λδ²) uᵐ,   λ = k/h²,   δ²uⱼ = uⱼ₋₁ − 2uⱼ + uⱼ₊₁
 *
 * θ = 0 is the explicit step: the new value is the expectation of a walk that goes left or right
 * with probability λ each and stays with 1 − 2λ, so it is a walk, and stable, up to λ = ½ only.
 * θ = ½ is Crank–Nicolson, θ = 1 the implicit step, and `compactTheta` the step whose error in
 * space cancels its error in time to fourth order on smooth data.
 *
 * A mode sin(πmjh) is multiplied by a = (1 − 4(1−θ)λs)/(1 + 4θλs), s = sin²(πmh/2), in each step;
 * the tests hold the step to that figure. a → −1 for θ = ½ and large λ: that is why a payoff
 * with a kink is started with implicit steps (Rannacher 1984).
 */
export type ThetaStep = (values: Float64Array, newLower: number, newUpper: number) => void;

/** θ = ½ − 1/(12λ): order 4 in space. Below λ = 1/6 it is negative, and the step still exists. */
export function compactTheta(lambda: number): number {
  return 0.5 - 1 / (12 * lambda);
}

/** A step for grids of `intervals` intervals that advances `values` in place; edges are given. */
export function makeThetaStep(lambda: number, theta: number, intervals: number): ThetaStep {
  const inner = intervals - 1;
  const implicit = theta * lambda;
  const explicit = lambda - implicit;
  const right = new Float64Array(inner);
  const matrix: Tridiagonal = {
    lower: new Float64Array(inner).fill(-implicit),
    diagonal: new Float64Array(inner).fill(1 + 2 * implicit),
    upper: new Float64Array(inner).fill(-implicit),
  };
  const factors = makeFactors(inner);
  factorTridiagonal(matrix, factors);
  return (values, newLower, newUpper) => {
    for (let j = 1; j < intervals; j++) {
      right[j - 1] = values[j] + explicit * (values[j - 1] - 2 * values[j] + values[j + 1]);
    }
    right[0] += implicit * newLower;
    right[inner - 1] += implicit * newUpper;
    if (implicit !== 0) solveTridiagonal(matrix.lower, factors, right);
    values[0] = newLower;
    for (let j = 1; j < intervals; j++) values[j] = right[j - 1];
    values[intervals] = newUpper;
  };
}
