import { StyleSheet, View } from 'react-native';
import { AgreementStrip } from '@/components/charts/agreement-strip';
import { Card } from '@/components/ui/card';
import { Link } from '@/components/ui/link';
import { Text } from '@/components/ui/text';
import { ticketText } from '@/constants/texts/ticket';
import { space } from '@/constants/theme';
import type { QuoteSummary } from '@/shared/contracts/quotes';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { formatInstant } from '@/shared/format/dates';
import { formatMoney } from '@/shared/format/money';
import { formatErrorEstimate, formatNumber } from '@/shared/format/numbers';
import { summaryAgreement, summaryTerms } from './quote-summary';

/** A row of the list on a phone. */
export function QuoteCard({ quote, desk }: { quote: QuoteSummary; desk: DeskAccess }) {
  const { underlying } = quote;
  const agreement = summaryAgreement(quote);
  return (
    <Card style={styles.card}>
      <View style={styles.line}>
        <Link href={`/desks/${desk.id}/quotes/${quote.id}`}>{quote.number}</Link>
        <Text size="small" tone="muted" tabular style={styles.end}>
          {formatInstant(quote.createdAt, desk.timeZone)} · {quote.createdBy.name}
        </Text>
      </View>
      <Text>{summaryTerms(quote)}</Text>
      <View style={styles.line}>
        <Text tabular size="lead" weight="semibold">
          {formatNumber(quote.value, agreement.decimals)}
        </Text>
        <Text size="small" tone="muted">
          {ticketText.perUnit(underlying.currency, underlying.unit)}
        </Text>
        <Text tabular tone="muted" style={styles.end}>
          ± {formatErrorEstimate(quote.errorEstimate)}
        </Text>
      </View>
      <View style={[styles.line, styles.centred]}>
        <AgreementStrip {...agreement} size="row" />
        <Text tabular weight="medium" style={styles.end}>
          {formatMoney(quote.total, underlying.currency, 'always')}
        </Text>
      </View>
    </Card>
  );
}

const styles = StyleSheet.create({
  card: { gap: 6, paddingVertical: space.md },
  line: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    alignItems: 'baseline',
    columnGap: space.sm,
  },
  centred: { alignItems: 'center' },
  end: { marginLeft: 'auto' },
});
