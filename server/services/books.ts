import { QueryTypes, UniqueConstraintError, type Transaction } from 'sequelize';
import type { Book as BookOnTheWire, BookDraft } from '@/shared/contracts/books';
import { AppError } from '@/shared/errors';
import { liveStatuses, waitingStatuses } from '@/shared/trade-moves';
import { appendRecord } from '../chain/append';
import { sequelize } from '../database';
import { Book } from '../models/book';
import type { Desk } from '../models/desk';
import type { DeskActor } from './access';
import type { WriteOnce } from './write-once';

type BookRow = BookOnTheWire & { id: string };

const countedBooks = `
  SELECT book.id, book.code, book.name,
    count(trade.id) FILTER (WHERE trade.status IN (:live))::integer AS live,
    count(trade.id) FILTER (WHERE trade.status IN (:waiting))::integer AS waiting,
    count(trade.id) FILTER (WHERE trade.status = 'returned')::integer AS returned,
    count(trade.id) FILTER (WHERE trade.status IN ('closed', 'expired'))::integer AS ended,
    count(trade.id) FILTER (WHERE trade.status IN (:live)
      AND (trade.last_verdict IN ('wide', 'disagree') OR trade.last_refuted))::integer AS doubtful,
    count(trade.id) FILTER (WHERE trade.status IN (:live)
      AND trade.last_value IS NULL)::integer AS unvalued
  FROM books book LEFT JOIN trades trade ON trade.book_id = book.id
  WHERE book.desk_id = :deskId AND book.archived_at IS NULL
  GROUP BY book.id ORDER BY book.code`;

export const listBooks = (desk: Desk, transaction?: Transaction): Promise<BookOnTheWire[]> =>
  sequelize.query<BookRow>(countedBooks, {
    replacements: { deskId: desk.id, live: liveStatuses, waiting: waitingStatuses },
    type: QueryTypes.SELECT,
    transaction,
  });

const empty = { live: 0, waiting: 0, returned: 0, ended: 0, doubtful: 0, unvalued: 0 };

export async function createBook(
  { desk, userId }: DeskActor,
  draft: BookDraft,
  writeOnce: WriteOnce,
): Promise<BookOnTheWire> {
  try {
    return await writeOnce(async (transaction) => {
      const { id, code, name } = await Book.create(
        { ...draft, deskId: desk.id, createdById: userId },
        { transaction },
      );
      await appendRecord(transaction, desk.id, {
        kind: 'trade-event',
        event: 'book-opened',
        subject: { type: 'book', id },
        by: userId,
        details: { code },
      });
      return { id, code, name, ...empty };
    });
  } catch (error) {
    if (!(error instanceof UniqueConstraintError && 'code' in error.fields)) throw error;
    const message = 'This desk has a book of that code already; give another.';
    throw new AppError('validation-failed', [{ path: 'code', code: 'taken', message }]);
  }
}
