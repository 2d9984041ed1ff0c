import { useLocalSearchParams } from 'expo-router';
import { BookScreen } from '@/components/books/book-screen';
import { Permitted } from '@/components/shell/permitted';
import { useDesk } from '@/hooks/use-desk';
import { useSession } from '@/hooks/use-session';
import { useTradeFilter } from '@/hooks/use-trade-filter';

/** The address of every book together. */
const allBooks = 'all';

export default function BookRoute() {
  const desk = useDesk();
  const { me } = useSession();
  const { bookId } = useLocalSearchParams<{ bookId: string }>();
  const { filter, onFilter } = useTradeFilter(bookId === allBooks ? null : bookId);
  if (!me) return null;
  return (
    <Permitted permission="read-desk">
      <BookScreen
        key={`${desk.id} ${bookId}`}
        desk={desk}
        userId={me.user.id}
        filter={filter}
        onFilter={onFilter}
      />
    </Permitted>
  );
}
