import { useRouter } from 'expo-router';
import { PolicyFormScreen } from '@/components/forms/lazy-forms';
import { Permitted } from '@/components/shell/permitted';
import { useDesk } from '@/hooks/use-desk';
import { useSession } from '@/hooks/use-session';

export default function PolicyDraftRoute() {
  const desk = useDesk();
  const router = useRouter();
  const { me } = useSession();
  if (!me) return null;
  return (
    <Permitted permission="author-policy">
      <PolicyFormScreen
        key={desk.id}
        desk={desk}
        userId={me.user.id}
        onSaved={() => router.replace(`/desks/${desk.id}/policies`)}
      />
    </Permitted>
  );
}
