import { StyleSheet, View } from 'react-native';
import { agreementText } from '@/constants/texts/agreement';
import { space } from '@/constants/theme';
import { DataTable, type Column } from '@/components/ui/data-table';
import { Dialog } from '@/components/ui/dialog';
import { Text } from '@/components/ui/text';
import { VerdictMark } from './verdict-mark';
import { formatDifference, formatErrorEstimate, formatNumber } from '@/shared/format/numbers';
import { findingOf, type Agreement, type StripRoute } from './agreement-finding';
import { RouteDot } from './route-dot';

const columnsOf = ({ routes, decimals, currency }: Agreement): Column<StripRoute>[] => [
  {
    id: 'route',
    header: agreementText.route,
    cell: ({ name, label }) => (
      <View style={styles.route}>
        <svg width={12} height={12} aria-hidden>
          <RouteDot name={name} x={6} y={6} r={4} />
        </svg>
        <Text>{label}</Text>
      </View>
    ),
  },
  {
    id: 'value',
    header: agreementText.value(currency),
    align: 'end',
    cell: ({ value }) => formatNumber(value, decimals),
  },
  {
    id: 'error',
    header: agreementText.error,
    align: 'end',
    cell: ({ errorEstimate }) => formatErrorEstimate(errorEstimate),
  },
  {
    id: 'apart',
    header: agreementText.apart,
    align: 'end',
    cell: (route) =>
      route === routes[0]
        ? agreementText.reference
        : formatDifference(route.value - routes[0].value, decimals),
  },
];

/** The figures behind a strip, with the verdict's sentence and what it does not say. */
export function AgreementFigures({
  agreement,
  onClose,
}: {
  agreement: Agreement;
  onClose: () => void;
}) {
  return (
    <Dialog open title={agreementText.dialogTitle} size="wide" onClose={onClose}>
      <View style={styles.finding}>
        <VerdictMark verdict={agreement.verdict} long />
        <Text>{findingOf(agreement)}</Text>
      </View>
      <DataTable
        plain
        caption={agreementText.table}
        columns={columnsOf(agreement)}
        rows={agreement.routes}
        rowId={({ name }) => name}
      />
      <Text size="small" tone="muted">
        {agreementText.caution}
      </Text>
    </Dialog>
  );
}

const styles = StyleSheet.create({
  finding: { gap: space.xs },
  route: { flexDirection: 'row', alignItems: 'center', gap: space.sm },
});
