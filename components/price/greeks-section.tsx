import { StyleSheet, View } from 'react-native';
import { Section } from '@/components/ui/card';
import { DataTable, type Column } from '@/components/ui/data-table';
import { Text } from '@/components/ui/text';
import { priceText } from '@/constants/texts/price';
import { space } from '@/constants/theme';
import type { Greeks } from '@/pricing/contract';
import { formatSensitivities, shownGreeks, type ShownGreek } from '@/shared/format/greeks';
import { formatAmount } from '@/shared/format/money';
import type { AlignedText } from '@/shared/format/numbers';
import { positionUnits, type PositionTerms } from '@/shared/quote-terms';
import { answerOf, type Evidence } from './evidence';

type GreekLine = ShownGreek & { perUnit: AlignedText; positionText: string };

/** The Greeks per unit and, where there is one, for the position, each with what it is per. */
export function GreeksSection({ evidence }: { evidence: Evidence }) {
  const answer = answerOf(evidence);
  if (!answer) return null;
  const { currency } = evidence.underlying;
  return (
    <Section title={priceText.moves} style={styles.section}>
      <View style={styles.table}>
        <DataTable
          plain
          caption={priceText.moves}
          columns={evidence.position ? [...unitColumns, positionColumn(currency)] : unitColumns}
          rows={linesOf(answer.greeks, evidence.position, currency)}
          rowId={({ label, per }) => `${label} ${per}`}
        />
      </View>
    </Section>
  );
}

function linesOf(greeks: Greeks, position: PositionTerms | null, currency: string): GreekLine[] {
  const shown = shownGreeks(greeks);
  const unitTexts = formatSensitivities(shown.map(({ value }) => value));
  return shown.map((greek, index) => ({
    ...greek,
    perUnit: unitTexts[index],
    positionText: position
      ? formatAmount(positionUnits(position).times(greek.value).toFixed(), currency, 'always')
      : '',
  }));
}

function Aligned({ text, padding }: AlignedText) {
  return (
    <span>
      {text}
      <span aria-hidden style={{ visibility: 'hidden' }}>
        {padding}
      </span>
    </span>
  );
}

const unitColumns: Column<GreekLine>[] = [
  {
    id: 'sensitivity',
    header: priceText.sensitivity,
    cell: ({ label, per }) => (
      <Text>
        {label}{' '}
        <Text size="small" tone="muted">
          {per}
        </Text>
      </Text>
    ),
  },
  {
    id: 'unit',
    header: priceText.unit,
    align: 'end',
    cell: ({ perUnit }) => <Aligned {...perUnit} />,
  },
];

const positionColumn = (currency: string): Column<GreekLine> => ({
  id: 'position',
  header: priceText.position(currency),
  align: 'end',
  cell: ({ positionText }) => positionText,
});

const styles = StyleSheet.create({
  section: { flexGrow: 1, paddingBottom: space.xs },
  table: { marginHorizontal: -space.lg },
});
