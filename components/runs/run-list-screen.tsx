import { StyleSheet, View } from 'react-native';
import { ListFoot } from '@/components/tables/list-foot';
import { Button } from '@/components/ui/button';
import { DataTable } from '@/components/ui/data-table';
import { Screen } from '@/components/ui/screen';
import { SelectField } from '@/components/ui/select-field';
import { EmptyState, ErrorState, SkeletonRows } from '@/components/ui/states';
import { runsText } from '@/constants/texts/runs';
import { space } from '@/constants/theme';
import { runStatuses } from '@/shared/contracts/runs';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { errorOf } from '@/hooks/error-of';
import { useBooks } from '@/hooks/use-books';
import { useRuns, type RunFilter } from '@/hooks/use-runs';
import { RunCard, runColumns } from './run-rows';

export type RunListScreenProps = {
  desk: DeskAccess;
  filter: RunFilter;
  onFilter: (filter: RunFilter) => void;
};

const any = 'any';

export function RunListScreen({ desk, filter, onFilter }: RunListScreenProps) {
  return (
    <Screen
      title={runsText.title}
      subtitle={runsText.subtitle}
      measure={1400}
      actions={<StartButton desk={desk} />}
    >
      <Filters desk={desk} filter={filter} onFilter={onFilter} />
      <RunRows desk={desk} filter={filter} onFilter={onFilter} />
    </Screen>
  );
}

function StartButton({ desk }: { desk: DeskAccess }) {
  if (!desk.permissions.includes('start-runs')) return null;
  return <Button label={runsText.start} href={`/desks/${desk.id}/runs/new`} />;
}

function Filters({ desk, filter, onFilter }: RunListScreenProps) {
  const { data: books = [] } = useBooks(desk.id);
  return (
    <View style={styles.filters}>
      <View style={styles.field}>
        <SelectField
          label={runsText.state}
          value={filter.status ?? any}
          options={[
            { value: any, label: runsText.anyState },
            ...runStatuses.map((value) => ({ value, label: runsText.statuses[value] })),
          ]}
          onChange={(status) => onFilter({ ...filter, status: status === any ? null : status })}
        />
      </View>
      <View style={styles.field}>
        <SelectField
          label={runsText.book}
          value={filter.bookId ?? any}
          options={[
            { value: any, label: runsText.anyBook },
            ...books.map(({ id, code }) => ({ value: id, label: code })),
          ]}
          onChange={(id) => onFilter({ ...filter, bookId: id === any ? null : id })}
        />
      </View>
    </View>
  );
}

const noFilter: RunFilter = { status: null, bookId: null };

function NoRuns({ desk, filter, onFilter }: RunListScreenProps) {
  if (filter.status === null && filter.bookId === null)
    return (
      <EmptyState
        title={runsText.emptyTitle}
        body={runsText.emptyBody}
        action={<StartButton desk={desk} />}
      />
    );
  return (
    <EmptyState
      title={runsText.nothingTitle}
      body={runsText.nothingBody}
      action={
        <Button kind="secondary" label={runsText.showAll} onPress={() => onFilter(noFilter)} />
      }
    />
  );
}

function RunRows(props: RunListScreenProps) {
  const { desk, filter } = props;
  const runs = useRuns(desk.id, filter);
  const { data: rows, error, isError } = runs;
  if (isError && !rows)
    return <ErrorState {...errorOf(error)} onRetry={() => void runs.refetch()} />;
  if (!rows) return <SkeletonRows rows={6} height={56} />;
  if (rows.length === 0) return <NoRuns {...props} />;
  return (
    <>
      <DataTable
        sticky
        caption={runsText.caption}
        columns={runColumns(desk)}
        rows={rows}
        rowId={({ id }) => id}
        rowHref={({ id }) => `/desks/${desk.id}/runs/${id}`}
        card={(run) => <RunCard run={run} desk={desk} />}
      />
      <ListFoot pages={runs} />
    </>
  );
}

const styles = StyleSheet.create({
  filters: { flexDirection: 'row', flexWrap: 'wrap', gap: space.sm },
  field: { flexGrow: 1, flexShrink: 1, flexBasis: 140, maxWidth: 260 },
});
