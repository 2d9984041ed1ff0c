import { StyleSheet, View } from 'react-native';
import { errorText } from '@/components/charts/error-text';
import { DataTable, type Column } from '@/components/ui/data-table';
import { Text } from '@/components/ui/text';
import { routeLabel } from '@/constants/texts/price';
import { studiesText } from '@/constants/texts/studies';
import type { Study, StudyRoute, StudyRowOnTheWire } from '@/shared/contracts/studies';
import { formatNumber } from '@/shared/format/numbers';
import { SettledValue } from './settled-value';
import { decimalsOf, sizeText, timeText, valueText } from './study-figures';

const { columns: words } = studiesText;
const none = '–';

/** One series of a method, row by row as computed. */
export function StudyTable({
  study,
  route,
  series,
}: {
  study: Study;
  route: StudyRoute;
  series: StudyRowOnTheWire['series'];
}) {
  const rows = route.rows.filter((row) => row.series === series);
  return (
    <DataTable
      plain
      caption={studiesText.seriesOf(routeLabel(route.name), studiesText.series[series])}
      columns={columnsOf(study, rows)}
      rows={rows}
      rowId={({ ordinal }) => String(ordinal)}
    />
  );
}

function columnsOf(study: Study, rows: readonly StudyRowOnTheWire[]): Column<StudyRowOnTheWire>[] {
  const { currency, unit } = study.underlying;
  const decimals = decimalsOf(study);
  const isGrid = rows.some(({ settings }) => settings.timeSteps !== undefined);
  const showsLimit = rows.some(({ pastLimit }) => pastLimit);
  const reference = study.reference.value;
  return [
    {
      id: 'size',
      header: isGrid ? words.grid : words.steps,
      nowrap: true,
      cell: (row) => <Text tabular>{sizeText(row)}</Text>,
    },
    {
      id: 'value',
      header: words.value(currency, unit),
      align: 'end',
      nowrap: true,
      cell: (row) => <Value row={row} decimals={decimals} reference={reference} />,
    },
    {
      id: 'error',
      header: words.error,
      align: 'end',
      nowrap: true,
      cell: ({ error, belowReference }) => (
        <span title={belowReference ? studiesText.belowReference : undefined}>
          {error === null ? none : `${errorText(error)}${belowReference ? '*' : ''}`}
        </span>
      ),
    },
    {
      id: 'ratio',
      header: words.ratio,
      align: 'end',
      cell: ({ ratio }) => (ratio === null ? none : formatNumber(ratio, 2)),
    },
    {
      id: 'order',
      header: words.order,
      align: 'end',
      cell: ({ order }) => (order === null ? none : formatNumber(order, 2)),
    },
    {
      id: 'richardson',
      header: words.richardson,
      align: 'end',
      nowrap: true,
      cell: ({ richardson }) =>
        richardson === null ? none : valueText(richardson, decimals, reference),
    },
    ...(showsLimit ? [stabilityColumn] : []),
    {
      id: 'time',
      header: words.time,
      align: 'end',
      nowrap: true,
      cell: ({ milliseconds }) => timeText(milliseconds),
    },
  ];
}

const stabilityColumn: Column<StudyRowOnTheWire> = {
  id: 'stability',
  header: words.stability,
  align: 'end',
  cell: ({ stability }) => (stability === null ? none : formatNumber(stability, 2)),
};

function Value({
  row,
  decimals,
  reference,
}: {
  row: StudyRowOnTheWire;
  decimals: number;
  reference: number;
}) {
  const { value, pastLimit, amplification, settledDigits } = row;
  if (value === null) return <Text tone="brick">{studiesText.noValue}</Text>;
  const text = valueText(value, decimals, reference);
  if (!pastLimit) return <SettledValue text={text} digits={settledDigits} />;
  return (
    <View style={styles.end}>
      <Text tabular tone="brick">
        {text}
      </Text>
      {amplification === null ? null : (
        <Text size="small" tone="brick">
          {studiesText.unstable(formatNumber(amplification, 2))}
        </Text>
      )}
    </View>
  );
}

const styles = StyleSheet.create({ end: { alignItems: 'flex-end' } });
