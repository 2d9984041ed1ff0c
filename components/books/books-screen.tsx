import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { OpenBookDialog } from '@/components/forms/lazy-forms';
import { Badge } from '@/components/ui/badge';
import { Button } from '@/components/ui/button';
import { DataTable, type Column } from '@/components/ui/data-table';
import { Icon } from '@/components/ui/icon';
import { Link } from '@/components/ui/link';
import { Notice } from '@/components/ui/notice';
import { Screen } from '@/components/ui/screen';
import { EmptyState, ErrorState, SkeletonRows } from '@/components/ui/states';
import { Text } from '@/components/ui/text';
import { booksText } from '@/constants/texts/books';
import { color, space } from '@/constants/theme';
import type { Book } from '@/shared/contracts/books';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { errorOf } from '@/hooks/error-of';
import { useBooks } from '@/hooks/use-books';
import { WaitingSection } from './waiting-section';

/** The books of the desk, and above them what waits for someone. */
export function BooksScreen({ desk }: { desk: DeskAccess }) {
  const { data: books, error, refetch } = useBooks(desk.id);
  const [opening, setOpening] = useState(false);
  const [opened, setOpened] = useState<string | null>(null);
  const openButton = desk.permissions.includes('approve-trades') ? (
    <Button kind="secondary" icon="plus" label={booksText.open} onPress={() => setOpening(true)} />
  ) : undefined;
  return (
    <Screen title={booksText.title} subtitle={booksText.subtitle} actions={openButton}>
      {opened ? <Notice tone="moss" title={booksText.opened(opened)} /> : null}
      {books ? (
        <Books desk={desk} books={books} openButton={openButton} />
      ) : error ? (
        <ErrorState {...errorOf(error)} onRetry={() => void refetch()} />
      ) : (
        <SkeletonRows />
      )}
      {opening ? (
        <OpenBookDialog
          deskId={desk.id}
          onClose={() => setOpening(false)}
          onOpened={(code) => {
            setOpening(false);
            setOpened(code);
          }}
        />
      ) : null}
    </Screen>
  );
}

type BooksProps = { desk: DeskAccess; books: readonly Book[]; openButton: React.ReactNode };

function Books({ desk, books, openButton }: BooksProps) {
  if (books.length === 0)
    return (
      <EmptyState title={booksText.emptyTitle} body={booksText.emptyBody} action={openButton} />
    );
  const waiting = books.reduce((sum, book) => sum + book.waiting, 0);
  return (
    <>
      <WaitingSection desk={desk} waiting={waiting} />
      <DataTable
        sticky
        caption={booksText.caption}
        columns={columns}
        rows={books}
        rowId={({ id }) => id}
        rowHref={({ id }) => `/desks/${desk.id}/books/${id}`}
        card={(book) => <BookCard book={book} deskId={desk.id} />}
      />
      <Link href={`/desks/${desk.id}/books/all`}>{booksText.allBooksBody}</Link>
    </>
  );
}

const countColumn = (id: 'live' | 'waiting' | 'returned' | 'doubtful' | 'unvalued' | 'ended') => ({
  id,
  header: booksText[id],
  align: 'end' as const,
  cell: (book: Book) =>
    book[id] === 0 ? <Text tone="muted">0</Text> : <Text tabular>{book[id]}</Text>,
});

const columns: Column<Book>[] = [
  { id: 'code', header: booksText.book, nowrap: true, cell: ({ code }) => code },
  { id: 'name', header: booksText.fullName, cell: ({ name }) => name },
  countColumn('live'),
  countColumn('waiting'),
  countColumn('returned'),
  countColumn('doubtful'),
  countColumn('unvalued'),
  countColumn('ended'),
];

function BookCard({ book, deskId }: { book: Book; deskId: string }) {
  return (
    <Link href={`/desks/${deskId}/books/${book.id}`} className="card-link">
      <View style={styles.card}>
        <View style={styles.words}>
          <Text weight="semibold">{booksText.bookTitle(book.code, book.name)}</Text>
          <Text tone="muted">{booksText.counts(book.live, book.ended)}</Text>
          <View style={styles.badges}>
            {book.waiting > 0 ? (
              <Badge tone="ochre" label={booksText.waitingCount(book.waiting)} />
            ) : null}
            {book.returned > 0 ? (
              <Badge tone="brick" label={booksText.returnedCount(book.returned)} />
            ) : null}
            {book.doubtful > 0 ? (
              <Badge tone="ochre" label={booksText.doubtfulCount(book.doubtful)} />
            ) : null}
          </View>
        </View>
        <Icon name="forward" size={20} color={color.muted} />
      </View>
    </Link>
  );
}

const styles = StyleSheet.create({
  card: { flexDirection: 'row', alignItems: 'center', gap: space.md },
  words: { flex: 1, gap: 2, minWidth: 0 },
  badges: { flexDirection: 'row', flexWrap: 'wrap', gap: space.xs },
});
