import { useLocalSearchParams } from 'expo-router';
import { Permitted } from '@/components/shell/permitted';
import { AmendScreen } from '@/components/forms/lazy-forms';
import { useDesk } from '@/hooks/use-desk';
import { useSession } from '@/hooks/use-session';

export default function AmendRoute() {
  const desk = useDesk();
  const { me } = useSession();
  const { tradeId } = useLocalSearchParams<{ tradeId: string }>();
  if (!me) return null;
  return (
    <Permitted permission="propose-trades">
      <AmendScreen key={tradeId} desk={desk} userId={me.user.id} tradeId={tradeId} />
    </Permitted>
  );
}
