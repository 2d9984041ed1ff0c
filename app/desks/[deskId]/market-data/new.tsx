import { useRouter } from 'expo-router';
import { NewSnapshotScreen } from '@/components/market-data/new-snapshot-screen';
import { Permitted } from '@/components/shell/permitted';
import { useDesk } from '@/hooks/use-desk';
import { useSession } from '@/hooks/use-session';

export default function NewSnapshotRoute() {
  const desk = useDesk();
  const router = useRouter();
  const { me } = useSession();
  if (!me) return null;
  return (
    <Permitted permission="enter-market-data">
      <NewSnapshotScreen
        key={desk.id}
        desk={desk}
        userId={me.user.id}
        onSaved={(id) => router.replace(`/desks/${desk.id}/market-data/${id}`)}
      />
    </Permitted>
  );
}
