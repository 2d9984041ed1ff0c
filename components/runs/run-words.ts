/** What a run found, told in a line. */
import { findingOf, type Agreement } from '@/components/charts/agreement-finding';
import type { BadgeProps } from '@/components/ui/badge';
import { routeLabel } from '@/constants/texts/price';
import { exceptionText, runsText, runText } from '@/constants/texts/runs';
import type {
  ExceptionKind,
  Run,
  RunCounts,
  RunStatus,
  RunSummary,
  RunValuation,
} from '@/shared/contracts/runs';
import { formatErrorEstimate, formatNumber, valueDecimals } from '@/shared/format/numbers';
import { optionTerms } from '@/shared/format/terms';

export const statusTone: Record<RunStatus, BadgeProps['tone']> = {
  queued: 'muted',
  running: 'lake',
  finished: 'ochre',
  cancelled: 'muted',
  'signed-off': 'moss',
};

export const kindTone: Record<ExceptionKind, BadgeProps['tone']> = {
  failure: 'brick',
  disagree: 'brick',
  refuted: 'brick',
  unchecked: 'ochre',
  wide: 'ochre',
};

export const bookCodes = ({ books }: Pick<RunSummary, 'books'>): string =>
  books.map(({ code }) => code).join(', ');

/** The run in one sentence: how far it is, or what it found and who is needed. */
export function headingOf(run: Run): string {
  const { number, status, done, total, counts, openExceptions, exceptions } = run;
  if (status === 'queued') return runText.heading.queued(number);
  if (status === 'running') return runText.heading.running(done, total);
  if (status === 'cancelled') return runText.heading.cancelled(done, total);
  const found =
    counts.agree === total ? runText.allAgree(total) : runText.someAgree(counts.agree, total);
  if (openExceptions > 0) return `${found}; ${runText.need(openExceptions)}`;
  return exceptions > 0 && status === 'finished' ? `${found}; ${runText.answered}` : found;
}

const countOrder: readonly (keyof RunCounts)[] = [
  'agree',
  'disagree',
  'wide',
  'oneRoute',
  'failed',
  'refuted',
];

/** The counts that are not nought, those that agree first. */
export const countsOf = (counts: RunCounts): (keyof RunCounts)[] =>
  countOrder.filter((name) => counts[name] > 0);

export const countWords = (counts: RunCounts): string =>
  countsOf(counts)
    .map((name) => runsText.counted(name, counts[name]))
    .join(', ');

/** `Winter wheat put 210.00, American, 2027-06-01` */
export const valuedTerms = ({ underlying, terms }: RunValuation): string =>
  `${underlying.name} ${optionTerms(terms, underlying.priceDecimals)}`;

export const decimalsOf = ({ tolerance, underlying }: RunValuation): number =>
  valueDecimals(tolerance, underlying.priceDecimals);

/** More decimals where both values would look the same although they differ. */
export function tellingDecimals(valuation: RunValuation): number {
  const { primary, check } = valuation;
  const usual = decimalsOf(valuation);
  if (!primary.result.ok || !check.result.ok) return usual;
  const apart = Math.abs(check.result.value - primary.result.value);
  return apart === 0 ? usual : Math.max(usual, valueDecimals(apart, 0));
}

export const agreementOf = (valuation: RunValuation): Agreement => ({
  routes: valuation.strip.map((route) => ({ ...route, label: routeLabel(route.name) })),
  tolerance: valuation.tolerance,
  verdict: valuation.verdict,
  refuted: valuation.refuted,
  decimals: decimalsOf(valuation),
  currency: valuation.underlying.currency,
});

/** The primary route's value as it is written, or null where it gave none. */
export function valueText(valuation: RunValuation): string | null {
  const { result } = valuation.primary;
  return result.ok ? formatNumber(result.value, decimalsOf(valuation)) : null;
}

export function errorText({ primary: { result } }: RunValuation): string | null {
  return result.ok ? formatErrorEstimate(result.errorEstimate) : null;
}

/** Why somebody has to look at it, in a sentence. */
export function causeOf(valuation: RunValuation): string {
  const { primary, check } = valuation;
  const failures = [primary, check].flatMap(({ name, result }) =>
    result.ok ? [] : [exceptionText.failed(routeLabel(name), result.message)],
  );
  return failures.length > 0 ? failures.join(' ') : findingOf(agreementOf(valuation));
}

/** Exceptions are answered once the run has ended, and no more once it is signed off. */
export const isOpenForAnswers = ({ status }: Run): boolean => status === 'finished';

export const runsAgain = ({ status }: Run): boolean =>
  status === 'finished' || status === 'cancelled';
