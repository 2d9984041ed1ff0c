import { Redirect, useLocalSearchParams, type Href } from 'expo-router';
import { SignInPage } from '@/components/shell/sign-in-page';
import { useSession } from '@/hooks/use-session';

/** Only addresses of this product: a link in a mail must not lead elsewhere. */
const ownAddress = (next: string | undefined): string =>
  next !== undefined && /^\/(?![/\\])/.test(next) ? next : '/';

export default function SignInRoute() {
  const { next } = useLocalSearchParams<{ next?: string }>();
  const { me } = useSession();
  if (me) return <Redirect href={ownAddress(next) as Href} />;
  return <SignInPage />;
}
