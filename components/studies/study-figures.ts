/** How the figures of a study are written. */
import { routeInSentence } from '@/constants/texts/price';
import type { Study, StudyRowOnTheWire } from '@/shared/contracts/studies';
import { formatErrorEstimate, formatNumber, formatPower, hardSpace } from '@/shared/format/numbers';

/** Written digits of a value: enough to see the finest row settle. */
const significantDigits = 8;
/** A value this many times the reference is written with a power of ten: it has blown up. */
const beyondReading = 1e4;

export function decimalsOf({ reference, underlying }: Study): number {
  const whole = Math.trunc(Math.abs(reference.value)).toString().length;
  return Math.min(10, Math.max(underlying.priceDecimals, significantDigits - whole));
}

export function valueText(value: number, decimals: number, reference: number): string {
  const sane = Math.abs(value) <= beyondReading * Math.max(1, Math.abs(reference));
  return sane ? formatNumber(value, decimals) : formatPower(value, 3);
}

export function timeText(milliseconds: number): string {
  if (milliseconds < 0.0995) return `${formatNumber(1000 * milliseconds, 0)} µs`;
  if (milliseconds < 10) return `${formatNumber(milliseconds, 2)} ms`;
  return milliseconds < 1000
    ? `${formatNumber(milliseconds, 0)} ms`
    : `${formatNumber(milliseconds / 1000, 2)} s`;
}

/** `200 × 100`, or `1024`. */
export function sizeText({ settings, size }: StudyRowOnTheWire): string {
  return settings.timeSteps === undefined
    ? String(size)
    : [size, '×', settings.timeSteps].join(hardSpace);
}

/** `heat grid, 1600 × 800` */
export function referenceText({ reference }: Study): string {
  const { name, spaceSteps, timeSteps } = reference.method;
  const label = routeInSentence(name);
  return spaceSteps === undefined ? label : `${label}, ${spaceSteps} × ${timeSteps}`;
}

export const referenceErrorText = ({ reference }: Study): string =>
  formatErrorEstimate(reference.errorEstimate);
