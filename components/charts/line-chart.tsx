import { extent, minIndex, tickStep } from 'd3-array';
import { scaleLinear, scaleUtc } from 'd3-scale';
import { line } from 'd3-shape';
import { useState, type CSSProperties, type KeyboardEvent, type PointerEvent } from 'react';
import { StyleSheet, View } from 'react-native';
import Svg, { Circle, Line, Path, Rect } from 'react-native-svg';
import { Text } from '@/components/ui/text';
import { color, space } from '@/constants/theme';
import { formatNumber } from '@/shared/format/numbers';
import { ChartLabel } from './chart-label';

export type LinePoint = {
  /** Milliseconds since 1970 (UTC). */
  at: number;
  /** Null where there is none: the line is broken there. */
  value: number | null;
  /** Drawn as a square instead of a dot. */
  marked: boolean;
  /** What stands below the chart while the point is chosen. */
  reading: string;
};

export type LineChartProps = {
  /** Title with the unit. */
  title: string;
  /** Oldest first. */
  points: readonly LinePoint[];
  /** Word of the marked points in the legend. */
  markedWord: string;
};

const height = 220;
const margin = { top: 12, right: 12, bottom: 26, left: 76 };

function scalesOf(points: readonly LinePoint[], width: number) {
  const [first = 0, last = 0] = extent(points, ({ at }) => at);
  const [low = 0, high = 0] = extent(points, ({ value }) => value);
  // A line that does not move still needs an axis of some length.
  const room = high > low ? 0 : Math.abs(low) * 0.01 || 1;
  return {
    x: scaleUtc()
      .domain([first, last])
      .range([margin.left, width - margin.right]),
    y: scaleLinear()
      .domain([low - room, high + room])
      .nice(4)
      .range([height - margin.bottom, margin.top]),
  };
}

type Scales = ReturnType<typeof scalesOf>;

/** Values over time: a line to look along, with each point to be read by pointer or arrow keys. */
export function LineChart({ title, points, markedWord }: LineChartProps) {
  const [width, setWidth] = useState(480);
  const [chosen, setChosen] = useState<number | null>(null);
  const scales = scalesOf(points, width);
  const last = points.length - 1;
  const onKeyDown = (event: KeyboardEvent) => {
    const from = chosen ?? last;
    const targets: Record<string, number> = {
      ArrowLeft: Math.max(0, from - 1),
      ArrowRight: Math.min(last, from + 1),
      Home: 0,
      End: last,
    };
    const target = targets[event.key];
    if (target === undefined) return;
    event.preventDefault();
    setChosen(target);
  };
  const onPointerMove = (event: PointerEvent<HTMLDivElement>) => {
    const x = event.clientX - event.currentTarget.getBoundingClientRect().left;
    setChosen(nearestTo(x, points, scales));
  };
  return (
    <View style={styles.chart} onLayout={({ nativeEvent }) => setWidth(nativeEvent.layout.width)}>
      <Text size="small" tone="muted">
        {title}
      </Text>
      <div
        style={areaStyle}
        role="application"
        tabIndex={0}
        aria-label={title}
        onKeyDown={onKeyDown}
        onFocus={() => setChosen(chosen ?? last)}
        onPointerMove={onPointerMove}
        onPointerDown={onPointerMove}
      >
        <Drawing {...{ points, scales, width, chosen }} />
      </div>
      <View style={styles.foot}>
        <Text size="small" tabular aria-live="polite">
          {points[chosen ?? last]?.reading}
        </Text>
        {points.some(({ marked }) => marked) ? (
          <View style={styles.legend}>
            <Svg width={10} height={10}>
              <Rect x={1} y={1} width={8} height={8} fill={color.brick} />
            </Svg>
            <Text size="small" tone="muted">
              {markedWord}
            </Text>
          </View>
        ) : null}
      </View>
    </View>
  );
}

/** The index of the point whose place is nearest to a place on the axis. */
function nearestTo(x: number, points: readonly LinePoint[], scales: Scales): number {
  return minIndex(points, ({ at }) => Math.abs(scales.x(at) - x));
}

type DrawingProps = Pick<LineChartProps, 'points'> & {
  scales: Scales;
  width: number;
  chosen: number | null;
};

/** Places on the axis of values, with the decimals that tell them apart: steps are 1, 2 or 5 times a power of ten. */
function marksOf(y: Scales['y']) {
  const [low, high] = y.domain();
  // A logarithm may be an ulp off.
  const decimals = Math.max(0, Math.ceil(-Math.log10(tickStep(low, high, 4)) - 1e-9));
  return y.ticks(4).map((value) => ({ value, at: y(value), label: formatNumber(value, decimals) }));
}

const day = (at: Date) => at.toISOString().slice(0, 10);

function Drawing({ points, scales: { x, y }, width, chosen }: DrawingProps) {
  const path = line<LinePoint>()
    .defined(({ value }) => value !== null)
    .x(({ at }) => x(at))
    .y(({ value }) => y(value ?? 0))([...points]);
  const marks = marksOf(y);
  const times = x.ticks(Math.max(2, Math.floor(width / 160)));
  return (
    <Svg width={width} height={height}>
      {marks.map(({ value, at }) => (
        <Line
          key={value}
          x1={margin.left}
          x2={width - margin.right}
          y1={at}
          y2={at}
          stroke={color.line}
        />
      ))}
      {marks.map(({ value, at, label }) => (
        <ChartLabel key={value} x={margin.left - 8} y={at + 4} anchor="end">
          {label}
        </ChartLabel>
      ))}
      {times.map((tick) => (
        <ChartLabel key={tick.getTime()} x={x(tick)} y={height - 8} anchor="middle">
          {day(tick)}
        </ChartLabel>
      ))}
      {chosen === null ? null : (
        <Line
          x1={x(points[chosen].at)}
          x2={x(points[chosen].at)}
          y1={margin.top}
          y2={height - margin.bottom}
          stroke={color.edge}
        />
      )}
      <Path d={path ?? ''} stroke={color.lake} strokeWidth={1.75} fill="none" />
      {points.map((point, index) => (
        <Point key={`${point.at} ${index}`} point={point} x={x(point.at)} y={y} />
      ))}
    </Svg>
  );
}

/** A value that is missing is marked on the axis itself. */
function Point({ point, x, y }: { point: LinePoint; x: number; y: Scales['y'] }) {
  const at = point.value === null ? height - margin.bottom : y(point.value);
  if (point.marked) return <Rect x={x - 4} y={at - 4} width={8} height={8} fill={color.brick} />;
  return <Circle cx={x} cy={at} r={2.5} fill={color.lake} />;
}

/** A finger still scrolls the page up and down; sideways it reads along the line. */
const areaStyle: CSSProperties = { touchAction: 'pan-y' };

const styles = StyleSheet.create({
  chart: { gap: space.xs, width: '100%' },
  foot: { flexDirection: 'row', flexWrap: 'wrap', justifyContent: 'space-between', gap: space.md },
  legend: { flexDirection: 'row', alignItems: 'center', gap: space.xs },
});
