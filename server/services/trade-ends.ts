/** How trades end: closed before their time, lapsed or exercised. */
import type { Transaction } from 'sequelize';
import type { z } from 'zod';
import type { tradeClosingSchema, tradeExpirySchema } from '@/shared/contracts/trade-acts';
import type { Trade as TradeOnTheWire } from '@/shared/contracts/trades';
import { dateInZone } from '@/shared/dates';
import type { Desk } from '../models/desk';
import type { Trade } from '../models/trade';
import { TradeVersion } from '../models/trade-version';
import { today, type DeskActor } from './access';
import { once, openTrade, refuseIfAny, supersede } from './open-trade';
import { sealTradeEvent } from './trade-events';
import { endDayIssues, expiryIssues } from './trade-issues';
import { getTrade } from './trades';

async function findLiveVersion({ liveVersionId }: Trade, transaction: Transaction) {
  if (liveVersionId === null) throw new Error('A live trade has no version in force.');
  return TradeVersion.findByPk(liveVersionId, { transaction, rejectOnEmpty: true });
}

const tradedDay = ({ tradedAt }: TradeVersion, { timeZone }: Desk) =>
  dateInZone(tradedAt.getTime(), timeZone);

export const closeTrade = (
  actor: DeskActor,
  tradeId: string,
  closing: z.infer<typeof tradeClosingSchema>,
): Promise<TradeOnTheWire> =>
  once(async (transaction) => {
    const { desk, userId } = actor;
    const { date, amount, currency, reason } = closing;
    const lock = { tradeId, version: closing.version };
    const { trade, to } = await openTrade(actor, 'close', lock, transaction);
    const version = await findLiveVersion(trade, transaction);
    refuseIfAny(endDayIssues({ date, today: today(desk), tradedDay: tradedDay(version, desk) }));
    await trade.update(
      {
        status: to,
        endOutcome: 'closed',
        endDate: date,
        endAmount: amount,
        endCurrency: currency,
        version: trade.version + 1,
      },
      { transaction },
    );
    const details = { date, amount, currency };
    const event = { event: 'closed', trade, version, by: userId, reason, details } as const;
    await sealTradeEvent(transaction, event);
    return getTrade(desk, tradeId, transaction);
  });

export const recordExpiry = (
  actor: DeskActor,
  tradeId: string,
  expiry: z.infer<typeof tradeExpirySchema>,
): Promise<TradeOnTheWire> =>
  once(async (transaction) => {
    const { desk, userId } = actor;
    const { outcome, date } = expiry;
    const lock = { tradeId, version: expiry.version };
    const { trade, latest, to } = await openTrade(actor, 'expire', lock, transaction);
    const version = await findLiveVersion(trade, transaction);
    const day = { date, today: today(desk), tradedDay: tradedDay(version, desk) };
    const issues = expiryIssues(outcome, date, version);
    refuseIfAny(issues.length > 0 ? issues : endDayIssues(day));
    if (latest.state === 'proposed') await supersede(latest.id, transaction);
    await trade.update(
      { status: to, endOutcome: outcome, endDate: date, version: trade.version + 1 },
      { transaction },
    );
    const details = { date };
    await sealTradeEvent(transaction, { event: outcome, trade, version, by: userId, details });
    return getTrade(desk, tradeId, transaction);
  });
