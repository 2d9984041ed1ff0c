import {
  approveSnapshot,
  checkMarketFile,
  createSnapshot,
  getPreviousClose,
  getSnapshot,
  listSnapshots,
  restateSnapshot,
  saveSnapshot,
} from '@/shared/contracts/market-data';
import { route } from '../middleware/route';
import * as closes from '../services/market-data';
import * as drafts from '../services/market-drafts';
import * as files from '../services/market-file';

export const marketDataRoutes = [
  route(listSnapshots, ({ actor, query }) => closes.listSnapshots(actor.desk, query)),
  route(getSnapshot, ({ actor, params }) => closes.getSnapshot(actor.desk, params.snapshotId)),
  route(getPreviousClose, ({ actor, params }) => closes.getPreviousClose(actor.desk, params.date)),
  route(createSnapshot, ({ actor, body, writeOnce }) =>
    drafts.createSnapshot(actor, body, writeOnce),
  ),
  route(saveSnapshot, ({ actor, params, body }) =>
    drafts.saveSnapshot(actor, params.snapshotId, body),
  ),
  route(approveSnapshot, ({ actor, params, body }) =>
    drafts.approveSnapshot(actor, params.snapshotId, body),
  ),
  route(restateSnapshot, ({ actor, params, body, writeOnce }) =>
    drafts.restateSnapshot(actor, params.snapshotId, body.reason, writeOnce),
  ),
  route(checkMarketFile, ({ actor, body }) => files.checkMarketFile(actor.desk, body.content)),
];
