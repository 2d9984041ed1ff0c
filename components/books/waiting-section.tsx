import { StyleSheet, View } from 'react-native';
import { Badge } from '@/components/ui/badge';
import { Section } from '@/components/ui/card';
import { Link } from '@/components/ui/link';
import { Text } from '@/components/ui/text';
import { booksText } from '@/constants/texts/books';
import { statusWord } from '@/constants/texts/trades';
import { space } from '@/constants/theme';
import type { DeskAccess } from '@/shared/contracts/sessions';
import type { TradeSummary } from '@/shared/contracts/trades';
import { formatInstant } from '@/shared/format/dates';
import { useWaitingTrades } from '@/hooks/use-trades';
import { statusTone, tradeTerms } from '../trades/trade-summary';

/** As many as are taken in at a glance; the rest is a press away. */
const shownAtOnce = 3;

/** What waits for a desk head, over all books; nothing where nothing waits. */
export function WaitingSection({ desk, waiting }: { desk: DeskAccess; waiting: number }) {
  const { data } = useWaitingTrades(desk.id, shownAtOnce);
  if (waiting === 0 || !data || data.length === 0) return null;
  return (
    <Section
      title={booksText.waitingTitle}
      action={
        <Link href={`/desks/${desk.id}/books/all?status=waiting`}>{booksText.showWaiting}</Link>
      }
    >
      <Text tone="muted">{booksText.waitingYours(waiting)}</Text>
      <View role="list" style={styles.rows}>
        {data.map((trade) => (
          <View role="listitem" key={trade.id}>
            <WaitingRow trade={trade} desk={desk} />
          </View>
        ))}
      </View>
    </Section>
  );
}

function WaitingRow({ trade, desk }: { trade: TradeSummary; desk: DeskAccess }) {
  return (
    <Link href={`/desks/${desk.id}/trades/${trade.id}`} className="card-link">
      <View style={styles.row}>
        <View style={styles.line}>
          <Text weight="semibold" tone="lake">
            {trade.number}
          </Text>
          <Badge tone={statusTone[trade.status]} label={statusWord[trade.status]} />
          <Text size="small" tone="muted">
            {trade.book.code}
          </Text>
        </View>
        <Text>{tradeTerms(trade)}</Text>
        <Text size="small" tone="muted" tabular>
          {booksText.proposedBy(
            trade.proposedBy.name,
            formatInstant(trade.proposedAt, desk.timeZone),
          )}
        </Text>
      </View>
    </Link>
  );
}

const styles = StyleSheet.create({
  rows: { gap: space.sm },
  row: { gap: 2 },
  line: { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'center', gap: space.sm },
});
