/** What the page and the pricing thread say to each other. */
import type {
  Contract,
  Market,
  MethodName,
  MethodSettings,
  PricingRequest,
  PricingResult,
  Verdict,
} from '@/pricing/contract';

export type PricedRoute = { name: MethodName; result: PricingResult };

export type Comparison = { verdict: Verdict; refuted: boolean };

/** Only the newest price is wanted: a later task takes the place of one under way. */
export type PriceTask = { kind: 'price'; request: PricingRequest; tolerance: number };

/** Everything else is answered once and in full. */
export type QuestionTask =
  | { kind: 'volatility'; request: PricingRequest; premium: number }
  | { kind: 'strike'; request: PricingRequest; delta: number }
  | { kind: 'reprice'; contract: Contract; market: Market; methods: readonly MethodSettings[] };

export type PricingMessage = { sequence: number; task: PriceTask | QuestionTask };

export type Solution = { ok: true; value: number } | { ok: false; message: string };

export type PricingReply = { sequence: number } & (
  | { kind: 'routes'; routes: PricedRoute[]; comparison: Comparison | null }
  | { kind: 'solution'; solution: Solution }
);
