import type { Contract, Market } from '@/pricing/contract';
import { carryYield } from '@/pricing/conventions';
import { europeanRateSensitivities, greeksFromLogDerivatives } from '@/pricing/greeks';
import { reachOf, solveEuropeanHeat } from '@/pricing/heat/european-grid';
import type { GridSizes, GridValue } from '@/pricing/heat/grid-value';
import { refineGrid } from '@/pricing/heat/refine';
import { exp, expm1, log } from '@/pricing/numerics/elementary';
import type { LocalValue } from '@/pricing/numerics/interpolation';

/** A European option by the heat of `european-grid.ts`: the side out of the money is solved for. */
export function priceEuropeanOnGrid(
  contract: Contract,
  market: Market,
  sizes: GridSizes,
): GridValue {
  const { strike, expiry } = contract;
  const { spot, rate, volatility } = market;
  const x = log(spot / strike) + (rate - carryYield(market)) * expiry;
  const deviation = volatility * Math.sqrt(expiry);
  const discounted = strike * exp(-rate * expiry);

  let lambda = 0;
  const z = x > 0 ? -x : x;
  const onGrid = z > -reachOf(deviation);
  const { local: heat, errorEstimate: heatError } = refineGrid(
    (spaceSteps, timeSteps) => {
      if (!onGrid) return { value: 0, first: 0, second: 0, firstOrder: false };
      const solution = solveEuropeanHeat(z, deviation, spaceSteps, timeSteps);
      lambda = Math.max(lambda, solution.lambda);
      return { ...solution.local, firstOrder: false };
    },
    sizes.spaceSteps,
    sizes.timeSteps,
    sizes.smoothing,
  );

  const unheated = discounted * exp(0.5 * x - 0.125 * deviation * deviation);
  const alive = withoutFactor(heat, x > 0);
  const sign = contract.kind === 'call' ? 1 : -1;
  const byParity = contract.kind !== (x > 0 ? 'put' : 'call');
  const forward = byParity ? sign * discounted * exp(x) : 0;
  const derivatives = {
    value: unheated * alive.value + (byParity ? sign * discounted * expm1(x) : 0),
    slope: unheated * alive.first + forward,
    curvature: unheated * alive.second + forward,
  };
  const rates = europeanRateSensitivities(market, expiry, derivatives);
  const rounding = 1e-12 * Math.max(discounted, discounted * exp(x));
  return {
    value: Math.max(derivatives.value, 0),
    errorEstimate: unheated * heatError + rounding,
    greeks: greeksFromLogDerivatives(market, expiry, derivatives, rates),
    diagnostics: { stabilityNumber: lambda },
  };
}

/** Derivatives in x of e^(x/2)·u, over e^(x/2); u is known at z = −|x|, so a put's slope turns. */
function withoutFactor(heat: LocalValue, mirrored: boolean): LocalValue {
  const first = mirrored ? -heat.first : heat.first;
  return {
    value: heat.value,
    first: 0.5 * heat.value + first,
    second: 0.25 * heat.value + first + heat.second,
  };
}
