import { StyleSheet, View } from 'react-native';
import { AgreementStrip } from '@/components/charts/agreement-strip';
import { Card } from '@/components/ui/card';
import type { Column } from '@/components/ui/data-table';
import { Link } from '@/components/ui/link';
import { Text } from '@/components/ui/text';
import { historyText } from '@/constants/texts/history';
import { space } from '@/constants/theme';
import type { HistoryRow } from '@/shared/contracts/history';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { formatInstant } from '@/shared/format/dates';
import { formatErrorEstimate, formatNumber } from '@/shared/format/numbers';
import { agreementOfRow, decimalsOfValue, optionWords } from './history-words';

export const valueHref = (desk: DeskAccess, position: number): string =>
  `/desks/${desk.id}/history/${position}`;

const valueWords = (row: HistoryRow): string =>
  row.body.result.ok
    ? formatNumber(row.body.result.value, decimalsOfValue(row))
    : historyText.noValue;

const errorWords = ({ body: { result } }: HistoryRow): string =>
  result.ok ? formatErrorEstimate(result.errorEstimate) : '';

export const historyColumns = (desk: DeskAccess): Column<HistoryRow>[] => [
  {
    id: 'valued',
    header: historyText.valued,
    nowrap: true,
    cell: ({ body }) => formatInstant(body.valuedAt, desk.timeZone),
  },
  {
    id: 'trade',
    header: historyText.trade,
    nowrap: true,
    cell: ({ body }) => (
      <Link href={`/desks/${desk.id}/history?trade=${encodeURIComponent(body.tradeNumber)}`}>
        {body.tradeNumber}
      </Link>
    ),
  },
  { id: 'terms', header: historyText.terms, cell: (row) => <Terms row={row} desk={desk} /> },
  { id: 'value', header: historyText.value, align: 'end', cell: valueWords },
  { id: 'error', header: historyText.error, align: 'end', cell: errorWords },
  { id: 'agreement', header: historyText.agreement, cell: (row) => <Strip row={row} /> },
  {
    id: 'book',
    header: historyText.book,
    nowrap: true,
    cell: ({ body }) => (
      <Link href={`/desks/${desk.id}/history?book=${body.bookId}`}>{body.bookCode}</Link>
    ),
  },
  {
    id: 'run',
    header: historyText.run,
    nowrap: true,
    cell: ({ body }) => (
      <Link href={`/desks/${desk.id}/history?run=${encodeURIComponent(body.runNumber)}`}>
        {body.runNumber}
      </Link>
    ),
  },
];

function Terms({ row, desk }: { row: HistoryRow; desk: DeskAccess }) {
  return (
    <View>
      <Text>{row.underlying.name}</Text>
      <Text size="small" tone="muted" tabular>
        {optionWords(row, desk.timeZone)}
      </Text>
    </View>
  );
}

function Strip({ row }: { row: HistoryRow }) {
  const agreement = agreementOfRow(row);
  if (agreement) return <AgreementStrip {...agreement} size="row" />;
  const { result } = row.body;
  return (
    <Text size="small" tone="brick">
      {result.ok ? '' : result.message}
    </Text>
  );
}

/** A row of the history on a phone. */
export function HistoryCard({ row, desk }: { row: HistoryRow; desk: DeskAccess }) {
  const { body, underlying } = row;
  return (
    <Card style={styles.card}>
      <View style={styles.line}>
        <Link href={valueHref(desk, row.position)}>{body.tradeNumber}</Link>
        <Text size="small" tone="muted" tabular style={styles.end}>
          {formatInstant(body.valuedAt, desk.timeZone)} · {body.runNumber}
        </Text>
      </View>
      <Text>
        {underlying.name} {optionWords(row, desk.timeZone)}
      </Text>
      <View style={styles.line}>
        <Text tabular size="lead" weight="semibold">
          {valueWords(row)}
        </Text>
        <Text size="small" tone="muted">
          {underlying.currency}
        </Text>
        <Text tabular tone="muted" style={styles.end}>
          {body.result.ok ? `± ${errorWords(row)}` : ''}
        </Text>
      </View>
      <Strip row={row} />
    </Card>
  );
}

const styles = StyleSheet.create({
  card: { gap: 6, paddingVertical: space.md },
  line: { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'baseline', columnGap: space.sm },
  end: { marginLeft: 'auto' },
});
