/**
 * The root of a continuous function in a bracket, by Chandrupatla's method (Advances in Engineering
 * Software 28, 1997): inverse quadratic interpolation where three points say that it will do well,
 * bisection where they do not. It never leaves the bracket, never needs more than about twice the
 * evaluations of bisection, and on smooth functions takes six to ten.
 */
export type Bracket = { low: number; high: number; atLow: number; atHigh: number };

/**
 * The bracket's better end once it is narrower than `tolerance` or the function vanishes; undefined
 * when both ends have the same sign, or the function gives a number that is not finite.
 */
export function findRoot(
  f: (x: number) => number,
  bracket: Bracket,
  tolerance: number,
): number | undefined {
  if (bracket.atLow === 0) return bracket.low;
  if (bracket.atHigh === 0) return bracket.high;
  if (!(bracket.atLow < 0 !== bracket.atHigh < 0)) return undefined;
  // a is the newest point, b the other end of the bracket, c the point that a replaced.
  let [b, a, atB, atA] = [bracket.low, bracket.high, bracket.atLow, bracket.atHigh];
  let [c, atC] = [b, atB];
  let share = 0.5;
  for (let i = 0; i < 200; i += 1) {
    const x = a + share * (b - a);
    const atX = f(x);
    if (atX - atX !== 0) return undefined;
    if (atX < 0 === atA < 0) {
      [c, atC] = [a, atA];
    } else {
      [c, atC, b, atB] = [b, atB, a, atA];
    }
    [a, atA] = [x, atX];
    const best = Math.abs(atA) < Math.abs(atB) ? a : b;
    const least = (tolerance + 2.3e-16 * Math.abs(best)) / Math.abs(b - a);
    if (least > 0.5 || atA === 0) return best;
    share = Math.min(1 - least, Math.max(least, nextShare(a, b, c, atA, atB, atC)));
  }
  return undefined;
}

/** How far to go from a towards b: Chandrupatla's test decides between interpolation and bisection. */
function nextShare(a: number, b: number, c: number, atA: number, atB: number, atC: number): number {
  const xi = (a - b) / (c - b);
  const phi = (atA - atB) / (atC - atB);
  if (!(phi * phi < xi && (1 - phi) * (1 - phi) < 1 - xi)) return 0.5;
  return (
    (atA / (atB - atA)) * (atC / (atB - atC)) +
    ((((c - a) / (b - a)) * atA) / (atC - atA)) * (atB / (atC - atB))
  );
}
