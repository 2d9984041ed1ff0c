import type { Verdict } from '@/pricing/contract';
import { agreementText } from '@/constants/texts/agreement';
import { formatErrorEstimate, formatNumber } from '@/shared/format/numbers';

export type StripRoute = {
  name: string;
  label: string;
  value: number;
  errorEstimate: number | null;
};

export type Agreement = {
  /** The first route is the reference: its value is the price that is shown. */
  routes: readonly StripRoute[];
  /** How far routes may lie apart and still agree, in the unit of the values. */
  tolerance: number;
  verdict: Verdict;
  /** Whether some pair lies further apart than its error estimates allow. */
  refuted: boolean;
  /** Decimals that a value is shown with. */
  decimals: number;
  currency: string;
};

/** The largest distance between any two routes. */
function spread(routes: readonly StripRoute[]): number {
  const values = routes.map(({ value }) => value);
  return Math.max(...values) - Math.min(...values);
}

/** A distance never shown smaller than it is told apart: 0.00004 is not `0.0000`. */
export function spellDistance(distance: number, decimals: number): string {
  const plain = formatNumber(distance, decimals);
  return distance > 0 && Number(distance.toFixed(decimals)) === 0
    ? formatErrorEstimate(distance)
    : plain;
}

/** What the strip shows, in one sentence: its text alternative and the head of its figures. */
export function findingOf(agreement: Agreement): string {
  const sentence = verdictSentence(agreement);
  const told = agreement.verdict === 'disagree' || !agreement.refuted;
  return told ? sentence : `${sentence} ${agreementText.refuted}`;
}

function verdictSentence({ routes, tolerance, verdict, decimals }: Agreement): string {
  const apart = spellDistance(spread(routes), decimals);
  const allowed = spellDistance(tolerance, decimals);
  switch (verdict) {
    case 'agree':
      return agreementText.agree(apart, allowed);
    case 'disagree':
      return agreementText.disagree(apart, allowed);
    case 'one-route':
      return routes.length > 1 ? agreementText.unknownError : agreementText.oneRoute;
    case 'wide': {
      if (spread(routes) > tolerance) return agreementText.wideApart(apart, allowed);
      const error = Math.max(...routes.map(({ errorEstimate }) => errorEstimate ?? 0));
      return agreementText.wideError(apart, formatErrorEstimate(error), allowed);
    }
  }
}
