/**
 * Reading what people type. A dot is always the decimal point. A comma is taken for one only where
 * it cannot group thousands; otherwise the text is refused with what to type instead, because a
 * price that is a thousand times off is worse than a question.
 */
import Decimal from 'decimal.js';

export type Parsed<T> = { ok: true; value: T } | { ok: false; message: string };

const refuse = (message: string): { ok: false; message: string } => ({ ok: false, message });

const magnitudes: Record<string, number> = { k: 3, m: 6 };

/** Spaces that people and other programs put between digits, and the true minus. */
const tidy = (text: string): string =>
  text
    .trim()
    .replace(/\u2212/g, '-')
    .replace(/(\d)[\s\u00a0\u2007\u2009\u202f]+(?=\d)/g, '$1');

function readComma(text: string): Parsed<string> {
  const commas = text.split(',').length - 1;
  if (commas === 0) return { ok: true, value: text };
  const bare = text.replace(/,/g, '');
  if (commas > 1 || text.includes('.'))
    return refuse(`Leave out the commas between thousands: type ${bare}.`);
  const [whole, fraction] = text.split(',');
  const mayGroup = /^[+-]?[1-9]\d{0,2}$/.test(whole) && /^\d{3}(?!\d)/.test(fraction);
  if (mayGroup)
    return refuse(`“${text}” can be read in two ways: type ${whole}.${fraction} or ${bare}.`);
  return { ok: true, value: `${whole}.${fraction}` };
}

const plainNumber = /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d{1,3})?$/i;

/**
 * A number as an exact decimal text, `1.5k` and `2m` written out. The caller decides whether it
 * becomes a double (market data) or stays a decimal (booked quantities).
 */
export function parseDecimal(typed: string): Parsed<string> {
  const text = tidy(typed);
  const point = readComma(text);
  if (!point.ok) return point;
  const magnitude = /^(.*\d\.?)\s*([km])$/i.exec(point.value);
  const digits = magnitude ? magnitude[1] : point.value;
  if (text === '') return refuse('Give a number, such as 210.5.');
  if (!plainNumber.test(digits))
    return refuse(`“${typed.trim()}” is not a number; type digits, such as 210.5.`);
  const power = magnitude ? magnitudes[magnitude[2].toLowerCase()] : 0;
  // Exact: the power of ten only moves the point, whatever the count of digits.
  return { ok: true, value: moveDecimalPoint(digits, power) };
}

/** The text's number times a power of ten, written without an exponent and without rounding. */
export function moveDecimalPoint(text: string, places: number): string {
  const [mantissa, exponent = '0'] = text.toLowerCase().split('e');
  const sign = mantissa.startsWith('-') ? '-' : '';
  const [whole, fraction = ''] = mantissa.replace(/^[+-]/, '').split('.');
  const shift = Number(exponent) + places;
  const digits = whole + fraction;
  const at = whole.length + shift;
  const padded =
    at > digits.length
      ? digits.padEnd(at, '0')
      : digits.padStart(digits.length - Math.min(at, 0), '0');
  const position = Math.max(at, 0);
  const left = padded.slice(0, position).replace(/^0+(?=\d)/, '') || '0';
  const right = padded.slice(position).replace(/0+$/, '');
  return `${sign}${left}${right === '' ? '' : `.${right}`}`;
}

export function parseNumber(typed: string): Parsed<number> {
  const decimal = parseDecimal(typed);
  return decimal.ok ? { ok: true, value: Number(decimal.value) } : decimal;
}

/** `24.5` or `24.5 %` → 0.245, the double nearest to the decimal fraction. */
export function parsePercent(typed: string): Parsed<number> {
  const decimal = parseDecimal(typed.replace(/\s*%\s*$/, ''));
  return decimal.ok ? { ok: true, value: Number(moveDecimalPoint(decimal.value, -2)) } : decimal;
}

/** What stands in a field for a number: its shortest decimal, without an exponent. */
export const numberText = (value: number, minDecimals = 0): string => {
  const decimal = new Decimal(value);
  return decimal.toFixed(Math.max(decimal.decimalPlaces(), minDecimals));
};

/** What stands in a percent field for a fraction; `parsePercent` gives the same double back. */
export const percentText = (fraction: number, minDecimals = 0): string => {
  const text = moveDecimalPoint(new Decimal(fraction).toFixed(), 2);
  const decimals = text.split('.')[1]?.length ?? 0;
  if (decimals >= minDecimals) return text;
  return `${text}${decimals === 0 ? '.' : ''}${'0'.repeat(minDecimals - decimals)}`;
};

/** A solved number as it is put into a field: rounded, without trailing noughts. */
export const roundedNumberText = (value: number, decimals: number): string =>
  new Decimal(value).toDecimalPlaces(decimals).toFixed();

export const roundedPercentText = (fraction: number, decimals: number): string =>
  percentText(new Decimal(fraction).toDecimalPlaces(decimals + 2).toNumber());
