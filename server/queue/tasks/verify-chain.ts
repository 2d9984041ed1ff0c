import type { Task } from 'graphile-worker';
import { z } from 'zod';
import { runVerification } from '../../services/chains';

const payloadSchema = z.object({ verificationId: z.uuid() });

export const verifyChain: Task = (payload) =>
  runVerification(payloadSchema.parse(payload).verificationId);
