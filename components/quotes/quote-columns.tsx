import { View } from 'react-native';
import { AgreementStrip } from '@/components/charts/agreement-strip';
import type { Column } from '@/components/ui/data-table';
import { Text } from '@/components/ui/text';
import { quotesText } from '@/constants/texts/quotes';
import type { QuoteSummary } from '@/shared/contracts/quotes';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { formatInstant } from '@/shared/format/dates';
import { formatMoney } from '@/shared/format/money';
import { formatErrorEstimate, formatNumber } from '@/shared/format/numbers';
import { summaryAgreement, summaryOption } from './quote-summary';

/** A row of the list on a wide window. */
export const quoteColumns = (desk: DeskAccess): Column<QuoteSummary>[] => [
  {
    id: 'number',
    header: quotesText.number,
    cell: ({ number }) => <span className="unbroken">{number}</span>,
  },
  { id: 'terms', header: quotesText.terms, cell: (quote) => <Terms quote={quote} /> },
  {
    id: 'value',
    header: quotesText.value,
    align: 'end',
    cell: (quote) => formatNumber(quote.value, summaryAgreement(quote).decimals),
  },
  {
    id: 'error',
    header: quotesText.error,
    align: 'end',
    cell: ({ errorEstimate }) => formatErrorEstimate(errorEstimate),
  },
  {
    id: 'agreement',
    header: quotesText.agreement,
    cell: (quote) => <AgreementStrip {...summaryAgreement(quote)} size="row" />,
  },
  {
    id: 'total',
    header: quotesText.total,
    align: 'end',
    cell: ({ total, underlying }) => formatMoney(total, underlying.currency, 'always'),
  },
  {
    id: 'saved',
    header: quotesText.saved,
    cell: (quote) => <Saved quote={quote} desk={desk} />,
  },
];

function Terms({ quote }: { quote: QuoteSummary }) {
  return (
    <View>
      <Text>{quote.underlying.name}</Text>
      <Text size="small" tone="muted" tabular>
        {summaryOption(quote)}
      </Text>
    </View>
  );
}

function Saved({ quote, desk }: { quote: QuoteSummary; desk: DeskAccess }) {
  return (
    <View>
      <Text tabular>{formatInstant(quote.createdAt, desk.timeZone)}</Text>
      <Text size="small" tone="muted">
        {quote.createdBy.name}
      </Text>
    </View>
  );
}
