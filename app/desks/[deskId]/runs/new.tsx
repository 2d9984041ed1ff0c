import { useRouter } from 'expo-router';
import { NewRunScreen } from '@/components/runs/new-run-screen';
import { Permitted } from '@/components/shell/permitted';
import { useDesk } from '@/hooks/use-desk';
import { useSession } from '@/hooks/use-session';

export default function NewRunRoute() {
  const desk = useDesk();
  const router = useRouter();
  const { me } = useSession();
  if (!me) return null;
  return (
    <Permitted permission="start-runs">
      <NewRunScreen
        key={desk.id}
        desk={desk}
        userId={me.user.id}
        onStarted={(runId) => router.replace(`/desks/${desk.id}/runs/${runId}`)}
      />
    </Permitted>
  );
}
