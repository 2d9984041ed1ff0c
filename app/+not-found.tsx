import { PlainPage } from '@/components/shell/permitted';
import { shellText } from '@/constants/texts/shell';

export default function NotFoundRoute() {
  return <PlainPage title={shellText.notFoundTitle} body={shellText.notFound} />;
}
