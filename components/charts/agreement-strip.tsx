import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
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
  row: {
    height: () => 24,
    top: 5,
    laneGap: (lanes: number) => 13 / Math.max(1, lanes - 1),
    margin: 5,
  },
  card: { height: (lanes: number) => 22 * lanes + 8, top: 12, laneGap: () => 22, margin: 9 },
} as const;

const radiusOf = (size: 'row' | 'card', lanes: number) => {
  if (size === 'card') return 4;
  return lanes > 3 ? 2.2 : 2.8;
};

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
  const { height: heightOf, top, laneGap, margin } = sizes[size];
  const height = heightOf(lanes);
  const { band, routes } = layOutStrip(agreement, width, margin);
  // One lane stands in the middle; several hang from the top, above the axis at the foot.
  const laneAt = (lane: number) => (lanes === 1 ? height / 2 - 1 : top + laneGap(lanes) * lane);
  return (
    <svg width={width} height={height} aria-hidden>
      <rect
        x={band.from}
        y={0}
        width={band.to - band.from}
        height={height - 1}
        rx={3}
        fill={color.lakeSoft}
      />
      <line x1={0} x2={width} y1={height - 0.75} y2={height - 0.75} stroke={color.edge} />
      {routes.map((route, lane) => (
        <RouteMark key={route.name} route={route} y={laneAt(lane)} radius={radiusOf(size, lanes)} />
      ))}
    </svg>
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
          <line x1={whisker.from} x2={whisker.to} y1={y} y2={y} strokeDasharray={dash} {...line} />
          {whisker.openFrom ? null : (
            <line x1={whisker.from} x2={whisker.from} y1={y - cap} y2={y + cap} {...line} />
          )}
          {whisker.openTo ? null : (
            <line x1={whisker.to} x2={whisker.to} y1={y - cap} y2={y + cap} {...line} />
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
  labels: { width: labelWidth, paddingTop: 1 },
  label: { textAlign: 'left', lineHeight: 22 },
  axis: { flex: 1, minWidth: 0, maxWidth: 420 },
});
