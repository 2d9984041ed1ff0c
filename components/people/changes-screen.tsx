import { useLocalSearchParams, useRouter } from 'expo-router';
import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/button';
import { Card } from '@/components/ui/card';
import { DataTable, type Column } from '@/components/ui/data-table';
import { Screen } from '@/components/ui/screen';
import { SelectField } from '@/components/ui/select-field';
import { EmptyState, ErrorState, SkeletonRows } from '@/components/ui/states';
import { Text } from '@/components/ui/text';
import { changesText } from '@/constants/texts/people';
import { shellText } from '@/constants/texts/shell';

import { useDesk } from '@/hooks/use-desk';
import { useAccessEvents, usePeople } from '@/hooks/use-people';
import { ApiError } from '@/shared/api-client';
import type { AccessEvent } from '@/shared/contracts/people';
import { formatInstant } from '@/shared/format/dates';
import { permissionSentence } from '@/shared/permissions';

/** Who changed whose permissions, when and why; the person filtered by lies in the address. */
export function ChangesScreen() {
  const desk = useDesk();
  const { person } = useLocalSearchParams<{ person?: string }>();
  const events = useAccessEvents(desk.id, person || undefined);
  return (
    <Screen title={changesText.title} subtitle={changesText.subtitle}>
      <PersonFilter deskId={desk.id} person={person ?? ''} />
      {events.data ? (
        <Events events={events.data} filtered={Boolean(person)} timeZone={desk.timeZone} />
      ) : events.error ? null : (
        <SkeletonRows />
      )}
      {events.error ? (
        <ErrorState
          message={events.error.message}
          requestId={events.error instanceof ApiError ? events.error.requestId : null}
          onRetry={() => void events.refetch()}
        />
      ) : null}
      {events.hasNextPage ? (
        <View style={styles.more}>
          <Button
            kind="secondary"
            label={changesText.more}
            busy={events.isFetchingNextPage}
            onPress={() => void events.fetchNextPage()}
          />
        </View>
      ) : null}
    </Screen>
  );
}

function PersonFilter({ deskId, person }: { deskId: string; person: string }) {
  const router = useRouter();
  const { data: members = [] } = usePeople(deskId);
  const options = [
    { value: '', label: changesText.everyone },
    ...members.map(({ user }) => ({ value: user.id, label: user.name })),
  ];
  return (
    <View style={styles.filter}>
      <SelectField
        label={changesText.person}
        value={person}
        options={options}
        onChange={(chosen) => router.setParams({ person: chosen || undefined })}
      />
    </View>
  );
}

type EventsProps = { events: AccessEvent[]; filtered: boolean; timeZone: string };

function Events({ events, filtered, timeZone }: EventsProps) {
  if (events.length === 0)
    return (
      <EmptyState
        title={changesText.emptyTitle}
        body={filtered ? changesText.emptyFor : changesText.empty}
      />
    );
  return (
    <DataTable
      caption={changesText.caption}
      columns={columns(timeZone)}
      rows={events}
      rowId={({ id }) => id}
      sticky
      card={(event) => <EventCard event={event} timeZone={timeZone} />}
    />
  );
}

function EventCard({ event, timeZone }: { event: AccessEvent; timeZone: string }) {
  return (
    <Card style={styles.card}>
      <Text size="small" tone="muted" tabular>
        {formatInstant(event.at, timeZone)}
      </Text>
      <Text weight="semibold">{event.subject.name}</Text>
      <Text>{describe(event)}</Text>
      <Text>{event.reason}</Text>
      <Text size="small" tone="muted">
        {changesText.byWhom(event.madeBy.name)}
      </Text>
    </Card>
  );
}

function describe({ kind, permission, role, previousRole, endsOn }: AccessEvent): string {
  const what = permission === null ? '' : permissionSentence(permission);
  const until = endsOn === null ? '' : `, ${changesText.until(endsOn)}`;
  switch (kind) {
    case 'role-set':
      return changesText.roleSet(
        role === null ? '' : shellText.roles[role],
        previousRole === null ? null : shellText.roles[previousRole],
      );
    case 'permission-granted':
      return `${changesText.granted(what)}${until}`;
    case 'permission-withdrawn':
      return `${changesText.withdrawn(what)}${until}`;
    case 'change-ended':
      return changesText.ended(what);
    case 'suspended':
      return changesText.suspended;
    case 'reinstated':
      return changesText.reinstated;
  }
}

const columns = (timeZone: string): Column<AccessEvent>[] => [
  {
    id: 'at',
    header: changesText.at,
    nowrap: true,
    cell: ({ at }) => formatInstant(at, timeZone),
  },
  { id: 'subject', header: changesText.subject, nowrap: true, cell: ({ subject }) => subject.name },
  { id: 'what', header: changesText.what, cell: describe },
  { id: 'reason', header: changesText.reason, cell: ({ reason }) => reason },
  { id: 'madeBy', header: changesText.madeBy, nowrap: true, cell: ({ madeBy }) => madeBy.name },
];

const styles = StyleSheet.create({
  filter: { maxWidth: 400, width: '100%' },
  more: { alignItems: 'center' },
  card: { gap: 2 },
});
