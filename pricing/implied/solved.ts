import type {
  PricingFailure,
  PricingIssueCode,
  PricingRequest,
  PricingResult,
} from '@/pricing/contract';

/** The answer to a question asked the other way round: a number, or why there is none. */
export type Solved = { ok: true; value: number } | PricingFailure;

/** How the solver asks for a price where there is no formula to invert. */
export type Pricer = (request: PricingRequest) => PricingResult;

export function unsolved(code: PricingIssueCode, path: string, message: string): PricingFailure {
  return { ok: false, code, path, message };
}
