/** CSV as RFC 4180 writes it: commas, CRLF, quotes doubled. */
import type { Cell } from './columns';

/** A spreadsheet would run a text that begins like this. */
const beginsLikeFormula = /^[=+\-@\t\r]/;

/** A text gets an apostrophe before what looks like a formula; a number never does. */
function fieldOf(cell: Cell): string {
  if (cell === null) return '';
  if (cell instanceof Date) return cell.toISOString();
  if (typeof cell !== 'string') return String(cell);
  const text = beginsLikeFormula.test(cell) ? `'${cell}` : cell;
  return /[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}

export const csvLine = (cells: readonly Cell[]): string => `${cells.map(fieldOf).join(',')}\r\n`;
