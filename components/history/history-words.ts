/** How a stored value is told in a line. */
import type { Agreement, StripRoute } from '@/components/charts/agreement-finding';
import { routeLabel } from '@/constants/texts/price';
import type { ValuationBody } from '@/shared/contracts/chain-bodies';
import type { HistoryRow } from '@/shared/contracts/history';
import { dateInZone } from '@/shared/dates';
import { valueDecimals } from '@/shared/format/numbers';
import { optionTerms } from '@/shared/format/terms';

type Valued = Pick<HistoryRow, 'underlying'> & { body: ValuationBody };

const yearMs = 365 * 86_400_000;

/** The day of expiry: the years on record are counted ACT/365 Fixed from the valuation instant. */
const expiryDateOf = ({ valuedAt, request }: ValuationBody, timeZone: string): string =>
  dateInZone(Math.round(Date.parse(valuedAt) + request.contract.expiry * yearMs), timeZone);

export const optionWords = ({ body, underlying }: Valued, timeZone: string): string => {
  const { kind, exercise, strike } = body.request.contract;
  const expiryDate = expiryDateOf(body, timeZone);
  return optionTerms(
    { kind, exercise, strike: String(strike), expiryDate },
    underlying.priceDecimals,
  );
};

export const decimalsOfValue = ({ body, underlying }: Valued): number =>
  valueDecimals(body.tolerance, underlying.priceDecimals);

const stripRoute = ({ route, result }: ValuationBody): StripRoute[] =>
  result.ok
    ? [
        {
          name: route,
          label: routeLabel(route),
          value: result.value,
          errorEstimate: result.errorEstimate,
        },
      ]
    : [];

/** What the strip shows; null where the primary route gave nothing to compare with. */
export function agreementOfRow(row: HistoryRow): Agreement | null {
  const { body, check, underlying } = row;
  if (!body.result.ok || body.verdict === undefined) return null;
  return {
    routes: [...stripRoute(body), ...(check ? stripRoute(check) : [])],
    tolerance: body.tolerance,
    verdict: body.verdict,
    refuted: body.refuted ?? false,
    decimals: decimalsOfValue(row),
    currency: underlying.currency,
  };
}

/** A value that someone had to look at: it failed, its routes do not agree, or an estimate was refuted. */
export const isException = ({ result, verdict, refuted }: ValuationBody): boolean =>
  !result.ok || verdict === 'disagree' || verdict === 'wide' || refuted === true;
