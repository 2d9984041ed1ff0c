import { tableFeatures, useTable, type ColumnDef } from '@tanstack/react-table';
import { useMemo, type KeyboardEvent, type MouseEvent, type ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { space } from '@/constants/theme';
import { Link } from './link';
import { useWide } from './use-wide';

const features = tableFeatures({});

export type Column<Row> = {
  id: string;
  header: string;
  cell: (row: Row) => ReactNode;
  /** `end`: numbers, which align on the decimal point by figures of one width. */
  align?: 'start' | 'end';
};

export type DataTableProps<Row> = {
  /** What the table is, for those who hear it. */
  caption: string;
  columns: readonly Column<Row>[];
  rows: readonly Row[];
  rowId: (row: Row) => string;
  /** Keeps the heading row in sight while the page scrolls; not with a table wider than the page. */
  sticky?: boolean;
  /** The page of a row: its first cell becomes the link, and the whole row opens it. */
  rowHref?: (row: Row) => string;
  /** Without a frame of its own, for a table that stands in a section. */
  plain?: boolean;
  /** What a narrow window shows instead of a row; without it the table scrolls sideways. */
  card?: (row: Row) => ReactNode;
};

const definitionsOf = <Row extends object>(
  columns: readonly Column<Row>[],
): ColumnDef<typeof features, Row>[] =>
  columns.map(({ id, header, cell }) => ({
    id,
    header,
    cell: ({ row }) => cell(row.original),
  }));

/** Up and down move between the rows' links, home and end jump. */
function moveBetweenRows(event: KeyboardEvent<HTMLTableSectionElement>) {
  const links = Array.from(event.currentTarget.querySelectorAll<HTMLElement>('.table-row-link'));
  const at = links.findIndex((link) => link === document.activeElement);
  if (at < 0) return;
  const targets: Record<string, number> = {
    ArrowDown: at + 1,
    ArrowUp: at - 1,
    Home: 0,
    End: links.length - 1,
  };
  const target = links[targets[event.key] ?? -1];
  if (!target) return;
  event.preventDefault();
  target.focus();
}

/** A click anywhere in a row follows its link, unless it met a control or selected some text. */
function followRow(event: MouseEvent<HTMLTableRowElement>) {
  if (event.target instanceof Element && event.target.closest('a, button, input, select')) return;
  if (window.getSelection()?.isCollapsed === false) return;
  event.currentTarget.querySelector<HTMLElement>('.table-row-link')?.click();
}

export function DataTable<Row extends object>(props: DataTableProps<Row>) {
  const { caption, columns, rows, rowId, rowHref, card, sticky = false, plain = false } = props;
  const wide = useWide();
  const data = useMemo(() => [...rows], [rows]);
  const definitions = useMemo(() => definitionsOf(columns), [columns]);
  const table = useTable({ features, data, columns: definitions, getRowId: rowId });
  if (!wide && card)
    return (
      <View role="list" aria-label={caption} style={styles.cards}>
        {rows.map((row) => (
          <View role="listitem" key={rowId(row)}>
            {card(row)}
          </View>
        ))}
      </View>
    );
  const alignOf = (id: string) => columns.find((column) => column.id === id)?.align;
  return (
    <div
      className={`${plain ? 'table-plain' : 'table-frame'} ${sticky ? 'table-sticky' : 'table-scroll'}`}
    >
      <table className="table">
        <caption className="visually-hidden">{caption}</caption>
        <thead>
          <tr>
            {table.getFlatHeaders().map((header) => (
              <th key={header.id} scope="col" data-align={alignOf(header.column.id)}>
                <table.FlexRender header={header} />
              </th>
            ))}
          </tr>
        </thead>
        <tbody onKeyDown={moveBetweenRows}>
          {table.getRowModel().rows.map((row) => {
            const href = rowHref?.(row.original);
            return (
              <tr
                key={row.id}
                data-link={href !== undefined}
                onClick={href === undefined ? undefined : followRow}
              >
                {row.getAllCells().map((cell, index) => (
                  <Cell
                    key={cell.id}
                    heads={index === 0}
                    align={alignOf(cell.column.id)}
                    href={index === 0 ? href : undefined}
                  >
                    <table.FlexRender cell={cell} />
                  </Cell>
                ))}
              </tr>
            );
          })}
        </tbody>
      </table>
    </div>
  );
}

type CellProps = { heads: boolean; align?: 'start' | 'end'; href?: string; children: ReactNode };

/** The first cell names its row, and carries the row's link. */
function Cell({ heads, align, href, children }: CellProps) {
  if (!heads) return <td data-align={align}>{children}</td>;
  return (
    <th scope="row" data-align={align}>
      {href === undefined ? (
        children
      ) : (
        <Link href={href} className="table-row-link">
          {children}
        </Link>
      )}
    </th>
  );
}

const styles = StyleSheet.create({ cards: { gap: space.sm } });
