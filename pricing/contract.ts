/**
 * The light door of the engine: the shape of one request and one result, as plain types.
 *
 * Everything that only needs to talk about a price (the wire schemas, the screens) imports this
 * file; everything that needs a price imports `pricing/index.ts`. Units and signs are those of
 * `conventions.ts`: years, continuously compounded rates, volatility per square-root year, values
 * per one unit of the underlying in the quote currency.
 */

import type { methodNames, optionKinds, pricedExercises } from './names';

export { checkRequest } from './check-request';
export { numberLimits, sizeLimits, yearFraction } from './conventions';
export {
  exercises,
  ladderSeries,
  methodNames,
  optionKinds,
  orderVerdicts,
  payoffs,
  pricedExercises,
} from './names';
export type {
  LadderStep,
  OrderFit,
  RowFindings,
  StudyReference,
  StudyRow,
  StudySummary,
} from './study/types';

export type OptionKind = (typeof optionKinds)[number];
export type PricedExercise = (typeof pricedExercises)[number];
export type MethodName = (typeof methodNames)[number];

/** `strike` in the quote currency, `expiry` in years from now. */
type ContractTerms = {
  exercise: PricedExercise;
  kind: OptionKind;
  strike: number;
  expiry: number;
};

export type VanillaContract = { payoff: 'vanilla' } & ContractTerms;

/** Pays all or nothing: `cash` in the quote currency, or one unit of the underlying. */
export type DigitalContract = (
  { payoff: 'cash-or-nothing'; cash: number } | { payoff: 'asset-or-nothing' }
) &
  ContractTerms;

/** The terms that decide a payoff. */
export type Contract = VanillaContract | DigitalContract;

/** A share, an index or a currency pair: `yield` is the dividend yield or the foreign rate. */
export type SpotMarket = { spot: number; rate: number; yield: number; volatility: number };

/** A future: `spot` is the futures price, and its carry is the domestic rate itself. */
export type FutureMarket = { spot: number; rate: number; carry: 'future'; volatility: number };

export type Market = SpotMarket | FutureMarket;

/** A method by name, with the sizes it should use; a size left out takes the method's default. */
export type MethodSettings = {
  name: MethodName;
  /** Intervals of the space grid (grid methods). */
  spaceSteps?: number;
  /** Intervals of the time grid (grid methods). */
  timeSteps?: number;
  /** Steps of the walk (lattice methods). */
  steps?: number;
  /** Nodes of the exercise boundary (collocation). */
  nodes?: number;
  /** How a lattice value is refined; `none` gives the plain value of the stated tree. */
  smoothing?: 'none' | 'richardson';
  /** Runs an explicit grid past its stability limit on purpose, to show what happens there. */
  beyondStability?: boolean;
};

/** `tolerance`: the cheapest method and size whose own error estimate holds it (absolute). */
export type MethodChoice = MethodSettings | { tolerance: number };

export type PricingRequest = { contract: Contract; market: Market; method?: MethodChoice };

/**
 * Sensitivities per 1.00 of their variable; theta per year, as time passes. `yieldRho` is null for
 * a future, which has no yield of its own; vanna and volga come from the closed form only.
 */
export type Greeks = {
  delta: number;
  gamma: number;
  vega: number;
  theta: number;
  rho: number;
  yieldRho: number | null;
  vanna?: number;
  volga?: number;
};

export type PricingWarning = { code: string; message: string };

export type PricingSuccess = {
  ok: true;
  value: number;
  /** Absolute, in the unit of `value`; null only where a method can give none. */
  errorEstimate: number | null;
  greeks: Greeks;
  /** The method with the settings that were really used. */
  method: MethodSettings;
  diagnostics: Record<string, number>;
  warnings: PricingWarning[];
};

export const pricingIssueCodes = [
  'missing',
  'not-a-number',
  'not-finite',
  'not-positive',
  'out-of-range',
  'unknown-name',
  'unknown-field',
  'not-priced',
  'method-does-not-price',
  'too-many-steps',
  'too-few-steps',
  'past-stability-limit',
  'tolerance-not-reached',
  'not-determined',
  'numerical-failure',
] as const;
export type PricingIssueCode = (typeof pricingIssueCodes)[number];

/** One thing wrong with a request: where, which kind, and a sentence that says what to do. */
export type PricingIssue = { code: PricingIssueCode; path: string; message: string };

export type PricingFailure = { ok: false } & PricingIssue;

export type PricingResult = PricingSuccess | PricingFailure;

export type CheckedRequest =
  { ok: true; request: PricingRequest } | { ok: false; issues: PricingIssue[] };

export const verdicts = ['agree', 'wide', 'disagree', 'one-route'] as const;
export type Verdict = (typeof verdicts)[number];
