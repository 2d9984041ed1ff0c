import { StyleSheet, View } from 'react-native';
import { Badge } from '@/components/ui/badge';
import { Card } from '@/components/ui/card';
import type { Column } from '@/components/ui/data-table';
import { Link } from '@/components/ui/link';
import { ProgressBar } from '@/components/ui/progress-bar';
import { Text } from '@/components/ui/text';
import { runsText } from '@/constants/texts/runs';
import { space } from '@/constants/theme';
import type { RunSummary } from '@/shared/contracts/runs';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { formatInstant } from '@/shared/format/dates';
import { isActive } from '@/hooks/use-runs';
import { bookCodes, countWords, statusTone } from './run-words';

/** A row of the list on a wide window. */
export const runColumns = (desk: DeskAccess): Column<RunSummary>[] => [
  {
    id: 'number',
    header: runsText.columns.number,
    nowrap: true,
    cell: ({ number }) => number,
  },
  {
    id: 'close',
    header: runsText.columns.close,
    nowrap: true,
    cell: ({ snapshot }) => snapshot.date,
  },
  { id: 'books', header: runsText.columns.books, cell: bookCodes },
  { id: 'state', header: runsText.columns.state, cell: (run) => <State run={run} /> },
  { id: 'found', header: runsText.columns.found, cell: ({ counts }) => countWords(counts) },
  {
    id: 'exceptions',
    header: runsText.columns.exceptions,
    nowrap: true,
    cell: (run) => <Exceptions run={run} />,
  },
  {
    id: 'started',
    header: runsText.columns.started,
    nowrap: true,
    cell: ({ startedAt, startedBy }) => <Act at={startedAt} by={startedBy.name} desk={desk} />,
  },
  {
    id: 'signed-off',
    header: runsText.columns.signedOff,
    nowrap: true,
    cell: ({ signOff }) =>
      signOff ? <Act at={signOff.at} by={signOff.by.name} desk={desk} /> : '',
  },
];

function Act({ at, by, desk }: { at: string; by: string; desk: DeskAccess }) {
  return (
    <View>
      <span className="unbroken">{formatInstant(at, desk.timeZone)}</span>
      <Text size="small" tone="muted">
        {by}
      </Text>
    </View>
  );
}

function State({ run: { status, done, total } }: { run: RunSummary }) {
  const badge = <Badge label={runsText.statuses[status]} tone={statusTone[status]} />;
  if (status !== 'running') return badge;
  return (
    <View style={styles.progress}>
      <Text size="small" tabular tone="muted">
        {runsText.progress(done, total)}
      </Text>
      <ProgressBar done={done} total={total} />
    </View>
  );
}

function Exceptions({ run: { exceptions, openExceptions, status } }: { run: RunSummary }) {
  if (exceptions === 0 && isActive(status)) return null;
  const open = openExceptions > 0 && status === 'finished';
  return (
    <Text tabular tone={open ? 'brick' : 'muted'} weight={open ? 'semibold' : 'regular'}>
      <span className="unbroken">{runsText.exceptionsOf(openExceptions, exceptions)}</span>
    </Text>
  );
}

/** A row of the list on a phone. */
export function RunCard({ run, desk }: { run: RunSummary; desk: DeskAccess }) {
  const { status, openExceptions, startedBy, startedAt, signOff } = run;
  return (
    <Card style={styles.card}>
      <View style={styles.line}>
        <Link href={`/desks/${desk.id}/runs/${run.id}`}>{run.number}</Link>
        <Text tabular>{run.snapshot.date}</Text>
        <View style={styles.end}>
          {status === 'finished' && openExceptions > 0 ? (
            <Badge label={runsText.openExceptions(openExceptions)} tone="brick" />
          ) : (
            <Badge label={runsText.statuses[status]} tone={statusTone[status]} />
          )}
        </View>
      </View>
      <Text>{bookCodes(run)}</Text>
      {status === 'running' ? <State run={run} /> : <Text>{countWords(run.counts)}</Text>}
      <Text size="small" tone="muted" tabular>
        {signOff
          ? `${runsText.columns.signedOff}: ${runsText.by(signOff.by.name, formatInstant(signOff.at, desk.timeZone))}`
          : `${runsText.columns.started}: ${runsText.by(startedBy.name, formatInstant(startedAt, desk.timeZone))}`}
      </Text>
    </Card>
  );
}

const styles = StyleSheet.create({
  card: { gap: 6, paddingVertical: space.md },
  line: { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'center', columnGap: space.md },
  end: { marginLeft: 'auto' },
  progress: { minWidth: 130 },
});
