import type { Task } from 'graphile-worker';
import { z } from 'zod';
import * as historyExports from '../../services/exports';

const payloadSchema = z.object({ exportId: z.uuid() });

export const writeExport: Task = (payload) =>
  historyExports.writeExport(payloadSchema.parse(payload).exportId);
