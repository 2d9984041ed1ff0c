import type { Contract, Greeks, Market } from '@/pricing/contract';
import { greeksFromLogDerivatives, greeksOfImmediateExercise } from '@/pricing/greeks';
import { fromPut, priceAmericanOnGrid } from '@/pricing/heat/american';
import type { GridValue } from '@/pricing/heat/grid-value';
import { refuseGrid } from '@/pricing/heat/refusals';
import { closedForm } from '@/pricing/methods/closed-form';
import { exp, logRatio } from '@/pricing/numerics/elementary';
import { solveBoundary, type Boundary } from '@/pricing/spectral/boundary';
import { premiumWithDerivatives } from '@/pricing/spectral/near-boundary';
import { earlyExercisePremium, logBoundaryNow } from '@/pricing/spectral/premium';
import { logStartOf, problemOf, regionsOf, type BoundaryProblem } from '@/pricing/spectral/problem';
import { changesWithinBump, premiumRates } from '@/pricing/spectral/rates';

type European = { value: number; errorEstimate: number; greeks: Greeks };

/** Of the larger of spot and strike: what sums of this length round. */
const rounding = 8e-15;
/** Of the distance between the two boundaries' values; measured, see `methods/spectral-boundary.ts`. */
const shareOfDistance = 1.5;
const roundingUnit = 1e-16;
/** For the derivatives by the rates at a kink. */
const kinkGrid = { spaceSteps: 200, timeSteps: 100, smoothing: 'none' } as const;

/**
 * An American option with one exercise boundary, or none; null where there are two, or where the
 * iteration for the boundary does not converge.
 */
export function priceBySpectralBoundary(
  contract: Contract,
  market: Market,
  nodes: number,
): GridValue | null {
  const { kind, strike } = contract;
  const european = europeanOf(contract, market);
  const problem = problemOf(contract, market, 0, 0);
  const regions = regionsOf(problem);
  const most = mostPremium(contract, market, problem);
  if (regions === 'none' || most <= roundingUnit * Math.max(strike, market.spot)) {
    return neverExercised(contract, market, european, most);
  }
  const solved = regions === 'two' ? null : solveBoundary(problem, nodes);
  if (solved === null) return null;

  const put = kind === 'put';
  const unit = put ? strike : market.spot;
  const x = put ? logRatio(market.spot, strike) : logRatio(strike, market.spot);
  const { asked, other } = solved;
  const [value, rough] = [asked, other].map((boundary) =>
    valueBy(boundary, problem, x, Math.abs(market.spot - strike), european.value, unit),
  );
  const errorEstimate =
    shareOfDistance * Math.abs(value - rough) +
    rounding * Math.max(strike, market.spot) +
    european.errorEstimate;
  const boundaryNow = logBoundaryNow(problem, asked);
  const diagnostics = {
    iterations: asked.rounds,
    exerciseBoundary: strike * exp(put ? boundaryNow : -boundaryNow),
    exerciseBoundaryAtExpiry: strike * exp(put ? logStartOf(problem) : -logStartOf(problem)),
  };
  if (x <= boundaryNow) {
    return { value, errorEstimate, greeks: greeksOfImmediateExercise(market, kind), diagnostics };
  }
  const rates = premiumRates(contract, market, asked, x, unit);
  if (rates === null) return null;
  const premium = fromPut(premiumWithDerivatives(problem, asked, x), kind, unit);
  const greeks = greeksFromLogDerivatives(market, contract.expiry, premium, rates.sensitivities);
  return {
    value,
    errorEstimate,
    greeks: sumOf(european.greeks, greeks),
    diagnostics: { ...diagnostics, rateBump: rates.bump },
  };
}

/**
 * More than early exercise can ever be worth: interest on the strike for the whole time, and on the
 * spot where its yield is negative. With rates of 1e-17 there is a boundary, but nothing to find.
 */
function mostPremium(
  { kind, strike }: Contract,
  { spot }: Market,
  { rate, carry }: BoundaryProblem,
): number {
  const [paid, owned] = kind === 'put' ? [strike, spot] : [spot, strike];
  return Math.max(rate, 0) * paid + Math.max(-carry, 0) * owned;
}

/**
 * The European option. Where a small move of a rate makes exercise worthwhile, the value has a kink and
 * no derivative by that rate: then the mean of both sides is given, as the heat grid has it.
 */
function neverExercised(
  contract: Contract,
  market: Market,
  european: European,
  most: number,
): GridValue {
  const errorEstimate = european.errorEstimate + most;
  const known = { ...european, errorEstimate, diagnostics: { iterations: 0 } };
  const deviation = market.volatility * Math.sqrt(contract.expiry);
  if (!changesWithinBump(contract, market) || refuseGrid(kinkGrid, deviation)) return known;
  const { greeks, diagnostics } = priceAmericanOnGrid(contract, market, kinkGrid);
  const { rho, yieldRho } = greeks;
  const { rateBump } = diagnostics;
  return {
    ...known,
    greeks: { ...european.greeks, rho, yieldRho },
    diagnostics: { ...known.diagnostics, rateBump },
  };
}

function europeanOf(contract: Contract, market: Market): European {
  const result = closedForm.price({ ...contract, exercise: 'european' }, market, {});
  if (!result.ok || result.errorEstimate === null) throw new Error('a European option has a price');
  const { delta, gamma, vega, theta, rho, yieldRho } = result.greeks;
  const greeks = { delta, gamma, vega, theta, rho, yieldRho };
  return { value: result.value, errorEstimate: result.errorEstimate, greeks };
}

/** European value and premium; what exercise pays now where the spot lies beyond the boundary. */
function valueBy(
  boundary: Boundary,
  problem: BoundaryProblem,
  x: number,
  intrinsic: number,
  european: number,
  unit: number,
): number {
  if (x <= logBoundaryNow(problem, boundary)) return intrinsic;
  const premium = unit * Math.max(earlyExercisePremium(problem, boundary, x).value, 0);
  return Math.max(european + premium, x < 0 ? intrinsic : 0);
}

/** The premium obeys the equation and the scaling of time by itself, so that its Greeks just add. */
function sumOf(european: Greeks, premium: Greeks): Greeks {
  return {
    delta: european.delta + premium.delta,
    gamma: european.gamma + premium.gamma,
    vega: european.vega + premium.vega,
    theta: european.theta + premium.theta,
    rho: european.rho + premium.rho,
    yieldRho: european.yieldRho === null ? null : european.yieldRho + (premium.yieldRho ?? 0),
  };
}
