import { randomUUID } from 'node:crypto';
import type { Transaction } from 'sequelize';
import { appendRecord } from '@/server/chain/append';
import { sequelize } from '@/server/database';
import { Book } from '@/server/models/book';
import { Desk } from '@/server/models/desk';
import { Trade } from '@/server/models/trade';
import { TradeVersion } from '@/server/models/trade-version';
import type { Underlying } from '@/server/models/underlying';
import type { User } from '@/server/models/user';
import type { TradeProposal } from '@/shared/contracts/trade-acts';
import { makeUser } from './people';

let count = 0;

export async function makeBook(desk: Desk, fields: Partial<Book> = {}): Promise<Book> {
  const { id: createdById } = await makeUser();
  return Book.create({
    deskId: desk.id,
    code: `BOOK-${(count += 1)}`,
    name: 'Grain for the mills',
    createdById,
    ...fields,
  });
}

/** A proposal that the server takes, for a quote and a book of the desk. */
export const proposal = (
  quoteId: string,
  bookId: string,
  fields: Partial<TradeProposal> = {},
): TradeProposal => ({
  quoteId,
  bookId,
  counterparty: 'Grenmoor Mills',
  premiumAmount: '6750.00',
  premiumCurrency: 'EUR',
  premiumDate: '2026-11-03',
  tradedAt: '2026-11-01T10:05:00.000Z',
  note: '',
  ...fields,
});

type Fields = {
  trade?: Partial<Trade>;
  version?: Partial<TradeVersion>;
  /** Who approved it; a trade that is live has one. */
  approver?: User;
};

/** A stored trade with its first event sealed: proposed, or live where it was approved. */
export const makeTrade = (
  book: Book,
  underlying: Underlying,
  proposer: User,
  { trade = {}, version = {}, approver }: Fields = {},
): Promise<Trade> =>
  sequelize.transaction(async (transaction) => {
    const versionId = randomUUID();
    const made = await Trade.create(
      {
        deskId: book.deskId,
        bookId: book.id,
        ordinal: await nextOrdinal(book.deskId, transaction),
        status: approver ? 'live' : 'proposed',
        liveVersionId: approver ? versionId : null,
        latestVersionId: versionId,
        version: approver ? 1 : 0,
        underlyingId: underlying.id,
        expiryAt: version.expiryAt ?? new Date('2030-06-03T15:30:00Z'),
        proposedById: proposer.id,
        ...trade,
      },
      { transaction },
    );
    await TradeVersion.create(
      {
        id: versionId,
        deskId: book.deskId,
        tradeId: made.id,
        number: 1,
        state: approver ? 'approved' : 'proposed',
        underlyingId: underlying.id,
        direction: 'sell',
        quantity: '10',
        contractSize: '50',
        kind: 'put',
        exercise: 'american',
        strike: '210',
        expiryDate: '2030-06-03',
        expiryAt: new Date('2030-06-03T15:30:00Z'),
        premiumAmount: '6750.00',
        premiumCurrency: 'EUR',
        premiumDate: '2026-06-03',
        counterparty: 'Grenmoor Mills',
        tradedAt: new Date('2026-06-01T10:05:00Z'),
        note: '',
        proposedById: proposer.id,
        decidedById: approver?.id ?? null,
        decidedAt: approver ? new Date() : null,
        ...version,
      },
      { transaction },
    );
    await appendRecord(transaction, book.deskId, {
      kind: 'trade-event',
      event: 'proposed',
      subject: { type: 'trade', id: made.id, version: 1 },
      by: proposer.id,
      details: { number: made.number, bookId: book.id },
    });
    return made;
  });

async function nextOrdinal(deskId: string, transaction: Transaction): Promise<number> {
  const desk = await Desk.findByPk(deskId, { transaction, lock: true, rejectOnEmpty: true });
  await desk.increment('lastTradeNumber', { transaction });
  await desk.reload({ transaction });
  return desk.lastTradeNumber;
}
