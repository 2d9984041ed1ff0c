import { StyleSheet, View } from 'react-native';
import { AgreementStrip } from '@/components/charts/agreement-strip';
import { Badge } from '@/components/ui/badge';
import { Card } from '@/components/ui/card';
import { Link } from '@/components/ui/link';
import { Text } from '@/components/ui/text';
import { booksText } from '@/constants/texts/books';
import { statusWord } from '@/constants/texts/trades';
import { space } from '@/constants/theme';
import type { TradeSummary } from '@/shared/contracts/trades';
import { formatMoney } from '@/shared/format/money';
import { formatDifference, formatErrorEstimate, formatNumber } from '@/shared/format/numbers';
import { lastAgreement, statusTone, tradeTerms } from './trade-summary';

/** A row of a book on a phone. */
export function TradeCard({ trade, deskId }: { trade: TradeSummary; deskId: string }) {
  return (
    <Card style={styles.card}>
      <View style={styles.line}>
        <Link href={`/desks/${deskId}/trades/${trade.id}`}>{trade.number}</Link>
        <Text size="small" tone="muted" numberOfLines={1} style={styles.grow}>
          {trade.counterparty}
        </Text>
        <Badge tone={statusTone[trade.status]} label={statusWord[trade.status]} />
      </View>
      <Text>{tradeTerms(trade)}</Text>
      <CardValue trade={trade} />
    </Card>
  );
}

function CardValue({ trade }: { trade: TradeSummary }) {
  const { lastValuation: last, underlying } = trade;
  if (!last)
    return (
      <Text size="small" tone="muted">
        {booksText.noValue}
      </Text>
    );
  const agreement = lastAgreement(trade, last);
  return (
    <>
      <View style={styles.line}>
        <Text tabular size="lead" weight="semibold">
          {formatNumber(last.value, agreement.decimals)}
        </Text>
        <Text tabular tone="muted">
          ± {formatErrorEstimate(last.errorEstimate)}
        </Text>
        <Text tabular weight="medium" style={styles.end}>
          {formatMoney(last.total, underlying.currency, 'always')}
        </Text>
      </View>
      <View style={[styles.line, styles.centred]}>
        <AgreementStrip {...agreement} size="row" />
        <Text tabular size="small" tone="muted" style={styles.end}>
          {last.change === null
            ? booksText.noChange
            : booksText.changed(formatDifference(last.change, agreement.decimals))}
        </Text>
      </View>
    </>
  );
}

const styles = StyleSheet.create({
  card: { gap: 6, paddingVertical: space.md },
  line: { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'baseline', columnGap: space.sm },
  centred: { alignItems: 'center' },
  grow: { flexGrow: 1, flexShrink: 1, flexBasis: 60 },
  end: { marginLeft: 'auto' },
});
