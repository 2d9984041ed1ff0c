import { createBook, listBooks } from '@/shared/contracts/books';
import { route } from '../middleware/route';
import * as books from '../services/books';

export const bookRoutes = [
  route(createBook, ({ actor, body, writeOnce }) => books.createBook(actor, body, writeOnce)),
  route(listBooks, async ({ actor }) => ({ books: await books.listBooks(actor.desk) })),
];
