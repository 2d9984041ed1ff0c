/** What is written of a value for the comparison: more digits than any ladder settles. */
const significantDigits = 12;
const mostDecimals = 15;

/**
 * How many leading digits of `value`, those before the point included, all the later values keep. It is about
 * what a reader sees grow still, so that 1.9999 and 2.0001 have none in common.
 */
export function settledDigits(value: number, later: readonly number[]): number {
  if (later.length === 0) return 0;
  return Math.min(...later.map((other) => commonDigits(value, other)));
}

function commonDigits(a: number, b: number): number {
  const decimals = decimalsFor(Math.max(Math.abs(a), Math.abs(b)));
  const first = a.toFixed(decimals);
  const second = b.toFixed(decimals);
  if (first.indexOf('.') !== second.indexOf('.') || a < 0 !== b < 0) return 0;
  let same = 0;
  for (let i = 0; i < first.length && first[i] === second[i]; i++) {
    if (first[i] >= '0' && first[i] <= '9') same++;
  }
  return same;
}

function decimalsFor(size: number): number {
  let decimals = significantDigits;
  for (let reach = 1; reach <= size && decimals > 1; reach *= 10) decimals--;
  for (let reach = 0.1; reach > size && decimals < mostDecimals; reach /= 10) decimals++;
  return decimals;
}
