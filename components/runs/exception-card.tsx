import { StyleSheet, View } from 'react-native';
import { AgreementStrip } from '@/components/charts/agreement-strip';
import { Badge } from '@/components/ui/badge';
import { Card } from '@/components/ui/card';
import { Link } from '@/components/ui/link';
import { Text } from '@/components/ui/text';
import { LinkButton } from '@/components/ui/text-field';
import { exceptionText } from '@/constants/texts/runs';
import { space } from '@/constants/theme';
import type { ExceptionalValuation, Run } from '@/shared/contracts/runs';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { formatMoney } from '@/shared/format/money';
import { optionTerms } from '@/shared/format/terms';
import { ExceptionAnswers } from './exception-answers';
import { ExceptionFigures } from './exception-figures';
import { agreementOf, causeOf, kindTone } from './run-words';

export type ExceptionCardProps = {
  desk: DeskAccess;
  userId: string;
  run: Run;
  valuation: ExceptionalValuation;
  open: boolean;
  onOpen: (open: boolean) => void;
  onRerun: () => void;
};

/** One exception: what is wrong and by how much, the figures behind it, and what answers it. */
export function ExceptionCard(props: ExceptionCardProps) {
  const { desk, valuation, open, onOpen } = props;
  const { trade, underlying, terms, exception, strip } = valuation;
  return (
    <Card style={styles.card}>
      <View style={styles.head}>
        <View style={styles.title}>
          <Text>
            <Link href={`/desks/${desk.id}/trades/${trade.id}`}>{trade.number}</Link>{' '}
            <Text weight="semibold">{underlying.name}</Text>
          </Text>
          <Text size="small" tone="muted" tabular>
            {optionTerms(terms, underlying.priceDecimals)}
          </Text>
        </View>
        <Badge label={exceptionText.kinds[exception.kind]} tone={kindTone[exception.kind]} />
      </View>
      {strip.length > 0 ? <AgreementStrip {...agreementOf(valuation)} size="card" /> : null}
      <View>
        <Text>{causeOf(valuation)}</Text>
        <Text weight="medium" tabular>
          {materialityWords(valuation)}
        </Text>
      </View>
      <View style={styles.why}>
        <LinkButton
          label={open ? exceptionText.whyNot : exceptionText.why}
          expanded={open}
          onPress={() => onOpen(!open)}
        />
      </View>
      {open ? <ExceptionFigures desk={desk} valuation={valuation} /> : null}
      <ExceptionAnswers {...props} />
    </Card>
  );
}

const materialityWords = ({ exception: { materiality }, underlying }: ExceptionalValuation) =>
  materiality === null
    ? exceptionText.unknownMateriality
    : exceptionText.apart(formatMoney(materiality, underlying.currency));

const styles = StyleSheet.create({
  card: { gap: space.md, flexGrow: 1 },
  head: { flexDirection: 'row', alignItems: 'flex-start', gap: space.md },
  title: { flex: 1, minWidth: 0 },
  why: { flexDirection: 'row' },
});
