import { useTable } from '@tanstack/react-table';
import { useMemo } from 'react';
import { followRow, moveBetweenRows } from '@/components/ui/data-table';
import { Link } from '@/components/ui/link';
import { valuesText } from '@/constants/texts/runs';
import type { RunValuation } from '@/shared/contracts/runs';
import { numericColumns, valueColumns, valueFeatures } from './value-columns';

export type ValueTableProps = {
  deskId: string;
  valuations: RunValuation[];
  hidden: readonly string[];
};

function useValueTable({ deskId, valuations, hidden }: ValueTableProps) {
  const columns = useMemo(() => valueColumns(deskId), [deskId]);
  return useTable({
    features: valueFeatures,
    columns,
    data: valuations,
    getRowId: ({ position }) => String(position),
    state: { columnVisibility: Object.fromEntries(hidden.map((id) => [id, false])) },
  });
}

type Table = ReturnType<typeof useValueTable>;
type Row = ReturnType<Table['getRowModel']>['rows'][number];

const alignOf = (id: string) => (numericColumns.includes(id) ? 'end' : undefined);

/** The values of a run on a wide window, in the server's order: exceptions first. */
export function ValueTable(props: ValueTableProps) {
  const table = useValueTable(props);
  return (
    <div className="table-frame table-sticky">
      <table className="table">
        <caption className="visually-hidden">{valuesText.caption}</caption>
        <thead>
          {table.getHeaderGroups().map((group) => (
            <tr key={group.id}>
              {group.headers.map((heading) => (
                <th key={heading.id} scope="col" data-align={alignOf(heading.column.id)}>
                  <table.FlexRender header={heading} />
                </th>
              ))}
            </tr>
          ))}
        </thead>
        <tbody onKeyDown={moveBetweenRows}>
          {table.getRowModel().rows.map((row) => (
            <BodyRow key={row.id} table={table} row={row} deskId={props.deskId} />
          ))}
        </tbody>
      </table>
    </div>
  );
}

function BodyRow({ table, row, deskId }: { table: Table; row: Row; deskId: string }) {
  const [first, ...others] = row.getVisibleCells();
  return (
    <tr data-link onClick={followRow}>
      <th scope="row">
        <Link href={`/desks/${deskId}/trades/${row.original.trade.id}`} className="table-row-link">
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
