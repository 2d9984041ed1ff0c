import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import Svg, { Line, Rect } from 'react-native-svg';
import { color, space } from '@/constants/theme';
import { agreementText } from '@/constants/texts/agreement';
import { Text } from '@/components/ui/text';
import { VerdictMark } from './verdict-mark';
import { AgreementFigures } from './agreement-figures';
import { findingOf, type Agreement } from './agreement-finding';
import { layOutStrip, type PlacedRoute } from './agreement-scale';
import { BeyondArrow, RouteDot, routeLook } from './route-dot';

export type AgreementStripProps = Agreement & { size: 'row' | 'card' };

const sizes = {
  row: { height: () => 24, radius: (lanes: number) => (lanes > 3 ? 2.2 : 2.8), margin: 5 },
  card: { height: (lanes: number) => 22 * lanes + 12, radius: () => 4, margin: 9 },
} as const;

const rowWidth = 120;
const labelWidth = 88;

/**
 * The signature of the tool: one axis, the tolerance as a band around the price, each route a dot
 * with its error as a whisker, the verdict in a word. It is a button that opens to the figures.
 */
export function AgreementStrip({ size, ...agreement }: AgreementStripProps) {
  const [open, setOpen] = useState(false);
  const finding = findingOf(agreement);
  return (
    <>
      <button
        type="button"
        className={`strip strip-${size}`}
        aria-label={`${finding} ${agreementText.open}`}
        aria-haspopup="dialog"
        onClick={() => setOpen(true)}
      >
        {size === 'row' ? <StripInRow {...agreement} /> : <StripInCard {...agreement} />}
      </button>
      {open ? <AgreementFigures agreement={agreement} onClose={() => setOpen(false)} /> : null}
    </>
  );
}

function StripInRow(agreement: Agreement) {
  return (
    <View style={styles.row}>
      <StripDrawing agreement={agreement} size="row" width={rowWidth} />
      <VerdictMark verdict={agreement.verdict} />
    </View>
  );
}

function StripInCard(agreement: Agreement) {
  const [width, setWidth] = useState(240);
  return (
    <View style={styles.card}>
      <View style={styles.labels}>
        {agreement.routes.map(({ name, label }) => (
          <Text key={name} size="small" tone="muted" numberOfLines={1} style={styles.label}>
            {label}
          </Text>
        ))}
      </View>
      <View
        style={styles.axis}
        onLayout={({ nativeEvent }) => setWidth(Math.max(120, nativeEvent.layout.width))}
      >
        <StripDrawing agreement={agreement} size="card" width={width} />
      </View>
    </View>
  );
}

type StripDrawingProps = { agreement: Agreement; size: 'row' | 'card'; width: number };

function StripDrawing({ agreement, size, width }: StripDrawingProps) {
  const lanes = agreement.routes.length;
  const height = sizes[size].height(lanes);
  const { band, routes } = layOutStrip(agreement, width, sizes[size].margin);
  const gap = (height - 2) / (lanes + (size === 'row' ? 0.6 : 0.55));
  const top = (height - gap * (lanes - 1)) / 2;
  return (
    <Svg width={width} height={height} aria-hidden>
      <Line x1={0} x2={width} y1={height / 2} y2={height / 2} stroke={color.line} />
      <Rect
        x={band.from}
        y={0}
        width={band.to - band.from}
        height={height}
        rx={3}
        fill={color.lakeSoft}
      />
      {routes.map((route, lane) => (
        <RouteMark
          key={route.name}
          route={route}
          y={top + gap * lane}
          radius={sizes[size].radius(lanes)}
        />
      ))}
    </Svg>
  );
}

function RouteMark({ route, y, radius }: { route: PlacedRoute; y: number; radius: number }) {
  const { name, x, beyond, whisker } = route;
  if (beyond) return <BeyondArrow name={name} x={x} y={y} r={radius} side={beyond} />;
  const { ink, dash } = routeLook(name);
  const line = { stroke: ink, strokeWidth: 1.5 };
  const cap = radius;
  return (
    <>
      {whisker && whisker.to - whisker.from > 2 * radius ? (
        <>
          <Line x1={whisker.from} x2={whisker.to} y1={y} y2={y} strokeDasharray={dash} {...line} />
          {whisker.openFrom ? null : (
            <Line x1={whisker.from} x2={whisker.from} y1={y - cap} y2={y + cap} {...line} />
          )}
          {whisker.openTo ? null : (
            <Line x1={whisker.to} x2={whisker.to} y1={y - cap} y2={y + cap} {...line} />
          )}
        </>
      ) : null}
      <RouteDot name={name} x={x} y={y} r={radius} />
    </>
  );
}

const styles = StyleSheet.create({
  row: { flexDirection: 'row', alignItems: 'center', gap: space.md },
  card: { flexDirection: 'row', gap: space.sm, width: '100%' },
  labels: { width: labelWidth, justifyContent: 'space-around', paddingVertical: 4 },
  label: { textAlign: 'left', lineHeight: 20 },
  axis: { flex: 1, minWidth: 0 },
});
