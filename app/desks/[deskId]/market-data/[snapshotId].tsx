import { useLocalSearchParams } from 'expo-router';
import { SnapshotScreen } from '@/components/market-data/snapshot-screen';
import { Permitted } from '@/components/shell/permitted';
import { useDesk } from '@/hooks/use-desk';
import { useSession } from '@/hooks/use-session';

export default function SnapshotRoute() {
  const desk = useDesk();
  const { me } = useSession();
  const { snapshotId } = useLocalSearchParams<{ snapshotId: string }>();
  if (!me) return null;
  return (
    <Permitted permission="read-desk">
      <SnapshotScreen key={snapshotId} desk={desk} userId={me.user.id} snapshotId={snapshotId} />
    </Permitted>
  );
}
