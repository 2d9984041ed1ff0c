import { z } from 'zod';
import { defineEndpoint } from '../endpoint';

const partSchema = z.enum(['ready', 'waiting']).describe('State of one part');

export const healthSchema = z.object({
  status: partSchema.describe('Ready when every part is'),
  parts: z
    .object({
      database: partSchema,
      migrations: partSchema,
      web: partSchema,
      worker: partSchema,
    })
    .describe('What the service needs'),
  checkout: z.string().describe('Folder that this service runs from'),
  version: z.string().describe('Version of the product'),
  engine: z.string().describe('Version of the pricing engine'),
});

/** Answers 200 once everything is ready, 503 with the same body before. */
export const getHealth = defineEndpoint({
  method: 'GET',
  path: '/health',
  access: 'public',
  summary: 'Whether the service is ready, and which part is not',
  response: healthSchema,
});
