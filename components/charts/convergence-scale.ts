/** Where the points of a convergence chart lie: both axes logarithmic. */
import { extent, least } from 'd3-array';
import { scaleLog } from 'd3-scale';

export type ConvergencePoint = { size: number; error: number };
export type ConvergenceSeries = { id: string; label: string; points: readonly ConvergencePoint[] };

export const frame = { height: 320, left: 58, right: 14, top: 12, bottom: 46 } as const;

/** A little room around the points. */
const sizeRoom = 1.25;
const errorRoom = 1.6;

export function convergenceScale(series: readonly ConvergenceSeries[], width: number) {
  const points = series.flatMap((one) => one.points);
  const [smallest = 1, largest = 1] = extent(points, ({ size }) => size);
  const [best = 1, worst = 1] = extent(points, ({ error }) => error);
  const x = scaleLog()
    .domain([smallest / sizeRoom, largest * sizeRoom])
    .range([frame.left, width - frame.right]);
  const y = scaleLog()
    .domain([best / errorRoom, worst * errorRoom])
    .range([frame.height - frame.bottom, frame.top]);
  return { x, y, width };
}

export type ConvergenceScale = ReturnType<typeof convergenceScale>;

/** 1, 2 or 5 times a power of ten. */
const isRound = (tick: number) => ['1', '2', '5'].includes(tick.toExponential()[0]);

/**
 * Whole powers of ten within the axis, every second or third one where there are many, and their
 * doubles and fives where there is not even a pair.
 */
export function errorTicks({ y }: ConvergenceScale): number[] {
  const [low, high] = y.domain();
  const first = Math.ceil(Math.log10(low) - 1e-9);
  const last = Math.floor(Math.log10(high) + 1e-9);
  if (last - first < 1) return y.ticks().filter(isRound);
  const every = Math.ceil((last - first + 1) / 6);
  const ticks: number[] = [];
  for (let power = first; power <= last; power += every) ticks.push(10 ** power);
  return ticks;
}

/** The sizes of the first series, as many as have room for their digits. */
export function sizeTicks(series: readonly ConvergenceSeries[]): number[] {
  const sizes = series[0]?.points.map(({ size }) => size) ?? [];
  const every = Math.ceil(sizes.length / 7);
  return sizes.filter((_, index) => index % every === 0);
}

/** The line of the promised order through the first point, as far as the last size. */
export function expectedLine({ points }: ConvergenceSeries, order: number): ConvergencePoint[] {
  const first = points[0];
  const last = points[points.length - 1];
  return [first, { size: last.size, error: first.error * (first.size / last.size) ** order }];
}

export type ConvergencePlace = { series: number; point: number };

/** The point that lies nearest to a place of the drawing. */
export function nearestPlace(
  series: readonly ConvergenceSeries[],
  scale: ConvergenceScale,
  at: { x: number; y: number },
): ConvergencePlace | null {
  const places = series.flatMap(({ points }, index) =>
    points.map(({ size, error }, point) => ({
      place: { series: index, point },
      distance: Math.hypot(scale.x(size) - at.x, scale.y(error) - at.y),
    })),
  );
  return least(places, ({ distance }) => distance)?.place ?? null;
}
