import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { MarketEditor, RestateDialog } from '@/components/forms/lazy-forms';
import { BackLink } from '@/components/ui/back-link';
import { Button } from '@/components/ui/button';
import { Card } from '@/components/ui/card';
import { Link } from '@/components/ui/link';
import { Notice } from '@/components/ui/notice';
import { Screen } from '@/components/ui/screen';
import { ErrorState, SkeletonRows } from '@/components/ui/states';
import { Text } from '@/components/ui/text';
import { marketDataText, marketEditorText } from '@/constants/texts/market-data';
import { space } from '@/constants/theme';
import type { Snapshot } from '@/shared/contracts/market-data';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { formatInstant } from '@/shared/format/dates';
import { errorOf } from '@/hooks/error-of';
import { useSnapshot } from '@/hooks/use-market-data';
import { useUnderlyings } from '@/hooks/use-underlyings';
import { ApproveDialog } from './approve-dialog';
import { MarketTable } from './market-table';
import { SnapshotState } from './snapshot-list-screen';
import { WarningList } from './warning-list';

export type SnapshotScreenProps = { desk: DeskAccess; userId: string; snapshotId: string };

export function SnapshotScreen({ desk, userId, snapshotId }: SnapshotScreenProps) {
  const { data: snapshot, error, refetch } = useSnapshot(desk.id, snapshotId);
  const [editing, setEditing] = useState(false);
  if (snapshot)
    return editing && snapshot.status === 'draft' ? (
      <EditPage desk={desk} userId={userId} snapshot={snapshot} onDone={() => setEditing(false)} />
    ) : (
      <SnapshotPage
        desk={desk}
        userId={userId}
        snapshot={snapshot}
        onEdit={() => setEditing(true)}
      />
    );
  return (
    <Screen title={marketDataText.title} overline={<Back desk={desk} />}>
      {error ? (
        <ErrorState {...errorOf(error)} onRetry={() => void refetch()} />
      ) : (
        <SkeletonRows rows={6} height={60} />
      )}
    </Screen>
  );
}

function Back({ desk }: { desk: DeskAccess }) {
  return <BackLink href={`/desks/${desk.id}/market-data`} label={marketDataText.back} />;
}

type PageProps = { desk: DeskAccess; userId: string; snapshot: Snapshot };

function EditPage({ desk, userId, snapshot, onDone }: PageProps & { onDone: () => void }) {
  const { data: underlyings, error, refetch } = useUnderlyings(desk.id);
  return (
    <Screen
      title={marketEditorText.changeTitle(snapshot.date)}
      measure={1240}
      overline={<Back desk={desk} />}
    >
      {underlyings ? (
        <MarketEditor
          desk={desk}
          userId={userId}
          underlyings={underlyings}
          draft={snapshot}
          onSaved={onDone}
        />
      ) : error ? (
        <ErrorState {...errorOf(error)} onRetry={() => void refetch()} />
      ) : (
        <SkeletonRows rows={6} height={60} />
      )}
    </Screen>
  );
}

function SnapshotPage({ desk, userId, snapshot, onEdit }: PageProps & { onEdit: () => void }) {
  const { date, missing, warnings, status } = snapshot;
  const symbols = missing.map(({ symbol }) => symbol).join(', ');
  return (
    <Screen
      title={marketDataText.closeOf(date)}
      measure={1240}
      overline={<Back desk={desk} />}
      actions={<Acts desk={desk} userId={userId} snapshot={snapshot} onEdit={onEdit} />}
    >
      <Standing desk={desk} userId={userId} snapshot={snapshot} />
      {status === 'draft' && missing.length > 0 ? (
        <Notice
          tone="ochre"
          title={marketDataText.missingTitle}
          body={marketDataText.missing(symbols)}
        />
      ) : null}
      <WarningList warnings={warnings} />
      <MarketTable snapshot={snapshot} />
    </Screen>
  );
}

/** Who made it what it is, and what took its place. */
function Standing({ desk, userId, snapshot }: PageProps) {
  const { status, source, quoteCount, enteredBy, approvedBy, approvedAt } = snapshot;
  const { reason, restatesId, supersededById, savedAt, makerIds } = snapshot;
  const at = (instant: string) => formatInstant(instant, desk.timeZone);
  const mayApprove = desk.permissions.includes('approve-market-data');
  return (
    <Card style={styles.standing}>
      <View style={styles.line}>
        <SnapshotState status={status} />
        <Text>{marketDataText.numbers(marketDataText.sources[source], quoteCount)}</Text>
      </View>
      <Text tone="muted" tabular>
        {marketDataText.enteredBy(enteredBy.name, at(snapshot.enteredAt))}
        {savedAt ? ` · ${marketDataText.savedAt(at(savedAt))}` : ''}
      </Text>
      {approvedBy && approvedAt ? (
        <Text tone="muted" tabular>
          {marketDataText.approvedBy(approvedBy.name, at(approvedAt))}
        </Text>
      ) : null}
      {reason ? <Text>{marketDataText.reason(reason)}</Text> : null}
      {restatesId ? (
        <Text>
          {marketDataText.restates}{' '}
          <Link href={`/desks/${desk.id}/market-data/${restatesId}`}>
            {marketDataText.restatedClose}
          </Link>
        </Text>
      ) : null}
      {supersededById ? (
        <Text>
          {marketDataText.supersededBy}{' '}
          <Link href={`/desks/${desk.id}/market-data/${supersededById}`}>
            {marketDataText.laterClose}
          </Link>
        </Text>
      ) : null}
      {status !== 'draft' || (mayApprove && !makerIds.includes(userId)) ? null : (
        <Text>{mayApprove ? marketDataText.ownDraft : marketDataText.waits}</Text>
      )}
    </Card>
  );
}

function Acts({ desk, userId, snapshot, onEdit }: PageProps & { onEdit: () => void }) {
  const [dialog, setDialog] = useState<'approve' | 'restate' | null>(null);
  const { status, makerIds, missing } = snapshot;
  const may = (permission: DeskAccess['permissions'][number]) =>
    desk.permissions.includes(permission);
  const isDraft = status === 'draft';
  const close = () => setDialog(null);
  return (
    <>
      {isDraft && may('enter-market-data') ? (
        <Button kind="secondary" label={marketDataText.change} onPress={onEdit} />
      ) : null}
      {isDraft && may('approve-market-data') && !makerIds.includes(userId) ? (
        <Button
          label={marketDataText.approve}
          disabled={missing.length > 0}
          onPress={() => setDialog('approve')}
        />
      ) : null}
      {status === 'approved' && may('enter-market-data') ? (
        <Button
          kind="secondary"
          label={marketDataText.restate}
          onPress={() => setDialog('restate')}
        />
      ) : null}
      {dialog === 'approve' ? (
        <ApproveDialog desk={desk} snapshot={snapshot} onClose={close} />
      ) : null}
      {dialog === 'restate' ? (
        <RestateDialog desk={desk} userId={userId} snapshot={snapshot} onClose={close} />
      ) : null}
    </>
  );
}

const styles = StyleSheet.create({
  standing: { gap: space.xs },
  line: { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'center', gap: space.sm },
});
