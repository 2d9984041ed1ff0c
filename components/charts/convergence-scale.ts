/** Where the points of a convergence chart lie: both axes logarithmic. */
import { scaleLog } from 'd3-scale';
import { formatPower } from '@/shared/format/numbers';

export type ConvergencePoint = { size: number; error: number };
export type ConvergenceSeries = { id: string; label: string; points: readonly ConvergencePoint[] };

export const frame = { width: 460, height: 330, left: 58, right: 14, top: 12, bottom: 46 } as const;

/** A little room around the points. */
const sizeRoom = 1.25;
const errorRoom = 1.6;

export function convergenceScale(series: readonly ConvergenceSeries[]) {
  const points = series.flatMap((one) => one.points);
  const sizes = points.map(({ size }) => size);
  const errors = points.map(({ error }) => error);
  const x = scaleLog()
    .domain([Math.min(...sizes) / sizeRoom, Math.max(...sizes) * sizeRoom])
    .range([frame.left, frame.width - frame.right]);
  const y = scaleLog()
    .domain([Math.min(...errors) / errorRoom, Math.max(...errors) * errorRoom])
    .range([frame.height - frame.bottom, frame.top]);
  return { x, y };
}

export type ConvergenceScale = ReturnType<typeof convergenceScale>;

/** Down from here an error is written with a power of ten. */
const smallestPlain = 0.1;

/** An error in two digits. */
export function errorText(error: number, digits = 2): string {
  if (error === 0) return '0';
  const plain = error >= smallestPlain && error < 1000;
  return plain ? String(Number(error.toPrecision(digits))) : formatPower(error, digits);
}

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
