import type { Contract, Market, PricingFailure, PricingSuccess } from '@/pricing/contract';
import { carryYield, sizeLimits } from '@/pricing/conventions';
import {
  bumpedRateSensitivities,
  europeanRateSensitivities,
  greeksFromLogDerivatives,
  greeksOfImmediateExercise,
  rateBumpOf,
} from '@/pricing/greeks';
import { plainLocal, powersFor, smoothLocal, type LatticeLocal } from '@/pricing/lattice/local';
import { defectDoubt } from '@/pricing/lattice/defect';
import type { MakeWalkStep, WalkStep } from '@/pricing/lattice/walk';
import { exp } from '@/pricing/numerics/elementary';

export type LatticeSizes = { steps: number; smoothing: 'none' | 'richardson' };

/** What a walk gives for one contract: a result without the method's own name and settings. */
export type LatticeValue = Pick<
  PricingSuccess,
  'ok' | 'value' | 'errorEstimate' | 'greeks' | 'diagnostics'
>;

const fewestExtrapolatedSteps = 16;
const largestAdvice = 1e6;
/** ln of the largest price on a walk over the spot; beyond, the exponents leave the doubles. */
const widestReach = 600;

/**
 * Prices on one kind of walk. `none` is the plain value of the tree with that many steps.
 * `richardson` takes the shifted mean of `local.ts` at n, n/2 and n/4 steps: n with n/2 cancels
 * the error of first order, n/2 with n/4 gives the same quantity coarser, and the estimate is made
 * from the distance of the two: European errors then fall like 1/n², so it is three times the
 * error; American ones wander, and three times the distance covers them. (Measured on 240 random
 * American options against a grid of 1600 × 800, 250 to 2000 steps: it covers the error in 96 to
 * 99 % of them and is within thirty times it in 96 to 98 %.) The estimate of a plain tree is its
 * distance from a refined value, plus the latter's own.
 *
 * Rho and the yield's sensitivity of an American option are central differences of the value on
 * walks of the same number of steps; everything else comes from the walk itself.
 */
export function priceOnLattice(
  contract: Contract,
  market: Market,
  { steps, smoothing }: LatticeSizes,
  makeStep: MakeWalkStep,
): LatticeValue | PricingFailure {
  const lattice = latticeOf(contract, market, makeStep);
  const plain = smoothing === 'none';
  const walk = lattice.walkAt(steps);
  if (!plain && steps < fewestExtrapolatedSteps) return tooFewForSmoothing();
  if (market.volatility * Math.sqrt(contract.expiry * steps) > widestReach) return reachTooWide();
  if (walk === null || !lattice.existsAt(plain ? steps : Math.ceil(steps / 4))) {
    return stepTooLong(lattice.existsAt, plain ? 1 : 4);
  }

  const smooth = lattice.refined(plain ? judgeSteps(steps) : steps);
  const local = plain || smooth === null ? lattice.local(plainLocal, steps) : smooth.local;
  const { value, greeks, exercised } = lattice.valueWithGreeks(local, plain, steps);
  const doubt = defectDoubt(contract, market, walk, steps, value);
  const distance = smooth === null ? 0 : Math.abs(local.value - smooth.local.value);
  const bumped = contract.exercise === 'american' && !exercised;
  return {
    ok: true,
    value,
    greeks,
    errorEstimate: smooth === null ? null : smooth.errorEstimate + distance + doubt,
    diagnostics: {
      upProbability: walk.upProbability,
      upFactor: exp(walk.step),
      downFactor: exp(-walk.step),
      ...(bumped ? { rateBump: rateBumpOf(market, contract.expiry) } : {}),
    },
  };
}

/** A plain tree is judged by a refined value of four times its steps, as long as that is cheap. */
function judgeSteps(steps: number): number {
  return Math.max(fewestExtrapolatedSteps, steps, Math.min(4 * steps, 1000));
}

type Read = typeof plainLocal;

/** The walks of one contract: of any number of steps, with rate and yield moved by a bump. */
function latticeOf(contract: Contract, market: Market, makeStep: MakeWalkStep) {
  const { kind, strike, expiry } = contract;
  const { spot } = market;
  const american = contract.exercise === 'american';
  const terms = { spot, strike, kind, american };
  const rateBump = rateBumpOf(market, expiry);
  const powersBySteps = new Map<number, Float64Array>();

  function walkAt(steps: number, rateBy = 0, yieldBy = 0): WalkStep | null {
    const rate = market.rate + rateBy;
    const carry = carryYield(market) + yieldBy;
    const { volatility } = market;
    return makeStep({ rate, yield: carry, volatility }, expiry / steps);
  }

  /** The bumped walks must exist too, or the Greeks could not be given. */
  function existsAt(steps: number): boolean {
    return walkAt(steps, rateBump, 0) !== null && walkAt(steps, 0, rateBump) !== null;
  }

  function local(read: Read, steps: number, rateBy = 0, yieldBy = 0): LatticeLocal {
    const walk = walkAt(steps, rateBy, yieldBy);
    if (walk === null) throw new Error(`no walk of ${steps} steps: ask existsAt first`);
    let powers = powersBySteps.get(steps);
    if (powers === undefined) {
      powers = powersFor(walk, steps);
      powersBySteps.set(steps, powers);
    }
    return read({ terms, walk, steps, powers });
  }

  function refined(steps: number): { local: LatticeLocal; errorEstimate: number } | null {
    const half = Math.ceil(steps / 2);
    const quarter = Math.ceil(steps / 4);
    if (!existsAt(quarter)) return null;
    const full = local(smoothLocal, steps);
    const middle = local(smoothLocal, half);
    const fine = extrapolate(full, steps, middle, half);
    const coarse = extrapolate(middle, half, local(smoothLocal, quarter), quarter);
    const movement = Math.abs(fine.value - coarse.value);
    const rounding = 1e-11 * Math.max(spot, strike, Math.abs(fine.value));
    return { local: fine, errorEstimate: (american ? 3 : 1) * movement + rounding };
  }

  function bumpedValue(plain: boolean, steps: number, rateBy: number, yieldBy: number): number {
    if (plain) return local(plainLocal, steps, rateBy, yieldBy).value;
    const half = Math.ceil(steps / 2);
    const quarter = Math.ceil(steps / 4);
    const finer = local(smoothLocal, half, rateBy, yieldBy);
    return extrapolate(finer, half, local(smoothLocal, quarter, rateBy, yieldBy), quarter).value;
  }

  function valueWithGreeks(at: LatticeLocal, plain: boolean, steps: number) {
    const intrinsic = kind === 'call' ? spot - strike : strike - spot;
    if (american && intrinsic > 0 && (at.exercised || at.value <= intrinsic)) {
      const greeks = greeksOfImmediateExercise(market, kind);
      return { value: intrinsic, greeks, exercised: true };
    }
    const derivatives = { value: at.value, slope: at.first, curvature: at.second };
    const rates = american
      ? bumpedRateSensitivities(market, rateBump, (rateBy, yieldBy) =>
          bumpedValue(plain, steps, rateBy, yieldBy),
        )
      : europeanRateSensitivities(market, expiry, derivatives);
    return {
      value: Math.max(at.value, american ? intrinsic : 0, 0),
      greeks: greeksFromLogDerivatives(market, expiry, derivatives, rates),
      exercised: false,
    };
  }

  return { walkAt, existsAt, local, refined, valueWithGreeks };
}

/** Cancels an error that falls like 1/n, from n and fewer steps. */
function extrapolate(
  fine: LatticeLocal,
  fineSteps: number,
  coarse: LatticeLocal,
  coarseSteps: number,
): LatticeLocal {
  const weight = coarseSteps / (fineSteps - coarseSteps);
  return {
    value: fine.value + weight * (fine.value - coarse.value),
    first: fine.first + weight * (fine.first - coarse.first),
    second: fine.second + weight * (fine.second - coarse.second),
    exercised: fine.exercised,
  };
}

function tooFewForSmoothing(): PricingFailure {
  return {
    ok: false,
    code: 'too-few-steps',
    path: 'method.steps',
    message: `Extrapolation needs at least ${fewestExtrapolatedSteps} steps; raise the steps, or take the plain tree (smoothing none).`,
  };
}

function reachTooWide(): PricingFailure {
  return {
    ok: false,
    code: 'numerical-failure',
    path: 'method.steps',
    message:
      'So many steps at this volatility and expiry reach prices beyond what a computer holds; ' +
      'lower the steps, or price it on the grid.',
  };
}

/** The failure names the smallest power of two that would do. */
function stepTooLong(existsAt: (steps: number) => boolean, divisor: number): PricingFailure {
  let needed = 1;
  while (!existsAt(needed) && needed < largestAdvice) needed *= 2;
  const advice =
    needed * divisor <= sizeLimits.steps.max
      ? `raise the steps to ${needed * divisor}`
      : 'no number of steps within the cap is enough, so price it on the grid';
  return {
    ok: false,
    code: 'numerical-failure',
    path: 'method.steps',
    message: `In one step of this walk the drift outruns the volatility, and its probabilities leave the range from 0 to 1; ${advice}.`,
  };
}
