import { Section } from '@/components/ui/card';
import { FactList, type Fact } from '@/components/ui/fact-list';
import { quotesText } from '@/constants/texts/quotes';
import { ticketText } from '@/constants/texts/ticket';
import type { Market } from '@/pricing/contract';
import type { Quote } from '@/shared/contracts/quotes';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { formatInstant } from '@/shared/format/dates';
import {
  formatDifference,
  formatPercent,
  formatQuantity,
  valueDecimals,
} from '@/shared/format/numbers';
import { optionTerms } from '@/shared/format/terms';
import { positionWords } from '@/components/price/answer-card';

type FactsProps = { quote: Quote; desk: DeskAccess };

const atDesk = (instant: string, { timeZone }: DeskAccess) =>
  quotesText.expiryAt(formatInstant(instant, timeZone), timeZone);

const yieldFacts = (market: Market): Fact[] =>
  'carry' in market ? [] : [{ name: quotesText.yield, value: formatPercent(market.yield) }];

/** The inputs: terms, market, and the instant they were priced at. */
export function QuoteTermsSection({ quote, desk }: FactsProps) {
  const { underlying, market } = quote;
  const facts: Fact[] = [
    { name: quotesText.underlying, value: `${underlying.name} (${underlying.symbol})` },
    { name: quotesText.option, value: optionTerms(quote, underlying.priceDecimals) },
    { name: quotesText.position, value: positionWords(quote, underlying.unit) },
    { name: quotesText.expiry, value: atDesk(quote.expiryAt, desk) },
    { name: quotesText.years, value: quotesText.yearsOf(formatQuantity(quote.expiryYears, 0, 6)) },
    {
      name: 'carry' in market ? ticketText.spot('future') : quotesText.spot,
      value: formatQuantity(market.spot, underlying.priceDecimals),
    },
    { name: quotesText.volatility, value: formatPercent(market.volatility) },
    { name: quotesText.rate, value: formatPercent(market.rate) },
    ...yieldFacts(market),
    ...(quote.note === '' ? [] : [{ name: quotesText.note, value: quote.note }]),
  ];
  return (
    <Section title={quotesText.termsTitle}>
      <FactList facts={facts} />
    </Section>
  );
}

/** Who saved it, when, by which engine, on which close, and what the ticket had shown. */
export function QuoteRecord({ quote, desk }: FactsProps) {
  const facts: Fact[] = [
    { name: quotesText.savedBy, value: quote.createdBy.name },
    { name: quotesText.savedAt, value: atDesk(quote.createdAt, desk) },
    { name: quotesText.pricedAt, value: atDesk(quote.pricedAt, desk) },
    { name: quotesText.ticketShowed, value: ticketWords(quote) },
    { name: quotesText.engine, value: quote.engine, mono: true },
    quote.snapshotId === null
      ? { name: quotesText.snapshot, value: quotesText.noSnapshot }
      : { name: quotesText.snapshot, value: quote.snapshotId, mono: true },
    { name: quotesText.identifier, value: quote.id, mono: true },
  ];
  return (
    <Section title={quotesText.recordTitle}>
      <FactList facts={facts} />
    </Section>
  );
}

function ticketWords({ value, indicativeValue, tolerance, underlying }: Quote): string {
  const decimals = valueDecimals(tolerance, underlying.priceDecimals);
  const shown = formatQuantity(indicativeValue, decimals, 17);
  if (Object.is(value, indicativeValue)) return quotesText.sameBits(shown);
  return quotesText.otherBits(shown, formatDifference(indicativeValue - value, decimals));
}
