import type { Agreement } from '@/components/charts/agreement-finding';
import { routeLabel } from '@/constants/texts/price';
import type { QuoteSummary } from '@/shared/contracts/quotes';
import { optionTerms } from '@/shared/format/terms';
import { valueDecimals } from '@/shared/format/numbers';

/** `put 210.00, American, 2027-06-01` */
export const summaryOption = (quote: QuoteSummary): string =>
  optionTerms(quote, quote.underlying.priceDecimals);

/** `Winter wheat put 210.00, American, 2027-06-01` */
export const summaryTerms = (quote: QuoteSummary): string =>
  `${quote.underlying.name} ${summaryOption(quote)}`;

export const summaryAgreement = (quote: QuoteSummary): Agreement => ({
  routes: quote.strip.map((route) => ({ ...route, label: routeLabel(route.name) })),
  tolerance: quote.tolerance,
  verdict: quote.verdict,
  refuted: quote.refuted,
  decimals: valueDecimals(quote.tolerance, quote.underlying.priceDecimals),
  currency: quote.underlying.currency,
});
