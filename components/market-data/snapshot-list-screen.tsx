import { StyleSheet, View } from 'react-native';
import { ListFoot } from '@/components/tables/list-foot';
import { Badge, type BadgeProps } from '@/components/ui/badge';
import { Button } from '@/components/ui/button';
import { Card } from '@/components/ui/card';
import { DataTable, type Column } from '@/components/ui/data-table';
import { Link } from '@/components/ui/link';
import { Screen } from '@/components/ui/screen';
import { SelectField } from '@/components/ui/select-field';
import { EmptyState, ErrorState, SkeletonRows } from '@/components/ui/states';
import { Text } from '@/components/ui/text';
import { marketDataText } from '@/constants/texts/market-data';
import { space } from '@/constants/theme';
import {
  snapshotStatuses,
  type SnapshotStatus,
  type SnapshotSummary,
} from '@/shared/contracts/market-data';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { formatInstant } from '@/shared/format/dates';
import { errorOf } from '@/hooks/error-of';
import { useSnapshots } from '@/hooks/use-market-data';

export type SnapshotListScreenProps = {
  desk: DeskAccess;
  status: SnapshotStatus | null;
  onStatus: (status: SnapshotStatus | null) => void;
};

const anyState = 'any';

const tones: Record<SnapshotStatus, BadgeProps['tone']> = {
  draft: 'ochre',
  approved: 'moss',
  superseded: 'muted',
};

export function SnapshotState({ status }: { status: SnapshotStatus }) {
  return <Badge label={marketDataText.statuses[status]} tone={tones[status]} />;
}

export function SnapshotListScreen({ desk, status, onStatus }: SnapshotListScreenProps) {
  return (
    <Screen title={marketDataText.title} measure={1240} actions={<EnterButton desk={desk} />}>
      <View style={styles.filter}>
        <SelectField
          label={marketDataText.stateFilter}
          value={status ?? anyState}
          options={[
            { value: anyState, label: marketDataText.anyState },
            ...snapshotStatuses.map((one) => ({
              value: one,
              label: marketDataText.statuses[one],
            })),
          ]}
          onChange={(one) => onStatus(one === anyState ? null : one)}
        />
      </View>
      <SnapshotRows desk={desk} status={status} onStatus={onStatus} />
    </Screen>
  );
}

function EnterButton({ desk }: { desk: DeskAccess }) {
  if (!desk.permissions.includes('enter-market-data')) return null;
  return <Button label={marketDataText.enter} href={`/desks/${desk.id}/market-data/new`} />;
}

function SnapshotRows({ desk, status, onStatus }: SnapshotListScreenProps) {
  const snapshots = useSnapshots(desk.id, status);
  const { data: rows, error, isError } = snapshots;
  if (isError && !rows)
    return <ErrorState {...errorOf(error)} onRetry={() => void snapshots.refetch()} />;
  if (!rows) return <SkeletonRows rows={6} height={56} />;
  if (rows.length === 0)
    return status === null ? (
      <EmptyState
        title={marketDataText.emptyTitle}
        body={marketDataText.emptyBody}
        action={<EnterButton desk={desk} />}
      />
    ) : (
      <EmptyState
        title={marketDataText.nothingTitle}
        body={marketDataText.nothingBody}
        action={
          <Button kind="secondary" label={marketDataText.showAll} onPress={() => onStatus(null)} />
        }
      />
    );
  return (
    <>
      <DataTable
        sticky
        caption={marketDataText.caption}
        columns={columns(desk)}
        rows={rows}
        rowId={({ id }) => id}
        rowHref={({ id }) => `/desks/${desk.id}/market-data/${id}`}
        card={(row) => <SnapshotCard snapshot={row} desk={desk} />}
      />
      <ListFoot pages={snapshots} more={marketDataText.showMore} />
    </>
  );
}

const columns = (desk: DeskAccess): Column<SnapshotSummary>[] => [
  {
    id: 'date',
    header: marketDataText.columns.date,
    nowrap: true,
    cell: ({ date }) => <span className="unbroken">{date}</span>,
  },
  {
    id: 'state',
    header: marketDataText.columns.state,
    cell: ({ status }) => <SnapshotState status={status} />,
  },
  {
    id: 'source',
    header: marketDataText.columns.source,
    cell: ({ source }) => marketDataText.sources[source],
  },
  {
    id: 'count',
    header: marketDataText.columns.count,
    align: 'end',
    cell: ({ quoteCount }) => quoteCount,
  },
  {
    id: 'entered',
    header: marketDataText.columns.entered,
    cell: ({ enteredBy, enteredAt }) => (
      <Who name={enteredBy.name} at={formatInstant(enteredAt, desk.timeZone)} />
    ),
  },
  {
    id: 'approved',
    header: marketDataText.columns.approved,
    cell: ({ approvedBy, approvedAt }) =>
      approvedBy && approvedAt ? (
        <Who name={approvedBy.name} at={formatInstant(approvedAt, desk.timeZone)} />
      ) : null,
  },
];

function Who({ name, at }: { name: string; at: string }) {
  return (
    <View>
      <Text>{name}</Text>
      <Text size="small" tone="muted" tabular>
        {at}
      </Text>
    </View>
  );
}

/** A row of the list on a phone. */
function SnapshotCard({ snapshot, desk }: { snapshot: SnapshotSummary; desk: DeskAccess }) {
  const { id, date, status, source, quoteCount, enteredBy, approvedBy } = snapshot;
  const { enteredAt, approvedAt } = snapshot;
  return (
    <Card style={styles.card}>
      <View style={styles.line}>
        <Link href={`/desks/${desk.id}/market-data/${id}`}>{date}</Link>
        <SnapshotState status={status} />
      </View>
      <Text>{marketDataText.numbers(marketDataText.sources[source], quoteCount)}</Text>
      <Text size="small" tone="muted" tabular>
        {approvedBy && approvedAt
          ? marketDataText.approvedBy(approvedBy.name, formatInstant(approvedAt, desk.timeZone))
          : marketDataText.enteredBy(enteredBy.name, formatInstant(enteredAt, desk.timeZone))}
      </Text>
    </Card>
  );
}

const styles = StyleSheet.create({
  filter: { maxWidth: 260 },
  card: { gap: 4, paddingVertical: space.md },
  line: { flexDirection: 'row', alignItems: 'center', gap: space.sm },
});
