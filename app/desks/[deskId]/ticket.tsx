import { useLocalSearchParams, useRouter } from 'expo-router';
import { useCallback } from 'react';
import { Permitted } from '@/components/shell/permitted';
import { TicketScreen } from '@/components/ticket/ticket-screen';
import { useDesk } from '@/hooks/use-desk';
import { useSession } from '@/hooks/use-session';

export default function TicketRoute() {
  const desk = useDesk();
  const { me } = useSession();
  const { from } = useLocalSearchParams<{ from?: string }>();
  const router = useRouter();
  // Taken once: a reload must not put the quote's terms over what was typed since.
  const onFromTaken = useCallback(() => router.setParams({ from: undefined }), [router]);
  if (!me) return null;
  return (
    <Permitted permission="price">
      <TicketScreen
        key={desk.id}
        userId={me.user.id}
        desk={desk}
        from={from ?? null}
        onFromTaken={onFromTaken}
      />
    </Permitted>
  );
}
