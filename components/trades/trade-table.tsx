import { useTable, type Updater, type ColumnSort } from '@tanstack/react-table';
import { Icon } from '@/components/ui/icon';
import { Link } from '@/components/ui/link';
import { followRow, moveBetweenRows } from '@/components/ui/data-table';
import {
  tradeSorts,
  type SortDirection,
  type TradeSort,
  type TradeSummary,
} from '@/shared/contracts/trades';
import { numericColumns, tradeColumns, tradeFeatures } from './trade-columns';

export type TradeOrder = { sort: TradeSort; direction: SortDirection };

export type TradeTableProps = {
  caption: string;
  trades: TradeSummary[];
  order: TradeOrder;
  onOrder: (order: TradeOrder) => void;
  hidden: readonly string[];
  hrefOf: (trade: TradeSummary) => string;
};

const sortingOf = ({ sort, direction }: TradeOrder): ColumnSort[] => [
  { id: sort, desc: direction === 'descending' },
];

/** Names go from A to Z at first, everything else begins with the largest or the newest. */
const firstDirection = (sort: TradeSort): SortDirection =>
  sort === 'underlying' || sort === 'expiry' ? 'ascending' : 'descending';

const isTradeSort = (id: string): id is TradeSort => tradeSorts.some((sort) => sort === id);

function orderOf([first]: readonly ColumnSort[], before: TradeOrder): TradeOrder {
  if (!first || !isTradeSort(first.id)) return before;
  if (first.id !== before.sort) return { sort: first.id, direction: firstDirection(first.id) };
  return { sort: first.id, direction: first.desc ? 'descending' : 'ascending' };
}

function useTradeTable({ trades, order, onOrder, hidden }: TradeTableProps) {
  const sorting = sortingOf(order);
  return useTable({
    features: tradeFeatures,
    columns: tradeColumns,
    data: trades,
    getRowId: ({ id }) => id,
    manualSorting: true,
    enableSortingRemoval: false,
    enableMultiSort: false,
    state: {
      sorting,
      columnVisibility: Object.fromEntries(hidden.map((id) => [id, false])),
    },
    onSortingChange: (update: Updater<ColumnSort[]>) =>
      onOrder(orderOf(typeof update === 'function' ? update(sorting) : update, order)),
  });
}

const ariaSort = (sorted: false | 'asc' | 'desc') =>
  sorted === false ? undefined : sorted === 'asc' ? 'ascending' : 'descending';

type Table = ReturnType<typeof useTradeTable>;
type Heading = ReturnType<Table['getHeaderGroups']>[number]['headers'][number];
type Row = ReturnType<Table['getRowModel']>['rows'][number];

const alignOf = (id: string) => (numericColumns.includes(id) ? 'end' : undefined);

/** A book on a wide window: a real table, whose headings ask the server for another order. */
export function TradeTable(props: TradeTableProps) {
  const table = useTradeTable(props);
  return (
    <div className="table-frame table-sticky">
      <table className="table">
        <caption className="visually-hidden">{props.caption}</caption>
        <thead>
          {table.getHeaderGroups().map((group) => (
            <tr key={group.id}>
              {group.headers.map((heading) => (
                <HeadingCell key={heading.id} table={table} heading={heading} />
              ))}
            </tr>
          ))}
        </thead>
        <tbody onKeyDown={moveBetweenRows}>
          {table.getRowModel().rows.map((row) => (
            <BodyRow key={row.id} table={table} row={row} href={props.hrefOf(row.original)} />
          ))}
        </tbody>
      </table>
    </div>
  );
}

function HeadingCell({ table, heading }: { table: Table; heading: Heading }) {
  const { column } = heading;
  const sorted = column.getIsSorted();
  const name = <table.FlexRender header={heading} />;
  return (
    <th scope="col" data-align={alignOf(column.id)} aria-sort={ariaSort(sorted)}>
      {column.getCanSort() ? (
        <button
          type="button"
          className="table-sort"
          data-sorted={sorted}
          onClick={() => column.toggleSorting()}
        >
          {name}
          <Icon name="chevron" size={16} />
        </button>
      ) : (
        name
      )}
    </th>
  );
}

function BodyRow({ table, row, href }: { table: Table; row: Row; href: string }) {
  const [first, ...others] = row.getVisibleCells();
  return (
    <tr data-link onClick={followRow}>
      <th scope="row">
        <Link href={href} className="table-row-link">
          <table.FlexRender cell={first} />
        </Link>
      </th>
      {others.map((cell) => (
        <td key={cell.id} data-align={alignOf(cell.column.id)}>
          <table.FlexRender cell={cell} />
        </td>
      ))}
    </tr>
  );
}
