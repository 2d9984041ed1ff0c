import { useState, type CSSProperties, type KeyboardEvent, type PointerEvent } from 'react';
import { StyleSheet, View } from 'react-native';
import Svg, { Circle, G, Line, Path } from 'react-native-svg';
import { DataTable } from '@/components/ui/data-table';
import { Section } from '@/components/ui/card';
import { LinkButton } from '@/components/ui/text-field';
import { Text } from '@/components/ui/text';
import { studyChartText } from '@/constants/texts/studies';
import { color, space } from '@/constants/theme';
import { ChartLabel } from './chart-label';
import {
  convergenceScale,
  errorTicks,
  expectedLine,
  frame,
  nearestPlace,
  sizeTicks,
  type ConvergencePlace,
  type ConvergencePoint,
  type ConvergenceScale,
  type ConvergenceSeries,
} from './convergence-scale';
import { errorText } from './error-text';

export type ConvergenceChartProps = {
  /** Whose errors these are. */
  label: string;
  series: readonly ConvergenceSeries[];
  /** The promised order: its slope is drawn dashed. */
  order: number;
  currency: string;
  sizeLabel: string;
};

const inks = [color.lake, color.ochre] as const;

/** Error against size on logarithmic axes, with the expected slope, or the same as a table. */
export function ConvergenceChart(props: ConvergenceChartProps) {
  const { label, series, currency, sizeLabel } = props;
  const [asTable, setAsTable] = useState(false);
  const drawn = series.filter(({ points }) => points.length > 0);
  const enough = drawn.some(({ points }) => points.length > 1);
  return (
    <Section
      title={studyChartText.title(label)}
      action={
        enough ? (
          <LinkButton
            label={asTable ? studyChartText.showChart : studyChartText.showTable}
            onPress={() => setAsTable(!asTable)}
          />
        ) : undefined
      }
    >
      {!enough ? (
        <Text tone="muted">{studyChartText.empty}</Text>
      ) : asTable ? (
        <PointTable label={label} series={drawn} currency={currency} sizeLabel={sizeLabel} />
      ) : (
        <Drawing {...props} series={drawn} />
      )}
    </Section>
  );
}

/** Until the room for it is measured. */
const usualWidth = 390;

function Drawing({ label, series, order, currency, sizeLabel }: ConvergenceChartProps) {
  const [width, setWidth] = useState(usualWidth);
  const scale = convergenceScale(series, width);
  const [place, setPlace] = useState<ConvergencePlace | null>(null);
  const read = place ? series[place.series]?.points[place.point] : undefined;
  const move = (event: KeyboardEvent) => {
    const next = neighbour(series, place, event.key);
    if (!next) return;
    event.preventDefault();
    setPlace(next);
  };
  const point = (event: PointerEvent<HTMLDivElement>) => {
    const box = event.currentTarget.getBoundingClientRect();
    const at = { x: event.clientX - box.left, y: event.clientY - box.top };
    setPlace(nearestPlace(series, scale, at));
  };
  return (
    <View onLayout={({ nativeEvent }) => setWidth(nativeEvent.layout.width)}>
      <div
        style={areaStyle}
        role="img"
        aria-label={`${studyChartText.title(label)}. ${studyChartText.hint}`}
        tabIndex={0}
        onKeyDown={move}
        onFocus={() => setPlace((before) => before ?? { series: 0, point: 0 })}
        onBlur={() => setPlace(null)}
        onPointerMove={point}
        onPointerDown={point}
        onPointerLeave={() => setPlace(null)}
      >
        <Svg width={width} height={frame.height}>
          <Axes scale={scale} series={series} currency={currency} sizeLabel={sizeLabel} />
          {series.map((one, index) => (
            <SeriesMarks
              key={one.id}
              scale={scale}
              series={one}
              order={order}
              ink={inks[index % inks.length]}
              read={place?.series === index ? place.point : null}
            />
          ))}
        </Svg>
      </div>
      <Legend series={series} order={order} />
      <View aria-live="polite" style={styles.readOut}>
        <Text size="small" tabular tone={read ? 'ink' : 'muted'}>
          {read && place
            ? `${series[place.series].label}, ${studyChartText.readOut(read.size, errorText(read.error))} ${currency}`
            : studyChartText.hint}
        </Text>
      </View>
    </View>
  );
}

/** Left and right along a series, up and down between series. */
function neighbour(
  series: readonly ConvergenceSeries[],
  place: ConvergencePlace | null,
  key: string,
): ConvergencePlace | null {
  const from = place ?? { series: 0, point: -1 };
  const steps: Record<string, ConvergencePlace> = {
    ArrowRight: { ...from, point: from.point + 1 },
    ArrowLeft: { ...from, point: from.point - 1 },
    ArrowDown: { ...from, series: from.series + 1 },
    ArrowUp: { ...from, series: from.series - 1 },
  };
  const next = steps[key];
  return next && series[next.series]?.points[next.point] ? next : null;
}

function Axes({
  scale,
  series,
  currency,
  sizeLabel,
}: {
  scale: ConvergenceScale;
  series: readonly ConvergenceSeries[];
  currency: string;
  sizeLabel: string;
}) {
  const bottom = frame.height - frame.bottom;
  return (
    <G>
      {errorTicks(scale).map((tick) => (
        <G key={tick}>
          <Line
            x1={frame.left}
            x2={scale.width - frame.right}
            y1={scale.y(tick)}
            y2={scale.y(tick)}
            stroke={color.line}
          />
          <ChartLabel x={frame.left - 8} y={scale.y(tick) + 4} anchor="end">
            {errorText(tick, 1)}
          </ChartLabel>
        </G>
      ))}
      {sizeTicks(series).map((tick) => (
        <ChartLabel key={tick} x={scale.x(tick)} y={bottom + 18} anchor="middle">
          {tick}
        </ChartLabel>
      ))}
      <ChartLabel x={scale.width - frame.right} y={bottom + 38} anchor="end">
        {sizeLabel}
      </ChartLabel>
      <ChartLabel x={4} y={bottom + 38} anchor="start">
        {studyChartText.error(currency)}
      </ChartLabel>
    </G>
  );
}

function pathOf(scale: ConvergenceScale, points: readonly ConvergencePoint[]): string {
  return points
    .map(({ size, error }, i) => `${i === 0 ? 'M' : 'L'}${scale.x(size)} ${scale.y(error)}`)
    .join('');
}

function SeriesMarks({
  scale,
  series,
  order,
  ink,
  read,
}: {
  scale: ConvergenceScale;
  series: ConvergenceSeries;
  order: number;
  ink: string;
  read: number | null;
}) {
  return (
    <G>
      {series.points.length > 1 ? (
        <Path
          d={pathOf(scale, expectedLine(series, order))}
          stroke={color.muted}
          strokeDasharray="4 3"
          fill="none"
        />
      ) : null}
      <Path d={pathOf(scale, series.points)} stroke={ink} strokeWidth={2} fill="none" />
      {series.points.map(({ size, error }, index) => (
        <Circle
          key={size}
          cx={scale.x(size)}
          cy={scale.y(error)}
          r={index === read ? 6.5 : 4.5}
          fill={index === read ? ink : color.surface}
          stroke={ink}
          strokeWidth={2}
        />
      ))}
    </G>
  );
}

function Legend({ series, order }: { series: readonly ConvergenceSeries[]; order: number }) {
  return (
    <View style={styles.legend}>
      {series.map(({ id, label }, index) => (
        <View key={id} style={styles.legendItem}>
          <Svg width={22} height={12}>
            <Path d="M0 6h22" stroke={inks[index % inks.length]} strokeWidth={2} />
            <Circle
              cx={11}
              cy={6}
              r={4}
              fill={color.surface}
              stroke={inks[index % inks.length]}
              strokeWidth={2}
            />
          </Svg>
          <Text size="small">{label}</Text>
        </View>
      ))}
      <View style={styles.legendItem}>
        <Svg width={22} height={12}>
          <Path d="M0 6h22" stroke={color.muted} strokeDasharray="4 3" />
        </Svg>
        <Text size="small">{studyChartText.slope(order)}</Text>
      </View>
    </View>
  );
}

function PointTable({
  label,
  series,
  currency,
  sizeLabel,
}: Pick<ConvergenceChartProps, 'label' | 'series' | 'currency' | 'sizeLabel'>) {
  const rows = series.flatMap(({ id, label: seriesLabel, points }) =>
    points.map((point) => ({ ...point, id: `${id} ${point.size}`, of: seriesLabel })),
  );
  return (
    <DataTable
      plain
      caption={studyChartText.title(label)}
      rows={rows}
      rowId={({ id }) => id}
      columns={[
        { id: 'series', header: studyChartText.series, cell: ({ of }) => of },
        { id: 'size', header: sizeLabel, align: 'end', cell: ({ size }) => size },
        {
          id: 'error',
          header: studyChartText.error(currency),
          align: 'end',
          cell: ({ error }) => errorText(error),
        },
      ]}
    />
  );
}

/** A finger still scrolls the page up and down; sideways it reads along the points. */
const areaStyle: CSSProperties = { touchAction: 'pan-y' };

const styles = StyleSheet.create({
  readOut: { minHeight: 22 },
  legend: { flexDirection: 'row', flexWrap: 'wrap', columnGap: space.lg, rowGap: space.xs },
  legendItem: { flexDirection: 'row', alignItems: 'center', gap: space.xs },
});
