/**
 * Reads an uploaded file of closes and says everything that is wrong with it, by row and column.
 * Nothing is written: what was read goes back to the grid, where a person looks at it.
 */
import { CsvError, parse } from 'csv-parse/sync';
import type { Market } from '@/pricing/contract';
import type { MarketFileProblem, MarketFileReport } from '@/shared/contracts/market-data';
import { columnHeadings, marketColumns, readMarketRow } from '@/shared/market-cells';
import type { Desk } from '../models/desk';
import type { Underlying } from '../models/underlying';
import { textOfFile } from './csv-text';
import { listedUnderlyings } from './market-data';

/** More than a person reads; the count goes on. */
const listedProblems = 200;
const largestRowCount = 1_000;

type Problem = MarketFileProblem;
type KnownColumn = keyof typeof columnHeadings;

const knownColumns: readonly KnownColumn[] = ['symbol', ...marketColumns];

const problemOf = (row: number, column: string | null, code: string, message: string): Problem => ({
  row,
  column,
  code,
  message,
});

/** What separates the cells, told from the headings; a comma is the only right one. */
function separatorOf(text: string): ',' | ';' | '\t' {
  const [headings] = text.split(/\r?\n|\r/, 1);
  const count = (separator: string) => headings.split(separator).length - 1;
  if (count(';') > count(',')) return ';';
  return count('\t') > count(',') ? '\t' : ',';
}

const separatorProblems = {
  ',': [],
  ';': [
    problemOf(
      1,
      null,
      'semicolons',
      'The cells are separated by semicolons; save the sheet with commas.',
    ),
  ],
  '\t': [
    problemOf(
      1,
      null,
      'tabs',
      'The cells are separated by tabs; save the sheet as CSV, with commas.',
    ),
  ],
} as const;

type Rows = { rows: string[][]; problems: Problem[] };

function rowsOf(text: string): Rows {
  const delimiter = separatorOf(text);
  try {
    const rows: string[][] = parse(text, { delimiter, relax_column_count: true });
    return { rows, problems: [...separatorProblems[delimiter]] };
  } catch (error) {
    if (!(error instanceof CsvError)) throw error;
    // Those that were read before the one that has no end.
    const row = Number(error.records) + 1;
    const message =
      'A quotation mark is opened or closed in the wrong place; the rest cannot be read.';
    return { rows: [], problems: [problemOf(row, null, 'quotation-mark', message)] };
  }
}

type Headings = { places: Partial<Record<KnownColumn, number>>; problems: Problem[] };

function readHeadings(cells: readonly string[]): Headings {
  const places: Partial<Record<KnownColumn, number>> = {};
  const problems: Problem[] = [];
  cells.forEach((cell, place) => {
    const text = cell.trim().toLowerCase();
    const known = knownColumns.find((column) => columnHeadings[column] === text);
    const name = text === '' ? `column ${place + 1}` : text;
    if (!known) {
      const message = `There is no column “${name}” here; remove it, or name it as in the sample file.`;
      problems.push(problemOf(1, name, 'unknown-column', message));
    } else if (places[known] === undefined) places[known] = place;
    else {
      const message = `The heading “${name}” stands here twice; remove one of the columns.`;
      problems.push(problemOf(1, name, 'duplicate-heading', message));
    }
  });
  for (const column of knownColumns)
    if (places[column] === undefined) {
      const heading = columnHeadings[column];
      const message = `The column “${heading}” is missing; add it.`;
      problems.push(problemOf(1, heading, 'missing-column', message));
    }
  return { places, problems };
}

/** A spreadsheet would compute it; a minus before a digit is a number. */
const formula = /^\s*(=|@|[+-](?![\d.]))/;
const decimalComma = /^\s*[+-]?\d+,\d+\s*%?\s*$/;

function cellProblem(row: number, heading: string, cell: string): Problem | null {
  if (formula.test(cell)) {
    const message = 'This is a formula; put its value into the cell.';
    return problemOf(row, heading, 'formula', message);
  }
  if (heading !== columnHeadings.symbol && decimalComma.test(cell)) {
    const message = `“${cell.trim()}” has a decimal comma; write ${cell.trim().replace(',', '.')}.`;
    return problemOf(row, heading, 'decimal-comma', message);
  }
  return null;
}

type ReadClose = { underlyingId: string; market: Market };

/** Reads row by row, and remembers which symbols have come. */
function rowReader(headings: readonly string[], underlyings: readonly Underlying[]) {
  const { places } = readHeadings(headings);
  const bySymbol = new Map(underlyings.map((row) => [row.symbol.toLowerCase(), row]));
  const rowOfSymbol = new Map<string, number>();

  const cellOf = (cells: readonly string[], column: KnownColumn) => {
    const place = places[column];
    return place === undefined ? '' : (cells[place] ?? '');
  };

  function readSymbol(row: number, typed: string): Underlying | Problem {
    const heading = columnHeadings.symbol;
    const symbol = typed.trim();
    if (symbol === '')
      return problemOf(row, heading, 'missing', 'Fill in the symbol of the underlying.');
    const underlying = bySymbol.get(symbol.toLowerCase());
    if (!underlying) {
      const message = `This desk has no underlying “${symbol}”.`;
      return problemOf(row, heading, 'unknown-symbol', message);
    }
    const before = rowOfSymbol.get(underlying.id);
    if (before !== undefined) {
      const message = `“${symbol}” stands in row ${before} already; remove one of the rows.`;
      return problemOf(row, heading, 'duplicate-symbol', message);
    }
    rowOfSymbol.set(underlying.id, row);
    return underlying;
  }

  function readNumbers(row: number, cells: readonly string[], kind: Underlying['kind']) {
    const texts = {
      price: cellOf(cells, 'price'),
      rate: cellOf(cells, 'rate'),
      yield: cellOf(cells, 'yield'),
      volatility: cellOf(cells, 'volatility'),
    };
    const read = readMarketRow(kind, texts);
    const problems = marketColumns.flatMap((column): Problem[] => {
      if (places[column] === undefined) return [];
      const heading = columnHeadings[column];
      const wrong = cellProblem(row, heading, texts[column]);
      if (wrong) return [wrong];
      const message = read.ok ? undefined : read.errors[column];
      return message === undefined ? [] : [problemOf(row, heading, 'not-accepted', message)];
    });
    return { market: read.ok ? read.market : null, problems };
  }

  return (
    row: number,
    cells: readonly string[],
  ): { close: ReadClose | null; problems: Problem[] } => {
    if (cells.length > headings.length) {
      const message = `This row has ${cells.length} cells under ${headings.length} headings; a decimal comma may have split a number.`;
      return { close: null, problems: [problemOf(row, null, 'too-many-cells', message)] };
    }
    const typed = cellOf(cells, 'symbol');
    const wrong = cellProblem(row, columnHeadings.symbol, typed);
    const found = wrong ?? readSymbol(row, typed);
    const isKnown = !('code' in found);
    // Numbers of an unknown underlying are read as a share's, but for the yield, which may be empty.
    const { market, problems } = readNumbers(row, cells, isKnown ? found.kind : 'share');
    if (!isKnown)
      return {
        close: null,
        problems: [found, ...problems.filter(({ column }) => column !== columnHeadings.yield)],
      };
    return { close: market && { underlyingId: found.id, market }, problems };
  };
}

const isBlank = (cells: readonly string[]) => cells.every((cell) => cell.trim() === '');

function reportOf(
  problems: readonly Problem[],
  rest: Omit<MarketFileReport, 'problems' | 'problemCount'>,
): MarketFileReport {
  const inOrder = [...problems].sort((a, b) => a.row - b.row);
  return {
    ...rest,
    problems: inOrder.slice(0, listedProblems),
    problemCount: inOrder.length,
    quotes: inOrder.length === 0 ? rest.quotes : [],
  };
}

const unread = { rowCount: 0, quotes: [], missing: [] };

function readRows(
  { rows: [headings = [], ...rows], problems: before }: Rows,
  underlyings: readonly Underlying[],
): MarketFileReport {
  const read = rowReader(headings, underlyings);
  const problems = [...before, ...readHeadings(headings).problems];
  const quotes: ReadClose[] = [];
  let rowCount = 0;
  rows.slice(0, largestRowCount + 1).forEach((cells, index) => {
    if (isBlank(cells)) return;
    rowCount += 1;
    // Row 1 of the file are its headings.
    const found = read(index + 2, cells);
    problems.push(...found.problems);
    if (found.close) quotes.push(found.close);
  });
  if (rowCount === 0)
    problems.push(problemOf(0, null, 'empty', 'The file has no row below its headings.'));
  if (rowCount > largestRowCount)
    problems.push(
      problemOf(0, null, 'too-many-rows', `The file has more than ${largestRowCount} rows.`),
    );
  const present = new Set(quotes.map(({ underlyingId }) => underlyingId));
  const missing = underlyings.filter(({ id }) => !present.has(id)).map(({ symbol }) => symbol);
  return reportOf(problems, { rowCount, quotes, missing });
}

export async function checkMarketFile(desk: Desk, content: string): Promise<MarketFileReport> {
  const file = textOfFile(Buffer.from(content, 'base64'));
  if (!file.ok) return reportOf([problemOf(file.row, null, file.code, file.message)], unread);
  const parsed = rowsOf(file.text);
  if (parsed.rows.length === 0) return reportOf(parsed.problems, unread);
  const listed = await listedUnderlyings(desk.id);
  return readRows(
    parsed,
    listed.filter(({ archivedAt }) => archivedAt === null),
  );
}
