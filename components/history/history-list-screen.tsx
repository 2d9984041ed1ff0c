import { ListFoot } from '@/components/tables/list-foot';
import { Button } from '@/components/ui/button';
import { DataTable } from '@/components/ui/data-table';
import { Screen } from '@/components/ui/screen';
import { EmptyState, ErrorState, SkeletonRows } from '@/components/ui/states';
import { historyText } from '@/constants/texts/history';
import type { HistoryFilter } from '@/shared/contracts/history';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { errorOf } from '@/hooks/error-of';
import { useHistory } from '@/hooks/use-history';
import { ExportSection } from './export-section';
import { HistoryCard, historyColumns, valueHref } from './history-columns';
import { HistoryFilters } from './history-filters';
import { ValueLine } from './value-line';

export type HistoryListScreenProps = {
  desk: DeskAccess;
  filter: HistoryFilter;
  onFilter: (filter: HistoryFilter) => void;
};

export function HistoryListScreen({ desk, filter, onFilter }: HistoryListScreenProps) {
  const history = useHistory(desk.id, filter);
  const { data: rows } = history;
  const mayExport = desk.permissions.includes('export-history');
  const bookCode = rows?.find(({ body }) => body.bookId === filter.bookId)?.body.bookCode;
  return (
    <Screen
      title={historyText.title}
      subtitle={historyText.subtitle}
      measure={1400}
      actions={
        mayExport ? (
          <Button
            kind="secondary"
            icon="chain"
            label={historyText.checkChain}
            href={`/desks/${desk.id}/chain`}
          />
        ) : undefined
      }
    >
      <HistoryFilters
        deskId={desk.id}
        filter={filter}
        onFilter={onFilter}
        bookCode={bookCode ?? null}
      />
      {filter.trade !== undefined && rows && rows.length > 1 ? (
        <ValueLine rows={rows} desk={desk} />
      ) : null}
      {mayExport && rows && rows.length > 0 ? (
        <ExportSection key={JSON.stringify(filter)} deskId={desk.id} filter={filter} />
      ) : null}
      <HistoryRows desk={desk} filter={filter} onFilter={onFilter} history={history} />
    </Screen>
  );
}

type HistoryRowsProps = HistoryListScreenProps & { history: ReturnType<typeof useHistory> };

function HistoryRows({ desk, filter, onFilter, history }: HistoryRowsProps) {
  const { data: rows, error, isError } = history;
  if (isError && !rows)
    return <ErrorState {...errorOf(error)} onRetry={() => void history.refetch()} />;
  if (!rows) return <SkeletonRows rows={8} height={48} />;
  if (rows.length === 0) return <NoValues filter={filter} onFilter={onFilter} />;
  return (
    <>
      <DataTable
        sticky
        caption={historyText.caption}
        columns={historyColumns(desk)}
        rows={rows}
        rowId={({ position }) => String(position)}
        rowHref={({ position }) => valueHref(desk, position)}
        card={(row) => <HistoryCard row={row} desk={desk} />}
      />
      <ListFoot pages={history} />
    </>
  );
}

function NoValues({ filter, onFilter }: Pick<HistoryListScreenProps, 'filter' | 'onFilter'>) {
  if (Object.values(filter).every((value) => value === undefined))
    return <EmptyState title={historyText.emptyTitle} body={historyText.emptyBody} />;
  return (
    <EmptyState
      title={historyText.nothingFoundTitle}
      body={historyText.nothingFoundBody}
      action={<Button kind="secondary" label={historyText.clear} onPress={() => onFilter({})} />}
    />
  );
}
