import table from '@/tests/reference/elementary.json';

type TableName = Exclude<keyof typeof table, 'note'>;

const bits = new DataView(new ArrayBuffer(8));

/** The distance to the next larger double, as IEEE 754 spaces them. */
export function unitInLastPlace(x: number): number {
  bits.setFloat64(0, Math.abs(x));
  const next = bits.getBigInt64(0) + 1n;
  bits.setBigInt64(0, next);
  return bits.getFloat64(0) - Math.abs(x);
}

/**
 * The worst error of a function over its table, in units in the last place. The table holds mpmath's
 * values at 400 bits: the nearest double, and what the true value has beyond it.
 */
export function worstError(name: TableName, f: (...numbers: number[]) => number): number {
  const rows: number[][] = table[name];
  const errors = rows.map((row) => {
    const [value, beyond] = row.slice(-2);
    const got = f(...row.slice(0, -2));
    return Math.abs((got - value) / unitInLastPlace(value) - beyond);
  });
  return errors.reduce((worst, error) => (error <= worst ? worst : error), 0);
}
