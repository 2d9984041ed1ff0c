import { useLocalSearchParams } from 'expo-router';
import { Permitted } from '@/components/shell/permitted';
import { StudyScreen } from '@/components/studies/study-screen';
import { useDesk } from '@/hooks/use-desk';
import { useSession } from '@/hooks/use-session';

export default function StudyRoute() {
  const desk = useDesk();
  const { me } = useSession();
  const { studyId } = useLocalSearchParams<{ studyId: string }>();
  if (!me) return null;
  return (
    <Permitted permission="read-desk">
      <StudyScreen desk={desk} studyId={studyId} userId={me.user.id} />
    </Permitted>
  );
}
