import type { Contract, Market } from '@/pricing/contract';
import { carryYield } from '@/pricing/conventions';
import {
  bumpedRateSensitivities,
  greeksFromLogDerivatives,
  greeksOfImmediateExercise,
  rateBumpOf,
  type LogDerivatives,
} from '@/pricing/greeks';
import {
  makeAmericanNodes,
  solveAmericanPut,
  type AmericanNodes,
  type AmericanPut,
} from '@/pricing/heat/american-grid';
import type { GridSizes, GridValue } from '@/pricing/heat/grid-value';
import { refineGrid } from '@/pricing/heat/refine';
import { exp, log } from '@/pricing/numerics/elementary';
import type { LocalValue } from '@/pricing/numerics/interpolation';

/** An American option by the grid of `american-grid.ts`; a call is the put with spot and strike exchanged. */
export function priceAmericanOnGrid(
  contract: Contract,
  market: Market,
  sizes: GridSizes,
): GridValue {
  const { kind, strike, expiry } = contract;
  const { spot } = market;
  const unit = kind === 'put' ? strike : spot;
  const problem = putOf(contract, market, 0, 0);
  const nodesOf = nodesBySize(problem);

  let boundary: number | null = null;
  let stability = 0;
  let exercised = false;
  const { local, errorEstimate: gridError } = refineGrid(
    (spaceSteps, timeSteps) => {
      const solution = solveAmericanPut(problem, nodesOf(spaceSteps), timeSteps);
      if (spaceSteps === sizes.spaceSteps) {
        ({ boundary, stability, exercised } = solution);
      }
      return { ...solution.local, firstOrder: solution.firstOrder };
    },
    sizes.spaceSteps,
    sizes.timeSteps,
    sizes.smoothing,
  );

  const intrinsic = Math.max(kind === 'put' ? strike - spot : spot - strike, 0);
  const rounding = 1e-12 * Math.max(strike, spot, unit * Math.abs(local.value));
  const errorEstimate = unit * gridError + rounding;
  const diagnostics: Record<string, number> = { stabilityNumber: stability };
  if (boundary !== null)
    diagnostics.exerciseBoundary = strike * exp(kind === 'put' ? boundary : -boundary);
  if (exercised) {
    const greeks = greeksOfImmediateExercise(market, kind);
    return { value: intrinsic, errorEstimate, greeks, diagnostics };
  }

  const derivatives = fromPut(local, kind, unit);
  const rateBump = rateBumpOf(market, expiry);
  const rates = bumpedRateSensitivities(market, rateBump, (rate, carry) => {
    const moved = putOf(contract, market, rate, carry);
    return unit * solveAmericanPut(moved, nodesOf(sizes.spaceSteps), sizes.timeSteps).local.value;
  });
  return {
    value: Math.max(derivatives.value, intrinsic),
    errorEstimate,
    greeks: greeksFromLogDerivatives(market, expiry, derivatives, rates),
    diagnostics: { ...diagnostics, rateBump },
  };
}

/** The contract as a put per unit of its strike, with rate and yield moved by the given bumps. */
export function putOf(
  contract: Contract,
  market: Market,
  rateBy: number,
  yieldBy: number,
): AmericanPut {
  const x = log(market.spot / contract.strike);
  const rate = market.rate + rateBy;
  const carry = carryYield(market) + yieldBy;
  const { volatility } = market;
  const { expiry } = contract;
  return contract.kind === 'put'
    ? { x, rate, yield: carry, volatility, expiry }
    : { x: -x, rate: carry, yield: rate, volatility, expiry };
}

/** One set of nodes per size, so that bumped values are differences on a common grid. */
function nodesBySize(problem: AmericanPut): (spaceSteps: number) => AmericanNodes {
  const made = new Map<number, AmericanNodes>();
  return (spaceSteps) => {
    const known = made.get(spaceSteps);
    if (known) return known;
    const nodes = makeAmericanNodes(problem, spaceSteps);
    made.set(spaceSteps, nodes);
    return nodes;
  };
}

/** C = S·v(−x) for a call, V = K·v(x) for a put: value and derivatives in x = ln(S/K). */
export function fromPut(local: LocalValue, kind: 'call' | 'put', unit: number): LogDerivatives {
  const { value, first, second } = local;
  if (kind === 'put') return { value: unit * value, slope: unit * first, curvature: unit * second };
  return {
    value: unit * value,
    slope: unit * (value - first),
    curvature: unit * (value - 2 * first + second),
  };
}
