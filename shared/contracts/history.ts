import { z } from 'zod';
import { verdicts } from '@/pricing/contract';
import { defineEndpoint } from '../endpoint';
import { hashSchema, positionSchema } from './chain';
import { recordBodySchema, valuationBodySchema } from './chain-bodies';
import {
  currencySchema,
  dateSchema,
  deskParamsSchema,
  idSchema,
  instantSchema,
  numberOf,
  pageOf,
  pageQuerySchema,
  personSchema,
} from './common';

/** A field left out narrows nothing. */
export const historyFilterSchema = z.strictObject({
  trade: z.string().trim().min(1).max(40).optional().describe('Number of the trade'),
  run: z.string().trim().min(1).max(40).optional().describe('Number of the run'),
  bookId: idSchema.optional(),
  underlyingId: idSchema.optional(),
  verdict: z.enum(verdicts).optional().describe('What the routes say together'),
  from: dateSchema.optional().describe('First day of the valuation, in the desk’s time zone'),
  to: dateSchema.optional().describe('Last day of the valuation, in the desk’s time zone'),
});
export type HistoryFilter = z.infer<typeof historyFilterSchema>;

const entrySchema = z.object({
  position: positionSchema,
  at: instantSchema.describe('Time of the entry'),
  previous: hashSchema.describe('Hash of the entry before'),
  hash: hashSchema,
});

const historyUnderlyingSchema = z
  .object({
    id: idSchema,
    symbol: z.string().describe('Short name'),
    name: z.string().describe('Full name'),
    currency: currencySchema,
    unit: z.string().describe('What one unit is'),
    priceDecimals: z
      .number()
      .int()
      .meta({ unit: 'decimals', description: 'Decimals that a price is shown with' }),
  })
  .describe('The underlying');

/** One row of the history: the value of a trade and what its check said. */
export const historyRowSchema = z.object({
  underlying: historyUnderlyingSchema,
  position: positionSchema,
  hash: hashSchema,
  body: valuationBodySchema.describe('The entry of the primary route'),
  check: valuationBodySchema.nullable().describe('The entry of the check route'),
});
export type HistoryRow = z.infer<typeof historyRowSchema>;

export const listHistory = defineEndpoint({
  method: 'GET',
  path: '/desks/:deskId/history',
  access: 'read-desk',
  summary: 'Stored values, by valuation instant, newest first',
  params: deskParamsSchema,
  query: pageQuerySchema.extend(historyFilterSchema.shape),
  response: pageOf(historyRowSchema),
});

const sealedValuationSchema = entrySchema
  .extend({ body: valuationBodySchema.describe('The entry') })
  .describe('A sealed valuation');
const sealedRecordSchema = entrySchema
  .extend({
    body: recordBodySchema.describe('The entry'),
    by: personSchema.describe('Who did it'),
  })
  .describe('A sealed record');
export type SealedRecord = z.infer<typeof sealedRecordSchema>;

export const historyValueSchema = z.object({
  underlying: historyUnderlyingSchema,
  valuations: z
    .array(sealedValuationSchema)
    .describe('The entries of one trade in one run: the primary route first'),
  records: z
    .array(sealedRecordSchema)
    .describe(
      'Approvals and other records of the trade, run, market data and policy, oldest first',
    ),
  before: z
    .object({
      position: positionSchema,
      valuedAt: instantSchema.describe('Valuation instant'),
      value: numberOf('quote currency per unit', 'Value of one unit').nullable(),
    })
    .nullable()
    .describe('The value of the trade before this one'),
});
export type HistoryValue = z.infer<typeof historyValueSchema>;

export const getHistoryValue = defineEndpoint({
  method: 'GET',
  path: '/desks/:deskId/history/:position',
  access: 'read-desk',
  summary: 'One stored value with everything that it rests on',
  params: deskParamsSchema.extend({
    position: z.coerce
      .number()
      .int()
      .min(1)
      .max(Number.MAX_SAFE_INTEGER)
      .meta({ unit: 'entries', description: 'Place of the primary entry in the chain' }),
  }),
  response: historyValueSchema,
});
