import { Redirect, Slot, useGlobalSearchParams, usePathname, type Href } from 'expo-router';
import { DeskFrame } from '@/components/shell/desk-frame';
import { PlainPage } from '@/components/shell/permitted';
import { shellText } from '@/constants/texts/shell';
import { useSession } from '@/hooks/use-session';

/** Every screen of a desk: only for those who are signed in, and members of it. */
export default function DeskLayout() {
  const { deskId } = useGlobalSearchParams<{ deskId: string }>();
  const { me, desk } = useSession();
  const pathname = usePathname();
  if (!me) return <Redirect href={`/sign-in?next=${encodeURIComponent(pathname)}` as Href} />;
  const access = desk(deskId);
  if (!access) return <PlainPage title={shellText.notMemberTitle} body={shellText.notMember} />;
  return (
    <DeskFrame me={me} desk={access}>
      <Slot />
    </DeskFrame>
  );
}
