import { useLocalSearchParams, useRouter } from 'expo-router';
import { Permitted } from '@/components/shell/permitted';
import { NewStudyScreen } from '@/components/studies/new-study-screen';
import { useDesk } from '@/hooks/use-desk';
import { useSession } from '@/hooks/use-session';

export default function NewStudyRoute() {
  const desk = useDesk();
  const router = useRouter();
  const { me } = useSession();
  const { quote } = useLocalSearchParams<{ quote?: string }>();
  if (!me) return null;
  return (
    <Permitted permission="run-studies">
      <NewStudyScreen
        key={desk.id}
        desk={desk}
        userId={me.user.id}
        quoteId={quote ?? null}
        onStarted={(studyId) => router.replace(`/desks/${desk.id}/studies/${studyId}`)}
      />
    </Permitted>
  );
}
