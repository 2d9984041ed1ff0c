/**
 * How numbers are written on a screen: grouped by a hard space, signed with a true minus, with
 * a fixed count of decimals so that a column aligns on its point. Display scaling (percent, per
 * point, per day) lives in this folder and nowhere else.
 */
import Decimal from 'decimal.js';

export const minusSign = '\u2212';
/** Never breaks a line; narrower spaces are missing from the typeface. */
export const hardSpace = '\u00a0';

export type SignStyle = 'negative' | 'always';

/** A double, or a decimal string that must not pass through a double. */
export type Amount = number | string;

export function spell(formatter: Intl.NumberFormat, amount: Amount): string {
  // Intl takes decimal strings exactly; its types only know the literal form of one.
  return formatter
    .formatToParts(amount as number)
    .map(({ type, value }) => {
      if (type === 'group') return hardSpace;
      return type === 'minusSign' ? minusSign : value;
    })
    .join('');
}

const signDisplay = (sign: SignStyle) => (sign === 'always' ? 'exceptZero' : 'negative');

export const formatNumber = (
  amount: Amount,
  decimals: number,
  sign: SignStyle = 'negative',
): string =>
  spell(
    new Intl.NumberFormat('en', {
      minimumFractionDigits: decimals,
      maximumFractionDigits: decimals,
      signDisplay: signDisplay(sign),
    }),
    amount,
  );

/** A booked decimal with the decimals it has, between the two counts. */
export const formatQuantity = (amount: Amount, minDecimals = 0, maxDecimals = 10): string =>
  spell(
    new Intl.NumberFormat('en', {
      minimumFractionDigits: minDecimals,
      maximumFractionDigits: Math.max(minDecimals, maxDecimals),
      signDisplay: 'negative',
    }),
    amount,
  );

/** Power of ten of the leading digit: 0.0031 → −3. Read from the text, as log10 may be an ulp off. */
const leadingPower = (value: number): number => Number(value.toExponential().split('e')[1]);

/** Decimals that show one digit below the tolerance's leading one: 0.001 → 4. */
export const valueDecimals = (tolerance: number, priceDecimals: number): number =>
  Math.min(12, Math.max(priceDecimals, 1 - leadingPower(tolerance)));

/** Below this an error estimate is written with a power of ten. */
const smallestPlainError = 1e-4;

/** One significant digit, rounded up: an error estimate must not look smaller than it is. */
export function formatErrorEstimate(errorEstimate: number | null): string {
  if (errorEstimate === null) return 'unknown';
  if (errorEstimate === 0) return '0';
  const up = new Decimal(errorEstimate).toSignificantDigits(1, Decimal.ROUND_UP);
  if (errorEstimate >= smallestPlainError) return formatNumber(up.toFixed(), up.decimalPlaces());
  return formatPower(up.toNumber(), 1);
}

/** A signed distance with as many decimals as it needs to be told from nought, at least `decimals`. */
export function formatDifference(difference: number, decimals: number): string {
  if (difference === 0) return '0';
  if (Math.abs(difference) >= 0.5 * 10 ** -decimals)
    return formatNumber(difference, decimals, 'always');
  return `${difference < 0 ? '' : '+'}${formatPower(difference, 1)}`;
}

/** With a power of ten and so many significant digits: −3.4e−9. */
export function formatPower(value: number, digits: number): string {
  const [mantissa, exponent] = value.toExponential(digits - 1).split('e');
  return `${mantissa}e${exponent}`.replace('e+', 'e').replaceAll('-', minusSign);
}

/** A fraction as percent, with the decimals it has and at least `minDecimals`: 0.245 → 24.5 %. */
export const formatPercent = (fraction: number, minDecimals = 2): string =>
  `${formatQuantity(new Decimal(fraction).times(100).toFixed(), minDecimals, 6)}${hardSpace}%`;

export type AlignedText = {
  text: string;
  /** Figures to be drawn unseen after the text, so that its point stands where the others do. */
  padding: string;
};

/** Aligns texts of different decimals on their points, in figures of one width. */
export function alignDecimals(texts: readonly string[]): AlignedText[] {
  const tails = texts.map((text) => (text.includes('.') ? text.slice(text.indexOf('.')) : ''));
  const widest = Math.max(0, ...tails.map(({ length }) => length));
  return texts.map((text, index) => ({
    text,
    padding: (tails[index] === '' ? '.' : '')
      .concat('0'.repeat(widest))
      .slice(0, widest - tails[index].length),
  }));
}
