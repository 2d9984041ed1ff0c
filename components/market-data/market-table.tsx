import { StyleSheet, View } from 'react-native';
import type { Market } from '@/pricing/contract';
import { Section } from '@/components/ui/card';
import { DataTable, type Column } from '@/components/ui/data-table';
import { FactList } from '@/components/ui/fact-list';
import { Text } from '@/components/ui/text';
import { marketTableText } from '@/constants/texts/market-data';
import { space } from '@/constants/theme';
import type { Snapshot } from '@/shared/contracts/market-data';
import { formatNumber, formatPercent, formatQuantity, hardSpace } from '@/shared/format/numbers';

type Quote = Snapshot['quotes'][number];
type Row = Quote & { before: Market | null };

const { none } = marketTableText;

const price = ({ priceDecimals }: Quote, market: Market | null) =>
  market ? formatQuantity(market.spot, priceDecimals) : none;

const yieldText = (market: Market) => ('yield' in market ? formatPercent(market.yield) : none);

/** With its sign, to a hundredth of a percent. */
export function moveText(market: Market, before: Market | null): string {
  if (!before) return none;
  return `${formatNumber(100 * (market.spot / before.spot - 1), 2, 'always')}\u00a0%`;
}

const columns: readonly Column<Row>[] = [
  {
    id: 'underlying',
    header: marketTableText.underlying,
    cell: ({ symbol, name }) => (
      <View>
        <Text weight="semibold">{symbol}</Text>
        <Text size="small" tone="muted">
          {name}
        </Text>
      </View>
    ),
  },
  {
    id: 'price',
    header: marketTableText.price,
    align: 'end',
    cell: (row) => `${price(row, row.market)} ${row.currency}`,
  },
  {
    id: 'before',
    header: marketTableText.before,
    align: 'end',
    cell: (row) => <Text tone="muted">{price(row, row.before)}</Text>,
  },
  {
    id: 'move',
    header: marketTableText.move,
    align: 'end',
    cell: ({ market, before }) => moveText(market, before),
  },
  {
    id: 'rate',
    header: marketTableText.rate,
    align: 'end',
    cell: ({ market }) => formatPercent(market.rate),
  },
  {
    id: 'yield',
    header: marketTableText.yield,
    align: 'end',
    cell: ({ market }) => yieldText(market),
  },
  {
    id: 'volatility',
    header: marketTableText.volatility,
    align: 'end',
    cell: ({ market }) => formatPercent(market.volatility),
  },
  {
    id: 'volatility-before',
    header: marketTableText.volatilityBefore,
    align: 'end',
    cell: ({ before }) => (
      <Text tone="muted">{before ? formatPercent(before.volatility) : none}</Text>
    ),
  },
];

/** The numbers of a close beside those of the close before. */
export function MarketTable({ snapshot }: { snapshot: Snapshot }) {
  const { previous, quotes } = snapshot;
  const before = new Map(previous?.quotes.map((quote) => [quote.underlyingId, quote.market]));
  const rows = quotes.map((quote) => ({
    ...quote,
    before: before.get(quote.underlyingId) ?? null,
  }));
  return (
    <Section title={marketTableText.title(previous?.date ?? null)}>
      <DataTable
        plain
        caption={marketTableText.caption}
        columns={columns}
        rows={rows}
        rowId={({ underlyingId }) => underlyingId}
        card={(row) => <QuoteCard row={row} />}
      />
    </Section>
  );
}

/** One underlying on a phone. */
function QuoteCard({ row }: { row: Row }) {
  const { symbol, name, currency, market, before } = row;
  const was = before ? `, ${marketTableText.before}${hardSpace}${price(row, before)}` : '';
  const volatilityWas = before
    ? `, ${marketTableText.before}${hardSpace}${formatPercent(before.volatility)}`
    : '';
  return (
    <View style={styles.quote}>
      <View style={styles.line}>
        <View style={styles.name}>
          <Text weight="semibold">{symbol}</Text>
          <Text size="small" tone="muted">
            {name}
          </Text>
        </View>
        <Text tabular>{moveText(market, before)}</Text>
      </View>
      <FactList
        facts={[
          {
            name: marketTableText.price,
            value: `${price(row, market)} ${currency}${was}`,
          },
          { name: marketTableText.rate, value: formatPercent(market.rate) },
          ...('yield' in market
            ? [{ name: marketTableText.yield, value: formatPercent(market.yield) }]
            : []),
          {
            name: marketTableText.volatility,
            value: `${formatPercent(market.volatility)}${volatilityWas}`,
          },
        ]}
      />
    </View>
  );
}

const styles = StyleSheet.create({
  quote: { gap: space.xs, paddingVertical: space.xs },
  line: { flexDirection: 'row', alignItems: 'baseline', gap: space.sm },
  name: { flex: 1, minWidth: 0 },
});
