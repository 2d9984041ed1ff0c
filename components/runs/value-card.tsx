import { StyleSheet, View } from 'react-native';
import { AgreementStrip } from '@/components/charts/agreement-strip';
import { Badge } from '@/components/ui/badge';
import { Card } from '@/components/ui/card';
import { Link } from '@/components/ui/link';
import { Text } from '@/components/ui/text';
import { exceptionText, valuesText } from '@/constants/texts/runs';
import { space } from '@/constants/theme';
import type { RunValuation } from '@/shared/contracts/runs';
import { formatMoney } from '@/shared/format/money';
import { formatDifference } from '@/shared/format/numbers';
import { agreementOf, decimalsOf, errorText, kindTone, valuedTerms, valueText } from './run-words';

/** A value of a run on a phone. */
export function ValueCard({ valuation, deskId }: { valuation: RunValuation; deskId: string }) {
  const { trade, book, exception } = valuation;
  return (
    <Card style={styles.card}>
      <View style={styles.line}>
        <Link href={`/desks/${deskId}/trades/${trade.id}`}>{trade.number}</Link>
        <Text size="small" tone="muted">
          {book.code}
        </Text>
        {exception ? (
          <View style={styles.end}>
            <Badge
              label={exceptionText.kinds[exception.kind]}
              tone={exception.state === 'open' ? kindTone[exception.kind] : 'muted'}
            />
          </View>
        ) : null}
      </View>
      <Text>{valuedTerms(valuation)}</Text>
      <Figures valuation={valuation} deskId={deskId} />
    </Card>
  );
}

function Figures({ valuation, deskId }: { valuation: RunValuation; deskId: string }) {
  const { trade, change, total, underlying, strip } = valuation;
  const value = valueText(valuation) ?? valuesText.noValue;
  const error = errorText(valuation);
  return (
    <>
      <View style={styles.line}>
        <Text tabular size="lead" weight="semibold">
          <Link
            href={`/desks/${deskId}/history/${valuation.position}`}
            label={valuesText.openValue(trade.number, value)}
          >
            {value}
          </Link>
        </Text>
        {error === null ? null : (
          <Text tabular tone="muted">
            ± {error}
          </Text>
        )}
        {total === null ? null : (
          <Text tabular weight="medium" style={styles.end}>
            {formatMoney(total, underlying.currency, 'always')}
          </Text>
        )}
      </View>
      <View style={[styles.line, styles.centred]}>
        {strip.length > 0 ? <AgreementStrip {...agreementOf(valuation)} size="row" /> : null}
        <Text tabular size="small" tone="muted" style={styles.end}>
          {change === null
            ? valuesText.firstValue
            : valuesText.changed(formatDifference(change, decimalsOf(valuation)))}
        </Text>
      </View>
    </>
  );
}

const styles = StyleSheet.create({
  card: { gap: 6, paddingVertical: space.md },
  line: { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'baseline', columnGap: space.sm },
  centred: { alignItems: 'center' },
  end: { marginLeft: 'auto' },
});
