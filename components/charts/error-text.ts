import { formatPower } from '@/shared/format/numbers';

/** Down from here an error is written with a power of ten. */
const smallestPlain = 0.1;

/** An error in two digits. */
export function errorText(error: number, digits = 2): string {
  if (error === 0) return '0';
  const plain = error >= smallestPlain && error < 1000;
  return plain ? String(Number(error.toPrecision(digits))) : formatPower(error, digits);
}
