import { StyleSheet, View } from 'react-native';
import { Badge, type BadgeProps } from '@/components/ui/badge';
import { Card } from '@/components/ui/card';
import type { Column } from '@/components/ui/data-table';
import { Link } from '@/components/ui/link';
import { Text } from '@/components/ui/text';
import { studiesText } from '@/constants/texts/studies';
import { space } from '@/constants/theme';
import type { DeskAccess } from '@/shared/contracts/sessions';
import type { StudyStatus, StudySummary } from '@/shared/contracts/studies';
import { formatInstant } from '@/shared/format/dates';
import { optionTerms } from '@/shared/format/terms';
import { StudyOrders } from './study-order';

const tones: Record<StudyStatus, BadgeProps['tone']> = {
  queued: 'muted',
  running: 'lake',
  finished: 'ochre',
  cancelled: 'muted',
  'signed-off': 'moss',
  'sent-back': 'brick',
};

function State({ status }: { status: StudyStatus }) {
  return <Badge label={studiesText.statuses[status]} tone={tones[status]} />;
}

/** A row of the list on a wide window. */
export const studyColumns = (desk: DeskAccess): Column<StudySummary>[] => [
  {
    id: 'number',
    header: studiesText.number,
    cell: ({ number }) => <span className="unbroken">{number}</span>,
  },
  { id: 'terms', header: studiesText.terms, cell: (study) => <Terms study={study} /> },
  { id: 'state', header: studiesText.stateColumn, cell: ({ status }) => <State status={status} /> },
  { id: 'found', header: studiesText.order, cell: (study) => <StudyOrders study={study} /> },
  {
    id: 'started',
    header: studiesText.started,
    align: 'end',
    cell: (study) => (
      <View>
        <Text tabular>{formatInstant(study.createdAt, desk.timeZone)}</Text>
        <Text size="small" tone="muted">
          {study.startedBy.name}
        </Text>
      </View>
    ),
  },
];

function Terms({ study }: { study: StudySummary }) {
  const { underlying, quote } = study;
  const option = optionTerms(study, underlying.priceDecimals);
  return (
    <View>
      <Text>{underlying.name}</Text>
      <Text size="small" tone="muted" tabular>
        {quote ? `${option} · ${studiesText.quote(quote.number)}` : option}
      </Text>
    </View>
  );
}

/** A row of the list on a phone. */
export function StudyCard({ study, desk }: { study: StudySummary; desk: DeskAccess }) {
  return (
    <Card style={styles.card}>
      <View style={styles.line}>
        <Link href={`/desks/${desk.id}/studies/${study.id}`}>{study.number}</Link>
        <State status={study.status} />
      </View>
      <Terms study={study} />
      <StudyOrders study={study} />
      <Text size="small" tone="muted" tabular>
        {study.startedBy.name}, {formatInstant(study.createdAt, desk.timeZone)}
      </Text>
    </Card>
  );
}

const styles = StyleSheet.create({
  card: { gap: 6, paddingVertical: space.md },
  line: { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'center', columnGap: space.sm },
});
