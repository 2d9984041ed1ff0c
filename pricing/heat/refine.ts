import type { LocalValue } from '@/pricing/numerics/interpolation';

export type Refined = { local: LocalValue; errorEstimate: number };

/** `firstOrder`: the grid is too coarse for its drift, and its error falls like h only. */
export type GridPoint = LocalValue & { firstOrder: boolean };

/**
 * Refines a result of second order by Richardson's extrapolation over grids of full, half and
 * quarter size. Full with half cancels the leading error h²; half with quarter gives the same
 * quantity once more, coarser, and the distance of the two bounds the error that is left. A small
 * share of the correction is added, because that distance passes through zero here and there; the
 * share falls with the grid, as the error itself falls against the correction. `none` keeps the
 * value of the full grid; its error is the correction. Where a grid is of first order only, twice
 * the correction is left to go, and three times it is the estimate.
 *
 * The factors were measured on 250 random American options (volatility 0.05 to 0.9, expiry 0.01 to
 * 6 years, rates and yields from −0.02 up) against a grid of 1600 × 800: from 50 to 400 space steps
 * the estimate covers the error in 97 to 99 % of them and is within thirty times it in 85 to 94 %.
 */
export function refineGrid(
  solve: (spaceSteps: number, timeSteps: number) => GridPoint,
  spaceSteps: number,
  timeSteps: number,
  smoothing: 'none' | 'richardson',
): Refined {
  const size = (divisor: number) => Math.ceil(spaceSteps / divisor);
  const solveAt = (divisor: number) => solve(size(divisor), Math.ceil(timeSteps / divisor));
  const full = solveAt(1);
  const half = solveAt(2);
  const fine = extrapolate(full, half, size(1) / size(2));
  const correction = Math.abs(full.value - fine.value);
  const firstOrder = full.firstOrder ? 3 * correction : 0;
  if (smoothing === 'none') return { local: full, errorEstimate: 1.5 * correction + firstOrder };
  const coarse = extrapolate(half, solveAt(4), size(2) / size(4));
  const movement = Math.abs(fine.value - coarse.value);
  const share = Math.min(0.027, 5.4 / spaceSteps);
  return { local: fine, errorEstimate: 0.7 * movement + share * correction + firstOrder };
}

/** Cancels an error that falls like the square of the step, from two grids whose sizes have the ratio. */
export function extrapolate(fine: LocalValue, coarse: LocalValue, ratio: number): LocalValue {
  const weight = 1 / (ratio * ratio - 1);
  return {
    value: fine.value + weight * (fine.value - coarse.value),
    first: fine.first + weight * (fine.first - coarse.first),
    second: fine.second + weight * (fine.second - coarse.second),
  };
}
