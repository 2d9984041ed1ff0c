import { Redirect, type Href } from 'expo-router';
import { PlainPage } from '@/components/shell/permitted';
import { shellText } from '@/constants/texts/shell';
import { landingDesk } from '@/hooks/use-desk';
import { useSession } from '@/hooks/use-session';

/** The start of the day: those who price land on the ticket, the others on the quotes. */
export default function StartRoute() {
  const { me } = useSession();
  if (!me) return <Redirect href="/sign-in" />;
  const desk = landingDesk();
  if (!desk) return <PlainPage title={shellText.noDeskTitle} body={shellText.noDesk} />;
  const section = desk.permissions.includes('price') ? 'ticket' : 'quotes';
  return <Redirect href={`/desks/${desk.id}/${section}` as Href} />;
}
