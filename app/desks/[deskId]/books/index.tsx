import { BooksScreen } from '@/components/books/books-screen';
import { Permitted } from '@/components/shell/permitted';
import { useDesk } from '@/hooks/use-desk';

export default function BooksRoute() {
  const desk = useDesk();
  return (
    <Permitted permission="read-desk">
      <BooksScreen key={desk.id} desk={desk} />
    </Permitted>
  );
}
