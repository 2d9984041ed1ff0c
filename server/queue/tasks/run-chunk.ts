import type { Task } from 'graphile-worker';
import { z } from 'zod';
import * as runWork from '../../services/run-work';

const payloadSchema = z.object({ runId: z.uuid(), number: z.number().int().min(1) });

export const runChunk: Task = (payload) => {
  const { runId, number } = payloadSchema.parse(payload);
  return runWork.runChunk(runId, number);
};
