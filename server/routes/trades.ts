import {
  amendTrade,
  approveTrade,
  closeTrade,
  proposeTrade,
  recordExpiry,
  returnTrade,
} from '@/shared/contracts/trade-acts';
import { getTrade, listTrades } from '@/shared/contracts/trades';
import { route } from '../middleware/route';
import * as acts from '../services/trade-acts';
import * as ends from '../services/trade-ends';
import * as list from '../services/trade-list';
import * as trades from '../services/trades';

export const tradeRoutes = [
  route(listTrades, ({ actor, query }) => list.listTrades(actor.desk, query)),
  route(proposeTrade, ({ actor, body, writeOnce }) => acts.proposeTrade(actor, body, writeOnce)),
  route(getTrade, ({ actor, params }) => trades.getTrade(actor.desk, params.tradeId)),
  route(amendTrade, ({ actor, params, body, writeOnce }) =>
    acts.amendTrade(actor, params.tradeId, body, writeOnce),
  ),
  route(approveTrade, ({ actor, params, body }) =>
    acts.approveTrade(actor, { tradeId: params.tradeId, ...body }),
  ),
  route(returnTrade, ({ actor, params, body }) =>
    acts.returnTrade(actor, { tradeId: params.tradeId, ...body }),
  ),
  route(closeTrade, ({ actor, params, body }) => ends.closeTrade(actor, params.tradeId, body)),
  route(recordExpiry, ({ actor, params, body }) => ends.recordExpiry(actor, params.tradeId, body)),
];
