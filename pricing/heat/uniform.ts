import type { Contract, Market } from '@/pricing/contract';
import {
  bumpedRateSensitivities,
  europeanRateSensitivities,
  greeksFromLogDerivatives,
  greeksOfImmediateExercise,
  rateBumpOf,
} from '@/pricing/greeks';
import { fromPut, putOf } from '@/pricing/heat/american';
import type { GridSizes, GridValue } from '@/pricing/heat/grid-value';
import { extrapolate, type Refined } from '@/pricing/heat/refine';
import type { LocalValue } from '@/pricing/numerics/interpolation';
import {
  makeUniformNodes,
  solveUniformPut,
  type HeatPut,
  type Scheme,
} from '@/pricing/heat/uniform-grid';

/**
 * A vanilla option on the grid of `uniform-grid.ts`; a call is the put with spot and strike, rate and
 * yield exchanged, with or without early exercise.
 */
export function priceOnUniformGrid(
  contract: Contract,
  market: Market,
  sizes: GridSizes,
  scheme: Scheme,
): GridValue {
  const { kind, strike, expiry } = contract;
  const { spot } = market;
  const american = contract.exercise === 'american';
  const unit = kind === 'put' ? strike : spot;
  const problemAt = (rateBy: number, yieldBy: number): HeatPut => ({
    ...putOf(contract, market, rateBy, yieldBy),
    american,
  });
  const problem = problemAt(0, 0);

  let exercised = false;
  const { local, errorEstimate: gridError } = refineAtFixedLambda(
    (spaceSteps, timeSteps) => {
      const nodes = makeUniformNodes(problem, spaceSteps);
      const solution = solveUniformPut(problem, nodes, timeSteps, scheme);
      if (spaceSteps === sizes.spaceSteps) ({ exercised } = solution);
      return solution.local;
    },
    sizes,
    american,
  );

  const rounding = 1e-12 * Math.max(strike, spot, unit * Math.abs(local.value));
  const errorEstimate = unit * gridError + rounding;
  if (exercised) {
    const greeks = greeksOfImmediateExercise(market, kind);
    return { value: exerciseValue(contract, market), errorEstimate, greeks, diagnostics: {} };
  }

  const derivatives = fromPut(local, kind, unit);
  const rateBump = rateBumpOf(market, expiry);
  const nodes = makeUniformNodes(problem, sizes.spaceSteps);
  const rates = american
    ? bumpedRateSensitivities(market, rateBump, (rateBy, yieldBy) => {
        const moved = problemAt(rateBy, yieldBy);
        return unit * solveUniformPut(moved, nodes, sizes.timeSteps, scheme).local.value;
      })
    : europeanRateSensitivities(market, expiry, derivatives);
  return {
    value: derivatives.value,
    errorEstimate,
    greeks: greeksFromLogDerivatives(market, expiry, derivatives, rates),
    diagnostics: american ? { rateBump } : {},
  };
}

/**
 * Richardson's extrapolation over grids of full, half and quarter width with a quarter and a
 * sixteenth of the time steps, so that k/h² stays and the error has the one leading term h², in
 * a scheme of first order in time too. The estimate is made as in `refine.ts`.
 *
 * Its factors were measured on 120 random options of each exercise (volatility 0.05 to 0.9, expiry
 * 0.01 to 5 years) against the closed form and the concentrated grid of 1000 × 500: at 192 and 384
 * space steps they cover the error in 97 to 100 % and are within thirty times it in all that could
 * be judged. On coarser grids they err on the safe side.
 */
function refineAtFixedLambda(
  solve: (spaceSteps: number, timeSteps: number) => LocalValue,
  { spaceSteps, timeSteps, smoothing }: GridSizes,
  american: boolean,
): Refined {
  const width = (divisor: number) => Math.ceil(spaceSteps / divisor);
  const solveAt = (divisor: number) =>
    solve(width(divisor), Math.ceil(timeSteps / (divisor * divisor)));
  const full = solveAt(1);
  const half = solveAt(2);
  const fine = extrapolate(full, half, width(1) / width(2));
  const correction = Math.abs(full.value - fine.value);
  if (smoothing === 'none') return { local: full, errorEstimate: 2 * correction };
  const coarse = extrapolate(half, solveAt(4), width(2) / width(4));
  const movement = Math.abs(fine.value - coarse.value);
  const squared = (34 / spaceSteps) * (34 / spaceSteps);
  const share = Math.min(0.027, american ? 0.13 * squared : squared * squared);
  return { local: fine, errorEstimate: (american ? 1 : 0.5) * movement + share * correction };
}

/** What the holder could have now: the least that the option is worth. */
export function exerciseValue({ exercise, kind, strike }: Contract, { spot }: Market): number {
  return exercise === 'american' ? Math.max(kind === 'put' ? strike - spot : spot - strike, 0) : 0;
}
