import { useLocalSearchParams } from 'expo-router';
import { ValueScreen } from '@/components/history/value-screen';
import { Permitted } from '@/components/shell/permitted';
import { useDesk } from '@/hooks/use-desk';

export default function HistoryValueRoute() {
  const desk = useDesk();
  const { position } = useLocalSearchParams<{ position: string }>();
  return (
    <Permitted permission="read-desk">
      <ValueScreen desk={desk} position={position} />
    </Permitted>
  );
}
