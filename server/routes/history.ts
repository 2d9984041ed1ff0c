import { getHistoryValue, listHistory } from '@/shared/contracts/history';
import { route } from '../middleware/route';
import * as history from '../services/history';

export const historyRoutes = [
  route(listHistory, ({ actor, query }) => history.listHistory(actor.desk, query)),
  route(getHistoryValue, ({ actor, params }) =>
    history.readHistoryValue(actor.desk, params.position),
  ),
];
