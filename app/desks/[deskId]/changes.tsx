import { ChangesScreen } from '@/components/people/changes-screen';
import { Permitted } from '@/components/shell/permitted';

export default function ChangesRoute() {
  return (
    <Permitted permission="read-audit-log">
      <ChangesScreen />
    </Permitted>
  );
}
