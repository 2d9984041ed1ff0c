import type { Agreement } from './agreement-finding';

/** The axis reaches at least this many tolerances to either side, so that the band keeps its size. */
const leastReach = 2.5;
/** Beyond this many tolerances a route is drawn at the edge with an arrow. */
const farthestReach = 8;

export type Whisker = { from: number; to: number; openFrom: boolean; openTo: boolean };

export type PlacedRoute = {
  name: string;
  x: number;
  /** The route lies beyond the axis on this side. */
  beyond: 'left' | 'right' | null;
  whisker: Whisker | null;
};

export type StripLayout = { band: { from: number; to: number }; routes: PlacedRoute[] };

/** Places band, dots and whiskers on one axis of `width`, centred on the reference route. */
export function layOutStrip(
  { routes, tolerance }: Pick<Agreement, 'routes' | 'tolerance'>,
  width: number,
  margin: number,
): StripLayout {
  const centre = routes[0]?.value ?? 0;
  const farthest = Math.max(0, ...routes.map(({ value }) => Math.abs(value - centre)));
  const reach =
    tolerance * Math.min(farthestReach, Math.max(leastReach, (1.15 * farthest) / tolerance));
  const scale = (value: number) => width / 2 + ((value - centre) / reach) * (width / 2 - margin);
  const inside = (x: number) => Math.min(width - margin, Math.max(margin, x));
  const placed = routes.map(({ name, value, errorEstimate }): PlacedRoute => {
    const beyond = value < centre - reach ? 'left' : value > centre + reach ? 'right' : null;
    const x = inside(scale(value));
    if (errorEstimate === null || beyond) return { name, x, beyond, whisker: null };
    const ends = [scale(value - errorEstimate), scale(value + errorEstimate)];
    return {
      name,
      x,
      beyond,
      whisker: {
        from: inside(ends[0]),
        to: inside(ends[1]),
        openFrom: ends[0] < margin,
        openTo: ends[1] > width - margin,
      },
    };
  });
  return {
    band: { from: scale(centre - tolerance), to: scale(centre + tolerance) },
    routes: placed,
  };
}
