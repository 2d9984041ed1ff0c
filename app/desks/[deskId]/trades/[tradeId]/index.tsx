import { useLocalSearchParams } from 'expo-router';
import { Permitted } from '@/components/shell/permitted';
import { TradeScreen } from '@/components/trades/trade-screen';
import { useDesk } from '@/hooks/use-desk';
import { useSession } from '@/hooks/use-session';

export default function TradeRoute() {
  const desk = useDesk();
  const { me } = useSession();
  const { tradeId } = useLocalSearchParams<{ tradeId: string }>();
  if (!me) return null;
  return (
    <Permitted permission="read-desk">
      <TradeScreen key={tradeId} desk={desk} userId={me.user.id} tradeId={tradeId} />
    </Permitted>
  );
}
