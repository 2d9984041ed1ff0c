import { useLocalSearchParams } from 'expo-router';
import { Permitted } from '@/components/shell/permitted';
import { ProposeScreen } from '@/components/forms/lazy-forms';
import { useDesk } from '@/hooks/use-desk';
import { useSession } from '@/hooks/use-session';

export default function ProposeRoute() {
  const desk = useDesk();
  const { me } = useSession();
  const { quoteId } = useLocalSearchParams<{ quoteId: string }>();
  if (!me) return null;
  return (
    <Permitted permission="propose-trades">
      <ProposeScreen key={quoteId} desk={desk} userId={me.user.id} quoteId={quoteId} />
    </Permitted>
  );
}
