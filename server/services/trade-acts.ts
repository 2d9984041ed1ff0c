/**
 * What people do to trades until they end. Each act is one transaction; the event is sealed in the
 * desk's chain of records, last.
 */
import { randomUUID } from 'node:crypto';
import type { Transaction } from 'sequelize';
import type { TradeAmendment, TradeProposal } from '@/shared/contracts/trade-acts';
import type { Deal, Trade as TradeOnTheWire, TradedTerms } from '@/shared/contracts/trades';
import { AppError } from '@/shared/errors';
import { expiryInstantMs } from '@/shared/quote-terms';
import { Book } from '../models/book';
import { Desk } from '../models/desk';
import { Quote } from '../models/quote';
import { Trade } from '../models/trade';
import { TradeVersion } from '../models/trade-version';
import type { DeskActor } from './access';
import { once, openTrade, refuseIfAny, supersede } from './open-trade';
import { sealTradeEvent } from './trade-events';
import { dealIssues, unchangedIssues } from './trade-issues';
import { termsOf } from './trade-rows';
import { getTrade } from './trades';
import type { WriteOnce } from './write-once';

async function nextOrdinal(deskId: string, transaction: Transaction): Promise<number> {
  const desk = await Desk.findByPk(deskId, { transaction, lock: true, rejectOnEmpty: true });
  const ordinal = desk.lastTradeNumber + 1;
  await desk.update({ lastTradeNumber: ordinal }, { transaction });
  return ordinal;
}

const versionFields = (deal: Deal, terms: TradedTerms, desk: Desk) => ({
  ...terms,
  expiryAt: new Date(expiryInstantMs(terms.expiryDate, desk)),
  counterparty: deal.counterparty,
  premiumAmount: deal.premiumAmount,
  premiumCurrency: deal.premiumCurrency,
  premiumDate: deal.premiumDate,
  tradedAt: new Date(deal.tradedAt),
  note: deal.note,
});

/** Everything that can be said about a proposal, at once. */
async function readProposal(desk: Desk, { quoteId, bookId, ...deal }: TradeProposal) {
  const quote = await Quote.findOne({ where: { deskId: desk.id, id: quoteId } });
  const book = await Book.findOne({ where: { deskId: desk.id, id: bookId, archivedAt: null } });
  const issues = quote ? dealIssues(deal, quote.expiryDate, desk) : [];
  if (!quote)
    issues.push({ path: 'quoteId', code: 'unknown', message: 'Choose a quote of this desk.' });
  if (!book)
    issues.push({ path: 'bookId', code: 'unknown', message: 'Choose one of this desk’s books.' });
  if (!quote || !book || issues.length > 0) throw new AppError('validation-failed', issues);
  return { quote, book };
}

export async function proposeTrade(
  { desk, userId }: DeskActor,
  proposal: TradeProposal,
  writeOnce: WriteOnce,
): Promise<TradeOnTheWire> {
  const { quote, book } = await readProposal(desk, proposal);
  const { underlyingId } = quote;
  const fields = versionFields(proposal, termsOf(quote), desk);
  return writeOnce(async (transaction) => {
    const versionId = randomUUID();
    const trade = await Trade.create(
      {
        deskId: desk.id,
        bookId: book.id,
        ordinal: await nextOrdinal(desk.id, transaction),
        status: 'proposed',
        latestVersionId: versionId,
        underlyingId,
        expiryAt: fields.expiryAt,
        proposedById: userId,
      },
      { transaction },
    );
    const version = await TradeVersion.create(
      {
        ...fields,
        id: versionId,
        deskId: desk.id,
        tradeId: trade.id,
        number: 1,
        underlyingId,
        quoteId: quote.id,
        proposedById: userId,
      },
      { transaction },
    );
    await sealTradeEvent(transaction, { event: 'proposed', trade, version, by: userId });
    return getTrade(desk, trade.id, transaction);
  });
}

export const amendTrade = (
  actor: DeskActor,
  tradeId: string,
  amendment: TradeAmendment,
  writeOnce: WriteOnce,
): Promise<TradeOnTheWire> =>
  writeOnce(async (transaction) => {
    const { desk, userId } = actor;
    const { reason } = amendment;
    const lock = { tradeId, version: amendment.version };
    const { trade, latest, to } = await openTrade(actor, 'amend', lock, transaction);
    const changed = unchangedIssues(latest, amendment);
    refuseIfAny([...dealIssues(amendment, amendment.expiryDate, desk), ...changed]);
    if (latest.state === 'proposed') await supersede(latest.id, transaction);
    const version = await TradeVersion.create(
      {
        ...versionFields(amendment, termsOf(amendment), desk),
        deskId: desk.id,
        tradeId,
        number: latest.number + 1,
        underlyingId: latest.underlyingId,
        quoteId: latest.quoteId,
        amendmentReason: reason,
        proposedById: userId,
      },
      { transaction },
    );
    await trade.update(
      {
        status: to,
        latestVersionId: version.id,
        version: trade.version + 1,
        ...(trade.liveVersionId === null ? { expiryAt: version.expiryAt } : {}),
      },
      { transaction },
    );
    await sealTradeEvent(transaction, { event: 'amended', trade, version, by: userId, reason });
    return getTrade(desk, tradeId, transaction);
  });

export const approveTrade = (
  actor: DeskActor,
  lock: { tradeId: string; version: number },
): Promise<TradeOnTheWire> =>
  once(async (transaction) => {
    const { desk, userId } = actor;
    const { trade, latest, to } = await openTrade(actor, 'approve', lock, transaction);
    if (trade.liveVersionId !== null) await supersede(trade.liveVersionId, transaction);
    await latest.update(
      { state: 'approved', decidedById: userId, decidedAt: new Date() },
      { transaction },
    );
    await trade.update(
      {
        status: to,
        liveVersionId: latest.id,
        expiryAt: latest.expiryAt,
        version: trade.version + 1,
      },
      { transaction },
    );
    await sealTradeEvent(transaction, { event: 'approved', trade, version: latest, by: userId });
    return getTrade(desk, trade.id, transaction);
  });

export const returnTrade = (
  actor: DeskActor,
  lock: { tradeId: string; version: number; reason: string },
): Promise<TradeOnTheWire> =>
  once(async (transaction) => {
    const { desk, userId } = actor;
    const { reason } = lock;
    const { trade, latest, to } = await openTrade(actor, 'return', lock, transaction);
    await latest.update(
      { state: 'returned', decidedById: userId, decidedAt: new Date(), decisionReason: reason },
      { transaction },
    );
    await trade.update({ status: to, version: trade.version + 1 }, { transaction });
    const event = { event: 'returned', trade, version: latest, by: userId, reason } as const;
    await sealTradeEvent(transaction, event);
    return getTrade(desk, trade.id, transaction);
  });
