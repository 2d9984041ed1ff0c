/** A trade's time line is read from where it was sealed: the desk's chain of records. */
import { Op, type Transaction } from 'sequelize';
import { recordBodySchema } from '@/shared/contracts/chain-bodies';
import { tradeEventKinds, type TradeEvent } from '@/shared/contracts/trades';
import { appendRecord, chainOf } from '../chain/append';
import { ChainEntry } from '../models/chain-entry';
import type { Trade } from '../models/trade';
import type { TradeVersion } from '../models/trade-version';
import { User } from '../models/user';
import { termsOf } from './trade-rows';

export type SealedEvent = {
  event: TradeEvent['event'];
  trade: Trade;
  version: TradeVersion;
  by: string;
  reason?: string;
  details?: Record<string, unknown>;
};

/** The figures that were agreed; neither counterparty nor note, which may name people. */
const sealedTerms = (version: TradeVersion) => ({
  ...termsOf(version),
  underlyingId: version.underlyingId,
  expiryAt: version.expiryAt.toISOString(),
  tradedAt: version.tradedAt.toISOString(),
  premiumAmount: version.premiumAmount,
  premiumCurrency: version.premiumCurrency,
  premiumDate: version.premiumDate,
  ...(version.quoteId === null ? {} : { quoteId: version.quoteId }),
});

export const sealTradeEvent = (
  transaction: Transaction,
  { event, trade, version, by, reason, details }: SealedEvent,
) =>
  appendRecord(transaction, trade.deskId, {
    kind: event === 'approved' || event === 'returned' ? 'approval' : 'trade-event',
    event,
    subject: { type: 'trade', id: trade.id, version: version.number },
    by,
    ...(reason === undefined ? {} : { reason }),
    details: {
      number: trade.number,
      bookId: trade.bookId,
      tradeVersionId: version.id,
      terms: sealedTerms(version),
      ...details,
    },
  });

function eventOf(entry: ChainEntry, people: ReadonlyMap<string, User>): TradeEvent {
  const { event, subject, by, reason } = recordBodySchema.parse(JSON.parse(entry.body));
  const kind = tradeEventKinds.find((known) => known === event);
  const person = people.get(by);
  if (!kind || !person || subject.version === undefined)
    throw new Error(`Entry ${entry.position} of ${entry.chain} is no event of a trade.`);
  return {
    position: Number(entry.position),
    event: kind,
    at: entry.at,
    by: { id: person.id, name: person.name },
    versionNumber: subject.version,
    reason: reason ?? null,
  };
}

export async function listTradeEvents(
  deskId: string,
  tradeId: string,
  transaction?: Transaction,
): Promise<TradeEvent[]> {
  const entries = await ChainEntry.findAll({
    where: {
      chain: chainOf('records', deskId),
      subjectId: tradeId,
      kind: { [Op.in]: ['trade-event', 'approval'] },
    },
    order: [['position', 'ASC']],
    transaction,
  });
  const makers = entries.map(({ body }) => recordBodySchema.parse(JSON.parse(body)).by);
  const people = await User.findAll({
    where: { id: [...new Set(makers)] },
    attributes: ['id', 'name'],
    transaction,
  });
  const peopleById = new Map(people.map((person) => [person.id, person]));
  return entries.map((entry) => eventOf(entry, peopleById));
}
