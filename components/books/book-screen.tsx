import { BackLink } from '@/components/ui/back-link';
import { Screen } from '@/components/ui/screen';
import { ErrorState, SkeletonRows } from '@/components/ui/states';
import { PlainPage } from '@/components/shell/permitted';
import { TradeList } from '@/components/trades/trade-list';
import { booksText } from '@/constants/texts/books';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { errorOf } from '@/hooks/error-of';
import { useBooks } from '@/hooks/use-books';
import type { TradeFilter } from '@/hooks/use-trades';

export type BookScreenProps = {
  desk: DeskAccess;
  userId: string;
  /** Without a book: every trade of the desk. */
  filter: TradeFilter;
  onFilter: (change: Partial<TradeFilter>) => void;
};

/** The trades of one book, or of all of them. */
export function BookScreen({ desk, userId, filter, onFilter }: BookScreenProps) {
  const books = useBooks(desk.id);
  const back = <BackLink href={`/desks/${desk.id}/books`} label={booksText.back} />;
  const { bookId } = filter;
  const book = books.data?.find(({ id }) => id === bookId);
  if (bookId !== null && books.data && !book)
    return <PlainPage title={booksText.unknownTitle} body={booksText.unknownBody} />;
  if (bookId !== null && !book)
    return (
      <Screen title={booksText.title} overline={back}>
        {books.error ? (
          <ErrorState {...errorOf(books.error)} onRetry={() => void books.refetch()} />
        ) : (
          <SkeletonRows />
        )}
      </Screen>
    );
  const title = book ? booksText.bookTitle(book.code, book.name) : booksText.allBooks;
  return (
    <Screen
      title={title}
      overline={back}
      subtitle={book ? booksText.counts(book.live, book.ended) : booksText.allBooksBody}
      measure={1360}
    >
      <TradeList
        desk={desk}
        userId={userId}
        caption={booksText.tradesCaption(title)}
        filter={filter}
        onFilter={onFilter}
      />
    </Screen>
  );
}
