/** What may be wrong with a quote besides its shape, each at the field where it is mended. */
import type { PricingRequest } from '@/pricing/contract';
import { checkRequest } from '@/pricing/index';
import type { QuoteTerms } from '@/shared/contracts/quotes';
import type { Issue } from '@/shared/errors';
import { expiryInstantMs, type DeskClock } from '@/shared/quote-terms';
import type { Underlying } from '../models/underlying';

const longestPastMs = 24 * 3_600_000;
/** Clocks differ a little. */
const longestFutureMs = 2 * 60_000;

/** The engine speaks of the request; a ticket has its fields elsewhere. */
const ticketPaths: Record<string, string> = {
  contract: '',
  'contract.strike': 'strike',
  'contract.expiry': 'expiryDate',
  'contract.kind': 'kind',
  'contract.exercise': 'exercise',
};

export const ticketIssue = ({ path, code, message }: Issue): Issue => ({
  path: ticketPaths[path] ?? path,
  code,
  message,
});

type OptionTerms = Pick<QuoteTerms, 'expiryDate' | 'market' | 'pricedAt'>;

function instantIssues(draft: OptionTerms, desk: DeskClock): Issue[] {
  const pricedAt = Date.parse(draft.pricedAt);
  const age = Date.now() - pricedAt;
  const issues: Issue[] = [];
  if (age > longestPastMs || age < -longestFutureMs)
    issues.push({
      path: 'pricedAt',
      code: 'out-of-range',
      message: 'The valuation instant must be now, or within the last 24 hours.',
    });
  if (expiryInstantMs(draft.expiryDate, desk) <= pricedAt)
    issues.push({
      path: 'expiryDate',
      code: 'past-expiry',
      message: 'This expiry has passed; give a later date.',
    });
  return issues;
}

function underlyingIssues(draft: OptionTerms, underlying: Underlying | null): Issue[] {
  if (!underlying)
    return [
      {
        path: 'underlyingId',
        code: 'unknown-underlying',
        message: 'Choose one of this desk’s underlyings.',
      },
    ];
  const isFuture = underlying.kind === 'future';
  if (isFuture === 'carry' in draft.market) return [];
  return [
    isFuture
      ? {
          path: 'market.yield',
          code: 'unknown-field',
          message: 'A future has no yield of its own; leave it out.',
        }
      : { path: 'market.yield', code: 'missing', message: 'Give the yield or the foreign rate.' },
  ];
}

/** Every complaint at once; a past expiry is named by its date and not a second time by the engine. */
export function quoteIssues(
  draft: OptionTerms,
  underlying: Underlying | null,
  desk: DeskClock,
  request: PricingRequest,
): Issue[] {
  const issues = [...underlyingIssues(draft, underlying), ...instantIssues(draft, desk)];
  const checked = checkRequest(request);
  const engineIssues = checked.ok ? [] : checked.issues.map(ticketIssue);
  const isNew = ({ path }: Issue) => !issues.some((other) => other.path === path);
  return [...issues, ...engineIssues.filter(isNew)];
}
