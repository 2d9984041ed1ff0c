import type { KeyboardEvent, MouseEvent, ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { space } from '@/constants/theme';
import { Link } from './link';
import { useWide } from './use-wide';

export type Column<Row> = {
  id: string;
  header: string;
  cell: (row: Row) => ReactNode;
  /** `end`: numbers, which align on the decimal point by figures of one width. */
  align?: 'start' | 'end';
  /** Short words that stay on one line, such as names. */
  nowrap?: boolean;
};

export type DataTableProps<Row> = {
  /** What the table is, for those who hear it. */
  caption: string;
  columns: readonly Column<Row>[];
  rows: readonly Row[];
  rowId: (row: Row) => string;
  /** Keeps the heading row in sight while a wide window scrolls. */
  sticky?: boolean;
  /** The page of a row: its first cell becomes the link, and the whole row opens it. */
  rowHref?: (row: Row) => string;
  /** Without a frame of its own, for a table that stands in a section. */
  plain?: boolean;
  /** What a narrow window shows instead of a row; without it the table scrolls sideways. */
  card?: (row: Row) => ReactNode;
};

/** Up and down move between the rows' links, home and end jump. */
export function moveBetweenRows(event: KeyboardEvent<HTMLTableSectionElement>) {
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
export function followRow(event: MouseEvent<HTMLTableRowElement>) {
  if (event.target instanceof Element && event.target.closest('a, button, input, select')) return;
  if (window.getSelection()?.isCollapsed === false) return;
  event.currentTarget.querySelector<HTMLElement>('.table-row-link')?.click();
}

const tableClass = (plain: boolean, sticky: boolean) =>
  `${plain ? 'table-plain' : 'table-frame'} ${sticky ? 'table-sticky' : 'table-scroll'}`;

export function DataTable<Row>(props: DataTableProps<Row>) {
  const { caption, columns, rows, rowId, rowHref, card, sticky = false, plain = false } = props;
  const wide = useWide();
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
  return (
    // A table may be wider than a phone: its frame can then be scrolled by keys as well.
    <div
      className={tableClass(plain, sticky && wide)}
      role="group"
      aria-label={caption}
      tabIndex={wide ? undefined : 0}
    >
      <table className="table">
        <caption className="visually-hidden">{caption}</caption>
        <thead>
          <tr>
            {columns.map(({ id, header, align }) => (
              <th key={id} scope="col" data-align={align}>
                {header}
              </th>
            ))}
          </tr>
        </thead>
        <tbody onKeyDown={moveBetweenRows}>
          {rows.map((row) => (
            <BodyRow key={rowId(row)} row={row} columns={columns} href={rowHref?.(row)} />
          ))}
        </tbody>
      </table>
    </div>
  );
}

type BodyRowProps<Row> = { row: Row; columns: readonly Column<Row>[]; href: string | undefined };

/** The first cell names its row, and carries the row's link. */
function BodyRow<Row>({ row, columns, href }: BodyRowProps<Row>) {
  const [first, ...others] = columns;
  return (
    <tr data-link={href !== undefined} onClick={href === undefined ? undefined : followRow}>
      <th scope="row" data-align={first.align} data-nowrap={first.nowrap}>
        {href === undefined ? (
          first.cell(row)
        ) : (
          <Link href={href} className="table-row-link">
            {first.cell(row)}
          </Link>
        )}
      </th>
      {others.map(({ id, align, nowrap, cell }) => (
        <td key={id} data-align={align} data-nowrap={nowrap}>
          {cell(row)}
        </td>
      ))}
    </tr>
  );
}

const styles = StyleSheet.create({ cards: { gap: space.sm } });
