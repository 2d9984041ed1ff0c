import type {
  Contract,
  Market,
  MethodName,
  MethodSettings,
  PricingResult,
} from '@/pricing/contract';

/** The settings of a method without its name; a size that a method does not use is absent. */
export type MethodSizes = Omit<MethodSettings, 'name'>;

/**
 * What a numerical method gives, and what its implementer promises. A method is one file in
 * `methods/` and one line in `registry.ts`; everything that lists methods reads the registry, and
 * the conformance suite (`tests/pricing/conformance.test.ts`) holds each entry to these points.
 *
 *  1. `prices` answers from the contract and the market alone, and never throws. Where it says
 *     no, a request gets the failure `method-does-not-price`, with a sentence that names what: for
 *     the payoff at the engine's door (`index.ts`), for the exercise from `price`.
 *  2. `price` is given a request that `checkRequest` has accepted: finite numbers, positive spot,
 *     strike, expiry and volatility, settings within the caps. It does not check those again.
 *  3. `price` returns finite numbers or a failure value. Never NaN or Infinity, never a silent
 *     repair of the input; what cannot be computed is a failure with a code and advice.
 *  4. Same inputs, same 64 bits, in every engine: no clock, no random source without a seed, no
 *     state kept between calls, sums in a fixed order, and of functions only `+ - * / sqrt` and
 *     those of `numerics/elementary.ts`.
 *  5. A setting left out takes the value of `defaultSettings`; the result reports every setting
 *     that was really used, so that the number can be made again from the result alone.
 *  6. `errorEstimate` is absolute, in the unit of the value, and honest per method and family: at
 *     least the true error in 95 % of cases, and at most thirty times it in 80 % of the cases
 *     whose true error exceeds ten times rounding. It is null only where none can be given.
 *  7. All the Greeks of `contract.ts` come with the value, in the units of `conventions.ts`, from
 *     the method itself where it can give them; where a rate's Greek is the difference of revalued
 *     markets, the diagnostics carry the size of the move as `rateBump`.
 *  8. A warning has a code and one sentence for the person who reads the number. Diagnostics are
 *     finite numbers under fixed names.
 *  9. `machinery` names what a wrong number could come from, in words shared by all methods. Two
 *     routes whose machinery is the same do not check each other (`verdict.ts`).
 * 10. `summary` is read by users: what it does, when to use it, where it is weak.
 * 11. `work` counts the node updates of one value at given settings; it only has to order the
 *     methods and sizes by cost, so that a tolerance is met in the cheapest way.
 */
export type Method = {
  name: MethodName;
  label: string;
  summary: string;
  /** Order in the step of space (grids) or in the reciprocal of steps (walks); null: exact, or faster than any order. */
  theoreticalOrder: number | null;
  /** Where early exercise costs a method its order: what is left of it. */
  americanOrder?: number;
  /** A walk that exists for odd numbers of steps only. */
  oddSteps?: true;
  /**
   * A scheme that is stable up to a fixed k/h² only: by how much a study multiplies the time steps
   * where it doubles the space steps, and sizes past the limit, to show what happens there.
   */
  stability?: {
    timeGrowth: number;
    pastLimit: (contract: Contract, market: Market, sizes: MethodSizes) => MethodSizes;
  };
  /** Priced by name and studied, but never chosen: neither a cross-check nor a tolerance takes it. */
  byNameOnly?: true;
  machinery: readonly string[];
  defaultSettings: MethodSizes;
  /** Where a search for a tolerance starts; it doubles every size until one holds or a cap ends it. */
  coarsestSettings: MethodSizes;
  prices: (contract: Contract, market: Market) => boolean;
  work: (settings: MethodSizes) => number;
  price: (contract: Contract, market: Market, settings: MethodSizes) => PricingResult;
};
