import type { Agreement } from '@/components/charts/agreement-finding';
import type { Tone } from '@/components/ui/text';
import { routeLabel } from '@/constants/texts/price';
import type { LastValuation, TradeSummary } from '@/shared/contracts/trades';
import { valueDecimals } from '@/shared/format/numbers';
import { optionTerms } from '@/shared/format/terms';
import type { TradeStatus } from '@/shared/trade-moves';

/** `put 210.00, American, 2027-06-01` */
export const tradeOption = (trade: TradeSummary): string =>
  optionTerms(trade, trade.underlying.priceDecimals);

/** `Winter wheat put 210.00, American, 2027-06-01` */
export const tradeTerms = (trade: TradeSummary): string =>
  `${trade.underlying.name} ${tradeOption(trade)}`;

export const lastAgreement = (trade: TradeSummary, last: LastValuation): Agreement => ({
  routes: last.strip.map((route) => ({ ...route, label: routeLabel(route.name) })),
  tolerance: last.tolerance,
  verdict: last.verdict,
  refuted: last.refuted,
  decimals: valueDecimals(last.tolerance, trade.underlying.priceDecimals),
  currency: trade.underlying.currency,
});

export const statusTone: Record<TradeStatus, Exclude<Tone, 'ink'>> = {
  proposed: 'ochre',
  returned: 'brick',
  live: 'moss',
  amended: 'ochre',
  closed: 'muted',
  expired: 'muted',
};
