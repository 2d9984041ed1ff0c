/** What the entries of a chain say. Ids of people, never their names or addresses; no client text. */
import { z } from 'zod';
import { methodNames, type PricingRequest } from '@/pricing/contract';
import { idSchema, instantSchema, numberOf } from './common';
import {
  exerciseSchema,
  marketSchema,
  methodSettingsSchema,
  optionKindSchema,
  routeResultSchema,
  verdictSchema,
} from './pricing';

/** The whole request of one route: the engine gives the same bits for it again. */
const pricedRequestSchema = z.strictObject({
  contract: z
    .strictObject({
      payoff: z.literal('vanilla').describe('Form of the payoff'),
      exercise: exerciseSchema,
      kind: optionKindSchema,
      strike: numberOf('quote currency', 'Strike'),
      expiry: numberOf('year', 'Time to expiry, ACT/365 Fixed'),
    })
    .describe('The terms that decide the payoff'),
  market: marketSchema,
  method: methodSettingsSchema.describe('The method and its sizes'),
}) satisfies z.ZodType<PricingRequest>;

export const valuationRoles = ['primary', 'check'] as const;

export const valuationBodySchema = z.strictObject({
  kind: z.literal('valuation').describe('Kind of entry'),
  runId: idSchema,
  runNumber: z.string().min(1).describe('Number of the run on its desk'),
  tradeId: idSchema,
  tradeNumber: z.string().min(1).describe('Number of the trade on its desk'),
  tradeVersionId: idSchema,
  route: z.enum(methodNames).describe('Route that made this value'),
  role: z.enum(valuationRoles).describe('Whether the route values the trade or checks the value'),
  request: pricedRequestSchema.describe('Everything that the engine was given'),
  result: routeResultSchema.describe('What the engine found'),
  engine: z.string().describe('Version of the engine'),
  snapshotId: idSchema,
  policyId: idSchema,
  valuedAt: instantSchema.describe('Valuation instant, UTC with milliseconds'),
  underlyingId: idSchema,
  bookId: idSchema,
  bookCode: z.string().min(1).describe('Code of the book at that time'),
  tolerance: numberOf('quote currency per unit', 'Tolerance that the verdict used'),
  verdict: verdictSchema.optional().describe('On the primary entry: what the routes say together'),
  refuted: z
    .boolean()
    .optional()
    .describe('On the primary entry: whether an error estimate was refuted'),
});
export type ValuationBody = z.infer<typeof valuationBodySchema>;

export const recordKinds = [
  'trade-event',
  'approval',
  'sign-off',
  'permission-change',
  'market-data',
  'policy',
  'override',
  'study',
] as const;
export type RecordKind = (typeof recordKinds)[number];

export const recordBodySchema = z.strictObject({
  kind: z.enum(recordKinds).describe('Kind of record'),
  event: z.string().describe('What happened'),
  subject: z
    .strictObject({
      type: z.string().describe('Kind of thing that it happened to'),
      id: idSchema,
      version: z
        .number()
        .int()
        .optional()
        .meta({ unit: 'count', description: 'Version of that thing' }),
    })
    .describe('What it happened to'),
  by: idSchema.describe('Who did it'),
  reason: z.string().optional().describe('Why, in the words of whoever did it'),
  details: z.record(z.string(), z.unknown()).describe('Figures and ids that belong to it'),
});
export type RecordBody = z.infer<typeof recordBodySchema>;

export type ChainBody = ValuationBody | RecordBody;
