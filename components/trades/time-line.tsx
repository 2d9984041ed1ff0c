import { StyleSheet, View } from 'react-native';
import { Section } from '@/components/ui/card';
import { Text } from '@/components/ui/text';
import { eventWord, tradeText } from '@/constants/texts/trades';
import { color, space } from '@/constants/theme';
import type { Trade, TradeEvent } from '@/shared/contracts/trades';
import { formatInstant } from '@/shared/format/dates';

/** Everything that happened to a trade, as it is sealed, newest first, under what happens next. */
export function TimeLine({
  trade,
  next,
  timeZone,
}: {
  trade: Trade;
  next: string;
  timeZone: string;
}) {
  const events = [...trade.events].reverse();
  return (
    <Section title={tradeText.timeLineTitle}>
      <View role="list">
        <View role="listitem" style={styles.event}>
          <Dot open />
          <Text tone="muted" style={styles.words}>
            {next}
          </Text>
        </View>
        {events.map((event, index) => (
          <EventItem
            key={event.position}
            event={event}
            timeZone={timeZone}
            last={index === events.length - 1}
          />
        ))}
      </View>
    </Section>
  );
}

type EventItemProps = { event: TradeEvent; timeZone: string; last: boolean };

function EventItem({ event, timeZone, last }: EventItemProps) {
  return (
    <View role="listitem" style={styles.event}>
      <Dot last={last} />
      <View style={styles.words}>
        <View style={styles.line}>
          <Text weight="semibold">{eventWord[event.event]}</Text>
          <Text size="small" tone="muted">
            {tradeText.versionOf(event.versionNumber)}
          </Text>
        </View>
        <Text size="small" tone="muted" tabular>
          {tradeText.byAt(event.by.name, formatInstant(event.at, timeZone))}
        </Text>
        {event.reason ? <Text>{event.reason}</Text> : null}
      </View>
    </View>
  );
}

/** A point on the line that joins the events; open for what is still to come. */
function Dot({ open = false, last = false }: { open?: boolean; last?: boolean }) {
  return (
    <View style={styles.rail} aria-hidden>
      <View style={[styles.dot, open && styles.open]} />
      {last ? null : <View style={styles.thread} />}
    </View>
  );
}

const styles = StyleSheet.create({
  event: { flexDirection: 'row', gap: space.md },
  rail: { width: 12, alignItems: 'center', paddingTop: 6 },
  dot: { width: 10, height: 10, borderRadius: 5, backgroundColor: color.lake },
  open: { backgroundColor: color.surface, borderWidth: 2, borderColor: color.lake },
  thread: { flexGrow: 1, width: 2, marginTop: 2, backgroundColor: color.line },
  words: { flex: 1, minWidth: 0, paddingBottom: space.md },
  line: { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'baseline', columnGap: space.sm },
});
