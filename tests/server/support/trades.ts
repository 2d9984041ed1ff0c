/** Shorthands for tests of trades: acts of members on a desk, through the whole server. */
import { call } from './server';
import { randomUUID } from 'node:crypto';
import type { Desk } from '@/server/models/desk';
import * as acts from '@/shared/contracts/trade-acts';
import { getTrade, type Trade } from '@/shared/contracts/trades';
import type { Endpoint } from '@/shared/endpoint';
import type { TestMember } from '../../factories/people';

export type Answer = { status: number; body: Trade & { code: string; issues: { path: string }[] } };

const reason = 'The premium does not match the quote';

export const tradeActs = (desk: Desk) => {
  const send = (
    endpoint: Endpoint,
    who: TestMember,
    tradeId: string | null,
    body: object,
    idempotencyKey: string = randomUUID(),
  ): Promise<Answer> =>
    call(endpoint, {
      params: { deskId: desk.id, ...(tradeId === null ? {} : { tradeId }) },
      token: who.token,
      body,
      idempotencyKey,
    }).then(({ status, body: answer }) => ({ status, body: answer }));
  return {
    propose: (who: TestMember, body: object, key?: string) =>
      send(acts.proposeTrade, who, null, body, key),
    amend: (who: TestMember, trade: Trade, changes: object = {}, key?: string) =>
      send(acts.amendTrade, who, trade.id, { ...amendmentOf(trade), ...changes }, key),
    approve: (who: TestMember, { id, version }: Pick<Trade, 'id' | 'version'>) =>
      send(acts.approveTrade, who, id, { version }),
    return: (who: TestMember, { id, version }: Pick<Trade, 'id' | 'version'>) =>
      send(acts.returnTrade, who, id, { version, reason }),
    close: (who: TestMember, { id, version }: Trade, changes: object = {}) =>
      send(acts.closeTrade, who, id, {
        version,
        date: '2026-11-20',
        amount: '-1250.00',
        currency: 'EUR',
        reason: 'Bought back at the client’s wish',
        ...changes,
      }),
    expire: (who: TestMember, { id, version }: Trade, outcome: string, date: string) =>
      send(acts.recordExpiry, who, id, { version, outcome, date }),
    read: async (who: TestMember, id: string): Promise<Trade> => {
      const params = { deskId: desk.id, tradeId: id };
      return (await call(getTrade, { params, token: who.token })).body;
    },
  };
};

/** An amendment that changes one thing of the version that was proposed last. */
export function amendmentOf({ version, versions: [latest] }: Trade) {
  const { direction, quantity, contractSize, kind, exercise, strike, expiryDate } = latest;
  const { counterparty, premiumAmount, premiumCurrency, premiumDate, tradedAt, note } = latest;
  return {
    direction,
    quantity: `${Number(quantity) + 1}`,
    contractSize,
    kind,
    exercise,
    strike,
    expiryDate,
    counterparty,
    premiumAmount,
    premiumCurrency,
    premiumDate,
    tradedAt,
    note,
    version,
    reason: 'One more lot was agreed by phone',
  };
}
