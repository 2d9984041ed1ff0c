import { lazy, Suspense } from 'react';
import { StyleSheet, View } from 'react-native';
import { ListFoot } from '@/components/tables/list-foot';
import { Button } from '@/components/ui/button';
import { EmptyState, ErrorState, SkeletonRows } from '@/components/ui/states';
import { useWide } from '@/components/ui/use-wide';
import { booksText } from '@/constants/texts/books';
import { space } from '@/constants/theme';
import type { DeskAccess } from '@/shared/contracts/sessions';
import type { TradeSort, TradeSummary } from '@/shared/contracts/trades';
import { errorOf } from '@/hooks/error-of';
import { useHiddenColumns } from '@/hooks/use-hidden-columns';
import { useTrades, type TradeFilter } from '@/hooks/use-trades';
import { ColumnChoice } from './column-choice';
import { TradeCard } from './trade-card';
import { TradeFilters } from './trade-filters';

/** Loaded only where there is room for it: a phone shows cards. */
const TradeTable = lazy(async () => ({
  default: (await import('@/components/tables/wide-tables')).TradeTable,
}));

const optionalColumns = [
  ['underlying', booksText.terms],
  ['expiry', booksText.expiry],
  ['value', booksText.value],
  ['agreement', booksText.agreement],
  ['change', booksText.change],
  ['total', booksText.total],
] as const satisfies readonly (readonly [TradeSort | 'agreement', string])[];

export type TradeListProps = {
  desk: DeskAccess;
  userId: string;
  /** What the rows are of, for those who hear it. */
  caption: string;
  filter: TradeFilter;
  onFilter: (change: Partial<TradeFilter>) => void;
};

/** Filters, and the rows that fit them. */
export function TradeList(props: TradeListProps) {
  const wide = useWide();
  const columns = useHiddenColumns('trades', props.userId, props.desk.id);
  return (
    <>
      <TradeFilters deskId={props.desk.id} filter={props.filter} onFilter={props.onFilter} />
      <TradeRows {...props} hidden={columns.hidden} />
      {wide ? (
        <View style={styles.foot}>
          <ColumnChoice columns={optionalColumns} {...columns} />
        </View>
      ) : null}
    </>
  );
}

type TradeRowsProps = TradeListProps & { hidden: readonly string[] };

function TradeRows({ desk, caption, filter, onFilter, hidden }: TradeRowsProps) {
  const trades = useTrades(desk.id, filter);
  const wide = useWide();
  const { data: rows, error, isError } = trades;
  if (isError && !rows)
    return <ErrorState {...errorOf(error)} onRetry={() => void trades.refetch()} />;
  if (!rows) return <SkeletonRows rows={8} height={64} />;
  if (rows.length === 0) return <NoTrades desk={desk} filter={filter} onFilter={onFilter} />;
  return (
    <>
      {wide ? (
        <Suspense fallback={<SkeletonRows rows={8} height={64} />}>
          <TradeTable
            caption={caption}
            trades={rows}
            order={filter}
            onOrder={onFilter}
            hidden={hidden}
            hrefOf={({ id }) => `/desks/${desk.id}/trades/${id}`}
          />
        </Suspense>
      ) : (
        <Cards caption={caption} trades={rows} deskId={desk.id} />
      )}
      <ListFoot pages={trades} end={booksText.loadedAll(rows.length)} />
    </>
  );
}

type CardsProps = { caption: string; trades: readonly TradeSummary[]; deskId: string };

function Cards({ caption, trades, deskId }: CardsProps) {
  return (
    <View role="list" aria-label={caption} style={styles.cards}>
      {trades.map((trade) => (
        <View role="listitem" key={trade.id}>
          <TradeCard trade={trade} deskId={deskId} />
        </View>
      ))}
    </View>
  );
}

const noFilter = { search: '', status: null, verdict: null, underlyingId: null };

const isFiltered = (filter: TradeFilter) =>
  filter.search !== '' ||
  filter.status !== null ||
  filter.verdict !== null ||
  filter.underlyingId !== null;

function NoTrades({
  desk,
  filter,
  onFilter,
}: Pick<TradeListProps, 'desk' | 'filter' | 'onFilter'>) {
  if (isFiltered(filter))
    return (
      <EmptyState
        title={booksText.nothingFoundTitle}
        body={booksText.nothingFoundBody}
        action={
          <Button
            kind="secondary"
            label={booksText.clearFilters}
            onPress={() => onFilter(noFilter)}
          />
        }
      />
    );
  return (
    <EmptyState
      title={booksText.noTradesTitle}
      body={booksText.noTradesBody}
      action={<Button label={booksText.openQuotes} href={`/desks/${desk.id}/quotes`} />}
    />
  );
}

const styles = StyleSheet.create({
  cards: { gap: space.sm },
  foot: { alignItems: 'flex-end' },
});
