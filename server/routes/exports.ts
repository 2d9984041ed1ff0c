import { createExport, getExport, getExportFile, listExports } from '@/shared/contracts/exports';
import { route } from '../middleware/route';
import * as historyExports from '../services/exports';

export const exportRoutes = [
  route(createExport, ({ actor, body, writeOnce }) =>
    historyExports.createExport(actor, body, writeOnce),
  ),
  route(listExports, ({ actor, query }) => historyExports.listExports(actor.desk, query)),
  route(getExport, ({ actor, params }) => historyExports.readExport(actor.desk, params.exportId)),
  route(getExportFile, ({ actor, params }) =>
    historyExports.readExportFile(actor.desk, params.exportId),
  ),
];
