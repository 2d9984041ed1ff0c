import { useLocalSearchParams, useRouter } from 'expo-router';
import { Permitted } from '@/components/shell/permitted';
import { NewStudyScreen, type NewStudyOf } from '@/components/studies/new-study-screen';
import { useDesk } from '@/hooks/use-desk';
import { useSession } from '@/hooks/use-session';

type Query = { quote?: string; trade?: string; snapshot?: string };

function subjectOf({ quote, trade, snapshot }: Query): NewStudyOf {
  if (trade) return { kind: 'trade', tradeId: trade, snapshotId: snapshot ?? null };
  return quote ? { kind: 'quote', quoteId: quote } : { kind: 'free' };
}

export default function NewStudyRoute() {
  const desk = useDesk();
  const router = useRouter();
  const { me } = useSession();
  const query = useLocalSearchParams<Query>();
  if (!me) return null;
  return (
    <Permitted permission="run-studies">
      <NewStudyScreen
        key={desk.id}
        desk={desk}
        userId={me.user.id}
        of={subjectOf(query)}
        onStarted={(studyId) => router.replace(`/desks/${desk.id}/studies/${studyId}`)}
      />
    </Permitted>
  );
}
