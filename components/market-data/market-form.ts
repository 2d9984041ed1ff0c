/** What is typed into the grid of a close, and how it is read and pasted. */
import type { Market } from '@/pricing/contract';
import { marketEditorText } from '@/constants/texts/market-data';
import type { Issue } from '@/shared/errors';
import type { SnapshotDraft } from '@/shared/contracts/market-data';
import type { Underlying } from '@/shared/contracts/underlyings';
import { isCalendarDate } from '@/shared/dates';
import {
  cellsOfMarket,
  columnHeadings,
  emptyCells,
  marketColumns,
  readMarketRow,
  type MarketCells,
  type MarketColumn,
} from '@/shared/market-cells';
import type { QuotedMarket } from '@/shared/market-warnings';

/** `date`, `source`, and a text for each cell under its name. */
export type GridValues = Record<string, string>;
export type GridUnderlying = Pick<Underlying, 'id' | 'symbol' | 'name' | 'kind' | 'currency'>;

export const cellName = (underlyingId: string, column: MarketColumn) => `${underlyingId}_${column}`;

const cellValues = (underlyingId: string, cells: MarketCells): [string, string][] =>
  marketColumns.map((column) => [cellName(underlyingId, column), cells[column]]);

export const marketValues = (
  quotes: readonly { underlyingId: string; market: Market }[],
): GridValues =>
  Object.fromEntries(
    quotes.flatMap(({ underlyingId, market }) => cellValues(underlyingId, cellsOfMarket(market))),
  );

export const gridDefaults = (
  date: string,
  underlyings: readonly GridUnderlying[],
  quotes: readonly { underlyingId: string; market: Market }[],
): GridValues => ({
  date,
  source: 'typed',
  ...Object.fromEntries(underlyings.flatMap(({ id }) => cellValues(id, emptyCells))),
  ...marketValues(quotes),
});

const cellsAt = (values: GridValues, underlyingId: string): MarketCells => ({
  price: values[cellName(underlyingId, 'price')] ?? '',
  rate: values[cellName(underlyingId, 'rate')] ?? '',
  yield: values[cellName(underlyingId, 'yield')] ?? '',
  volatility: values[cellName(underlyingId, 'volatility')] ?? '',
});

const isEmpty = (cells: MarketCells) =>
  marketColumns.every((column) => cells[column].trim() === '');

export type ReadGrid = { quotes: QuotedMarket[]; errors: Record<string, string> };

/** Rows that nobody has touched are left out; a row that was begun is read whole. */
export function readGrid(values: GridValues, underlyings: readonly GridUnderlying[]): ReadGrid {
  const quotes: QuotedMarket[] = [];
  const errors: Record<string, string> = {};
  if (!isCalendarDate(values.date.trim())) errors.date = marketEditorText.badDate;
  for (const { id, symbol, kind } of underlyings) {
    const cells = cellsAt(values, id);
    if (isEmpty(cells)) continue;
    const read = readMarketRow(kind, cells);
    if (read.ok) quotes.push({ underlyingId: id, symbol, market: read.market });
    else
      for (const column of marketColumns) {
        const message = read.errors[column];
        if (message !== undefined) errors[cellName(id, column)] = message;
      }
  }
  return { quotes, errors };
}

const columnOfField: Record<string, MarketColumn> = {
  spot: 'price',
  rate: 'rate',
  yield: 'yield',
  volatility: 'volatility',
};

/** The cell that a complaint of the server is about; null where it is about none. */
export function fieldOfIssue({ path }: Issue, { quotes }: SnapshotDraft): string | null {
  if (path === 'date') return 'date';
  const [list, index, , field] = path.split('.');
  const quote = list === 'quotes' ? quotes[Number(index)] : undefined;
  if (!quote) return null;
  return cellName(quote.underlyingId, columnOfField[field] ?? 'price');
}

export type Pasted = { values: GridValues; rowCount: number; unknown: string[] };

const tableOf = (text: string): string[][] =>
  text
    .replace(/(\r?\n|\r)+$/, '')
    .split(/\r?\n|\r/)
    .map((line) => line.split('\t'));

const headingOf = (text: string) => text.trim().toLowerCase();

/** Which column each pasted cell after the symbol belongs to, from a heading row where there is one. */
function columnsOf(headings: readonly string[] | undefined): (MarketColumn | undefined)[] {
  if (!headings) return [...marketColumns];
  return headings
    .slice(1)
    .map((text) =>
      marketColumns.find((column) =>
        [column, columnHeadings[column]].some((name) => name === headingOf(text)),
      ),
    );
}

function pastedBySymbol(
  table: readonly string[][],
  symbols: ReadonlyMap<string, GridUnderlying>,
): Pasted {
  const hasHeadings = headingOf(table[0][0]) === columnHeadings.symbol;
  const columns = columnsOf(hasHeadings ? table[0] : undefined);
  const values: GridValues = {};
  const unknown: string[] = [];
  let rowCount = 0;
  for (const [symbol, ...cells] of hasHeadings ? table.slice(1) : table) {
    const underlying = symbols.get(headingOf(symbol));
    if (!underlying) {
      if (symbol.trim() !== '') unknown.push(symbol.trim());
      continue;
    }
    rowCount += 1;
    cells.forEach((cell, index) => {
      const column = columns[index];
      if (column) values[cellName(underlying.id, column)] = cell.trim();
    });
  }
  return { values, rowCount, unknown };
}

/** Cells go to the right and down from where they were pasted. */
function pastedAt(
  table: readonly string[][],
  underlyings: readonly GridUnderlying[],
  at: string,
): Pasted | null {
  const firstRow = underlyings.findIndex(({ id }) => at.startsWith(`${id}_`));
  const firstColumn = marketColumns.findIndex((column) => at.endsWith(`_${column}`));
  if (firstRow < 0 || firstColumn < 0) return null;
  const rows = table.slice(0, underlyings.length - firstRow);
  const values: GridValues = {};
  rows.forEach((cells, row) => {
    marketColumns.slice(firstColumn).forEach((column, index) => {
      if (cells[index] !== undefined)
        values[cellName(underlyings[firstRow + row].id, column)] = cells[index].trim();
    });
  });
  return { values, rowCount: rows.length, unknown: [] };
}

/** What a spreadsheet put on the clipboard; null for a single cell, which the browser pastes itself. */
export function readPasted(
  text: string,
  underlyings: readonly GridUnderlying[],
  at: string,
): Pasted | null {
  if (!/[\t\n\r]/.test(text.replace(/[\r\n]+$/, ''))) return null;
  const table = tableOf(text);
  const symbols = new Map(underlyings.map((row) => [headingOf(row.symbol), row]));
  const startsWithSymbol = ([first]: string[]) =>
    headingOf(first) === columnHeadings.symbol || symbols.has(headingOf(first));
  return table.some(startsWithSymbol)
    ? pastedBySymbol(table, symbols)
    : pastedAt(table, underlyings, at);
}

/** A file to begin with: every underlying of the desk, with the numbers that are in the grid. */
export function sampleFile(underlyings: readonly GridUnderlying[], values: GridValues): string {
  const headings = Object.values(columnHeadings).join(',');
  const rows = underlyings.map(({ id, symbol }) => {
    const cells = cellsAt(values, id);
    return [symbol, ...marketColumns.map((column) => cells[column])].join(',');
  });
  return [headings, ...rows, ''].join('\r\n');
}
