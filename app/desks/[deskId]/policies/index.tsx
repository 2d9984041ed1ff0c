import { PoliciesScreen } from '@/components/policies/policies-screen';
import { Permitted } from '@/components/shell/permitted';
import { useDesk } from '@/hooks/use-desk';
import { useSession } from '@/hooks/use-session';

export default function PoliciesRoute() {
  const desk = useDesk();
  const { me } = useSession();
  if (!me) return null;
  return (
    <Permitted permission="read-desk">
      <PoliciesScreen key={desk.id} desk={desk} userId={me.user.id} />
    </Permitted>
  );
}
