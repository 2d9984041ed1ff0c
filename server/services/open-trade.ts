/**
 * What every act on a trade begins with: the trade locked, the version that the act was made
 * against, and the table of moves.
 */
import type { Transaction } from 'sequelize';
import { AppError, type Issue } from '@/shared/errors';
import { moveRefusal, moveTarget, type TradeMove, type TradeStatus } from '@/shared/trade-moves';
import { sequelize } from '../database';
import { Trade } from '../models/trade';
import { TradeVersion } from '../models/trade-version';
import type { DeskActor } from './access';
import type { WriteOnce } from './write-once';

export const once: WriteOnce = (write) => sequelize.transaction(write);

export const refuseIfAny = (issues: Issue[]) => {
  if (issues.length > 0) throw new AppError('validation-failed', issues);
};

export type OpenedTrade = {
  trade: Trade;
  latest: TradeVersion;
  to: TradeStatus;
  transaction: Transaction;
};

const standsAt: Record<TradeStatus, string> = {
  proposed: 'waits for approval',
  returned: 'was returned and waits to be amended',
  live: 'is live, and nothing of it waits',
  amended: 'is live, with an amendment that waits for approval',
  closed: 'is closed',
  expired: 'has expired',
};

function refuseMove(actor: DeskActor, move: TradeMove, trade: Trade, latest: TradeVersion) {
  const makers = { proposedById: trade.proposedById, lastAmendedById: latest.proposedById };
  const refusal = moveRefusal(move, { status: trade.status, makers }, actor);
  if (refusal === null) return;
  if (refusal !== 'not-from-here') throw new AppError(refusal);
  const message = `Trade ${trade.number} ${standsAt[trade.status]}.`;
  throw new AppError('move-not-allowed', [{ path: '', code: 'move-not-allowed', message }]);
}

/** Who comes second is told what the first one has made of the trade. */
function refuseStale(trade: Trade, version: number) {
  if (trade.version === version) return;
  const message = `Someone was first: trade ${trade.number} now ${standsAt[trade.status]}.`;
  throw new AppError('stale-version', [{ path: '', code: 'stale-version', message }]);
}

/** The trade under lock, if the move may be made by this person and nobody was quicker. */
export async function openTrade(
  actor: DeskActor,
  move: TradeMove,
  { tradeId, version }: { tradeId: string; version: number },
  transaction: Transaction,
): Promise<OpenedTrade> {
  const trade = await Trade.findOne({
    where: { deskId: actor.desk.id, id: tradeId },
    transaction,
    lock: true,
  });
  if (!trade) throw new AppError('not-found');
  refuseStale(trade, version);
  const latest = await TradeVersion.findByPk(trade.latestVersionId, {
    transaction,
    rejectOnEmpty: true,
  });
  refuseMove(actor, move, trade, latest);
  const to = moveTarget(move, trade.status);
  if (to === null) throw new Error(`${move} was let through from ${trade.status}.`);
  return { trade, latest, to, transaction };
}

export const supersede = (id: string, transaction: Transaction) =>
  TradeVersion.update({ state: 'superseded' }, { where: { id }, transaction });
