/**
 * A close as cells of a grid or of a file: price, rate, yield and volatility, the last three in
 * percent. The grid, pasted cells and uploaded files are read by the same rules.
 */
import { numberLimits, type Market } from '@/pricing/contract';
import type { UnderlyingKind } from './contracts/underlyings';
import { formatPercent, formatPower } from './format/numbers';
import { numberText, parseNumber, parsePercent, percentText, type Parsed } from './format/parse';

export const marketColumns = ['price', 'rate', 'yield', 'volatility'] as const;
export type MarketColumn = (typeof marketColumns)[number];
export type MarketCells = Record<MarketColumn, string>;

/** Headings of the grid and of the file; the unit is part of the name, so that none is guessed. */
export const columnHeadings = {
  symbol: 'symbol',
  price: 'price',
  rate: 'rate %',
  yield: 'yield %',
  volatility: 'volatility %',
} as const;

export const emptyCells: MarketCells = { price: '', rate: '', yield: '', volatility: '' };

const fieldOf = { price: 'spot', rate: 'rate', yield: 'yield', volatility: 'volatility' } as const;
type MarketField = (typeof fieldOf)[MarketColumn];

const percentFields: readonly MarketField[] = ['rate', 'yield', 'volatility'];

const labels: Record<MarketField, string> = {
  spot: 'price',
  rate: 'rate',
  yield: 'yield',
  volatility: 'volatility',
};

function limitText(field: MarketField, limit: number): string {
  if (percentFields.includes(field)) return formatPercent(limit, 0);
  return formatPower(limit, 1);
}

/** What is wrong with a number that the engine would refuse; null when nothing is. */
function limitComplaint(field: MarketField, value: number): string | null {
  const { min, max } = numberLimits[field];
  if (value >= min && value <= max) return null;
  if (min > 0 && value <= 0) return `The ${labels[field]} must be more than zero.`;
  return `The ${labels[field]} must lie between ${limitText(field, min)} and ${limitText(field, max)}.`;
}

const marketFields: readonly MarketField[] = ['spot', 'rate', 'yield', 'volatility'];

/** The field with what is wrong with it, for every number of a market. */
export function marketComplaints(market: Market): { field: MarketField; message: string }[] {
  const { spot, rate, volatility } = market;
  const carry = 'yield' in market ? { yield: market.yield } : {};
  const numbers: Partial<Record<MarketField, number>> = { spot, rate, volatility, ...carry };
  return marketFields.flatMap((field) => {
    const value = numbers[field];
    const message = value === undefined ? null : limitComplaint(field, value);
    return message === null ? [] : [{ field, message }];
  });
}

function readCell(column: MarketColumn, typed: string): Parsed<number> {
  const parsed = column === 'price' ? parseNumber(typed) : parsePercent(typed);
  if (!parsed.ok) return parsed;
  const message = limitComplaint(fieldOf[column], parsed.value);
  return message === null ? parsed : { ok: false, message };
}

export type ReadRow =
  { ok: true; market: Market } | { ok: false; errors: Partial<Record<MarketColumn, string>> };

/** One underlying's close out of its cells, or what to do about each cell that cannot be read. */
export function readMarketRow(kind: UnderlyingKind, cells: MarketCells): ReadRow {
  const errors: Partial<Record<MarketColumn, string>> = {};
  const read = (column: MarketColumn): number => {
    if (cells[column].trim() === '') {
      errors[column] = `Fill in the ${labels[fieldOf[column]]}.`;
      return NaN;
    }
    const parsed = readCell(column, cells[column]);
    if (parsed.ok) return parsed.value;
    errors[column] = parsed.message;
    return NaN;
  };
  const numbers = { spot: read('price'), rate: read('rate'), volatility: read('volatility') };
  const isFuture = kind === 'future';
  if (isFuture && cells.yield.trim() !== '')
    errors.yield = 'A future has no yield of its own; leave this empty.';
  const market: Market = isFuture
    ? { ...numbers, carry: 'future' }
    : { ...numbers, yield: read('yield') };
  return Object.keys(errors).length === 0 ? { ok: true, market } : { ok: false, errors };
}

/** What stands in the cells for a close; reading it gives the same doubles back. */
export const cellsOfMarket = (market: Market): MarketCells => ({
  price: numberText(market.spot),
  rate: percentText(market.rate),
  yield: 'yield' in market ? percentText(market.yield) : '',
  volatility: percentText(market.volatility),
});
