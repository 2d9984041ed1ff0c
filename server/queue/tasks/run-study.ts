import type { Task } from 'graphile-worker';
import { z } from 'zod';
import { runNextRow } from '../../services/study-run';

const payloadSchema = z.object({ studyId: z.uuid() });

export const runStudy: Task = (payload) => runNextRow(payloadSchema.parse(payload).studyId);
