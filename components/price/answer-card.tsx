import { useState, type ReactNode } from 'react';
import { StyleSheet, useWindowDimensions, View } from 'react-native';
import { AgreementStrip } from '@/components/charts/agreement-strip';
import { Card } from '@/components/ui/card';
import { Icon } from '@/components/ui/icon';
import { Text } from '@/components/ui/text';
import { useWide } from '@/components/ui/use-wide';
import { VerdictMark } from '@/components/charts/verdict-mark';
import { priceText } from '@/constants/texts/price';
import { ticketText } from '@/constants/texts/ticket';
import { color, space } from '@/constants/theme';
import type { Verdict } from '@/pricing/contract';
import { formatMoney } from '@/shared/format/money';
import { formatErrorEstimate, formatNumber, formatQuantity } from '@/shared/format/numbers';
import { positionTotal, type PositionTerms } from '@/shared/quote-terms';
import { CautionsDialog } from './cautions';
import { agreementOf, answerOf, decimalsOf, needsCaution, type Evidence } from './evidence';

/** Below this height (a keyboard is open) the strip gives its place to the fields. */
const leastHeightForStrip = 540;

export type AnswerCardProps = {
  evidence: Evidence;
  /** The same once every route has come in; a moment behind while they do. */
  compared?: Evidence;
  /** Why the number is not that of the terms on the screen; it is then shown in grey. */
  staleReason?: string;
};

/** Value, error, verdict with its strip, total, caution: what is never shown apart. */
export function AnswerCard({ evidence, compared = evidence, staleReason }: AnswerCardProps) {
  const wide = useWide();
  const { height } = useWindowDimensions();
  const settling = compared !== evidence && styles.settling;
  const strip = (
    <Faded stale={staleReason !== undefined}>
      <View style={settling}>
        <AnswerStrip evidence={compared} />
      </View>
    </Faded>
  );
  return (
    <View role="region" aria-label={priceText.title}>
      <Card style={[styles.card, wide && styles.wideCard]}>
        <View style={[styles.figures, wide && styles.wideFigures]}>
          <Faded stale={staleReason !== undefined}>
            <ValueLine evidence={evidence} />
          </Faded>
          <View style={settling}>
            <VerdictLine evidence={compared} staleReason={staleReason} />
          </View>
          {wide || height < leastHeightForStrip ? null : strip}
          <Faded stale={staleReason !== undefined}>
            <TotalLine evidence={evidence} />
          </Faded>
        </View>
        {wide ? <View style={styles.wideStrip}>{strip}</View> : null}
      </Card>
    </View>
  );
}

/** A price of other terms than those on the screen stands back. */
function Faded({ stale, children }: { stale: boolean; children: ReactNode }) {
  return (
    <View role="group" aria-disabled={stale} style={stale && styles.stale}>
      {children}
    </View>
  );
}

function ValueLine({ evidence }: { evidence: Evidence }) {
  const answer = answerOf(evidence);
  const { currency, unit } = evidence.underlying;
  if (!answer)
    return (
      <Text size="title" weight="semibold">
        {priceText.failed}
      </Text>
    );
  return (
    <View style={styles.line}>
      <Text tabular size="figure" weight="semibold" testID="answer-value">
        {formatNumber(answer.value, decimalsOf(evidence))}
      </Text>
      <Text tone="muted">{ticketText.perUnit(currency, unit)}</Text>
      <Text tabular size="lead" tone="muted" style={styles.end}>
        {answer.errorEstimate === null
          ? priceText.errorUnknown
          : `± ${formatErrorEstimate(answer.errorEstimate)}`}
      </Text>
    </View>
  );
}

const toleranceWords: Record<Verdict, ((tolerance: string) => string) | null> = {
  agree: ticketText.within,
  wide: ticketText.known,
  disagree: ticketText.more,
  'one-route': null,
};

type VerdictLineProps = { evidence: Evidence; staleReason?: string };

/** The verdict, or why there is none on these terms; then the caution mark. */
function VerdictLine({ evidence, staleReason }: VerdictLineProps) {
  return (
    <View style={styles.verdict}>
      {staleReason === undefined ? (
        <VerdictWords evidence={evidence} />
      ) : (
        <Text weight="medium" tone="brick" style={styles.verdictWords}>
          {staleReason}
        </Text>
      )}
      <View style={styles.cautionPlace}>
        <CautionButton evidence={evidence} />
      </View>
    </View>
  );
}

function VerdictWords({ evidence }: { evidence: Evidence }) {
  const { verdict, tolerance } = evidence;
  if (verdict === null) return <Text tone="muted">{ticketText.comparing}</Text>;
  const words = toleranceWords[verdict];
  return (
    <View style={[styles.verdictWords, styles.centred]}>
      <VerdictMark verdict={verdict} long />
      {words ? (
        <Text tabular tone="muted">
          {words(formatNumber(tolerance, decimalsOf(evidence)))}
        </Text>
      ) : null}
    </View>
  );
}

function CautionButton({ evidence }: { evidence: Evidence }) {
  const [open, setOpen] = useState(false);
  const tone = needsCaution(evidence) ? color.ochre : color.muted;
  return (
    <>
      <button
        type="button"
        className="icon-button"
        aria-label={priceText.cautionsOpen}
        aria-haspopup="dialog"
        onClick={() => setOpen(true)}
      >
        <Icon name="caution" size={22} color={tone} />
      </button>
      {open ? <CautionsDialog evidence={evidence} onClose={() => setOpen(false)} /> : null}
    </>
  );
}

function AnswerStrip({ evidence }: { evidence: Evidence }) {
  const { verdict, routes } = evidence;
  // While routes come in the strip draws those that are there: `one route` until there are two.
  const agreement = agreementOf(evidence, verdict ?? 'one-route');
  if (routes.length === 0 || agreement.routes.length === 0) return null;
  return <AgreementStrip {...agreement} size="card" />;
}

function TotalLine({ evidence }: { evidence: Evidence }) {
  const answer = answerOf(evidence);
  const { position, underlying } = evidence;
  if (!answer || !position) return null;
  return (
    <View style={styles.line}>
      <Text tone="muted">{positionWords(position, underlying.unit)}</Text>
      <Text tabular weight="semibold" style={styles.end}>
        {formatMoney(positionTotal(answer.value, position), underlying.currency, 'always')}
      </Text>
    </View>
  );
}

/** `Sell 500 t × 10 lots`. */
export function positionWords(position: PositionTerms, unit: string): string {
  const { direction, contractSize, quantity } = position;
  return ticketText.position(
    ticketText.directionTitle[direction],
    formatQuantity(contractSize),
    unit,
    formatQuantity(quantity),
  );
}

export function AnswerPlaceholder({ children }: { children: ReactNode }) {
  return (
    <Card style={styles.placeholder}>
      <Text size="lead" tone="muted">
        {children}
      </Text>
    </Card>
  );
}

const styles = StyleSheet.create({
  card: { paddingVertical: space.md },
  wideCard: { flexDirection: 'row', alignItems: 'center', gap: space.xxl, paddingHorizontal: 22 },
  figures: { gap: 6 },
  wideFigures: { flexGrow: 1, flexShrink: 1, flexBasis: 320 },
  wideStrip: { flexGrow: 1, flexShrink: 1, flexBasis: 300, maxWidth: 420 },
  stale: { opacity: 0.5 },
  // Dimmed only when the other routes take long enough to be noticed.
  settling: {
    opacity: 0.5,
    transitionProperty: 'opacity',
    transitionDuration: '0s',
    transitionDelay: '150ms',
  } as object,
  line: { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'baseline', columnGap: space.sm },
  verdict: { flexDirection: 'row', alignItems: 'center', minHeight: 24 },
  verdictWords: { flexShrink: 1 },
  centred: { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'center', columnGap: space.sm },
  cautionPlace: { marginLeft: 'auto', marginVertical: -11 },
  end: { marginLeft: 'auto' },
  placeholder: { minHeight: 132, justifyContent: 'center' },
});
