import { useRouter } from 'expo-router';
import { NewRunScreen } from '@/components/runs/new-run-screen';
import { Permitted } from '@/components/shell/permitted';
import { useDesk } from '@/hooks/use-desk';

export default function NewRunRoute() {
  const desk = useDesk();
  const router = useRouter();
  return (
    <Permitted permission="start-runs">
      <NewRunScreen
        key={desk.id}
        desk={desk}
        onStarted={(runId) => router.replace(`/desks/${desk.id}/runs/${runId}`)}
      />
    </Permitted>
  );
}
