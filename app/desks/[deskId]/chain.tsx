import { ChainScreen } from '@/components/chain/chain-screen';
import { Permitted } from '@/components/shell/permitted';
import { useDesk } from '@/hooks/use-desk';

export default function ChainRoute() {
  const desk = useDesk();
  return (
    <Permitted permission="export-history">
      <ChainScreen key={desk.id} desk={desk} />
    </Permitted>
  );
}
