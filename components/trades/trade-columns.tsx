import {
  columnVisibilityFeature,
  createColumnHelper,
  rowSortingFeature,
  tableFeatures,
} from '@tanstack/react-table';
import { StyleSheet, View } from 'react-native';
import { AgreementStrip } from '@/components/charts/agreement-strip';
import { Badge } from '@/components/ui/badge';
import { Text } from '@/components/ui/text';
import { booksText } from '@/constants/texts/books';
import { statusWord } from '@/constants/texts/trades';
import type { LastValuation, TradeSort, TradeSummary } from '@/shared/contracts/trades';
import { formatMoney } from '@/shared/format/money';
import { formatDifference, formatErrorEstimate, formatNumber } from '@/shared/format/numbers';
import { optionTerms } from '@/shared/format/terms';
import { lastAgreement, statusTone } from './trade-summary';

/** The server sorts and filters; the table keeps which order and which columns are asked for. */
export const tradeFeatures = tableFeatures({ rowSortingFeature, columnVisibilityFeature });

const helper = createColumnHelper<typeof tradeFeatures, TradeSummary>();

/** Columns whose cells are numbers, which align at the right. */
export const numericColumns: readonly string[] = ['value', 'change', 'total'];

const sortable = (id: TradeSort, header: string, cell: (trade: TradeSummary) => React.ReactNode) =>
  helper.accessor((trade) => trade, {
    id,
    header,
    cell: ({ row }) => cell(row.original),
    enableSorting: true,
  });

export const tradeColumns = helper.columns([
  sortable('number', booksText.trade, (trade) => <Named trade={trade} />),
  sortable('underlying', booksText.terms, (trade) => <Terms trade={trade} />),
  sortable('expiry', booksText.expiry, ({ expiryDate }) => (
    <span className="unbroken">{expiryDate}</span>
  )),
  sortable('value', booksText.value, (trade) => <Value trade={trade} />),
  helper.display({
    id: 'agreement',
    header: booksText.agreement,
    cell: ({ row: { original: trade } }) => <Strip trade={trade} />,
    enableSorting: false,
  }),
  sortable('change', booksText.change, changeText),
  sortable('total', booksText.total, ({ lastValuation, underlying }) =>
    lastValuation ? formatMoney(lastValuation.total, underlying.currency, 'always') : '',
  ),
]);

function Named({ trade }: { trade: TradeSummary }) {
  return (
    <View>
      <span className="unbroken">{trade.number}</span>
      <View style={styles.badge}>
        <Badge tone={statusTone[trade.status]} label={statusWord[trade.status]} />
      </View>
    </View>
  );
}

function Terms({ trade }: { trade: TradeSummary }) {
  return (
    <View>
      <Text>{trade.underlying.name}</Text>
      <Text size="small" tone="muted" tabular>
        {optionTerms(trade, trade.underlying.priceDecimals)}
      </Text>
      <Text size="small" tone="muted">
        {trade.counterparty}
      </Text>
    </View>
  );
}

const decimalsOf = (trade: TradeSummary, last: LastValuation) =>
  lastAgreement(trade, last).decimals;

function Value({ trade }: { trade: TradeSummary }) {
  const { lastValuation: last } = trade;
  if (!last)
    return (
      <Text size="small" tone="muted">
        {booksText.noValue}
      </Text>
    );
  return (
    <View>
      <Text tabular style={styles.end}>
        {formatNumber(last.value, decimalsOf(trade, last))}
      </Text>
      <Text size="small" tone="muted" tabular style={styles.end}>
        ± {formatErrorEstimate(last.errorEstimate)}
      </Text>
    </View>
  );
}

function Strip({ trade }: { trade: TradeSummary }) {
  const { lastValuation: last } = trade;
  return last ? <AgreementStrip {...lastAgreement(trade, last)} size="row" /> : null;
}

function changeText(trade: TradeSummary): string {
  const { lastValuation: last } = trade;
  if (!last || last.change === null) return '';
  return formatDifference(last.change, decimalsOf(trade, last));
}

const styles = StyleSheet.create({
  badge: { flexDirection: 'row' },
  end: { textAlign: 'right' },
});
