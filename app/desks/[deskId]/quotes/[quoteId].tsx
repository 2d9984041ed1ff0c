import { useLocalSearchParams } from 'expo-router';
import { QuoteScreen } from '@/components/quotes/quote-screen';
import { Permitted } from '@/components/shell/permitted';
import { useDesk } from '@/hooks/use-desk';

export default function QuoteRoute() {
  const desk = useDesk();
  const { quoteId } = useLocalSearchParams<{ quoteId: string }>();
  return (
    <Permitted permission="read-desk">
      <QuoteScreen desk={desk} quoteId={quoteId} />
    </Permitted>
  );
}
