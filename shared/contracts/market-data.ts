import { z } from 'zod';
import { defineEndpoint } from '../endpoint';
import { marketComplaints } from '../market-cells';
import { marketWarningCodes } from '../market-warnings';
import {
  currencySchema,
  dateSchema,
  deskParamsSchema,
  idSchema,
  instantSchema,
  pageOf,
  pageQuerySchema,
  personSchema,
  reasonSchema,
} from './common';
import { marketSchema } from './pricing';
import { underlyingKindSchema } from './underlyings';

export const snapshotStatuses = ['draft', 'approved', 'superseded'] as const;
export type SnapshotStatus = (typeof snapshotStatuses)[number];
const statusSchema = z.enum(snapshotStatuses).describe('Where the close stands');

export const snapshotSources = ['typed', 'file', 'restatement'] as const;
export type SnapshotSource = (typeof snapshotSources)[number];
const sourceSchema = z.enum(snapshotSources).describe('Where the numbers came from');

const countOf = (unit: string, description: string) =>
  z.number().int().min(0).meta({ unit, description });

const versionSchema = countOf('count', 'Version of the record that this was made against');

const largestClose = 1_000;

/** The close of one underlying, as it is sent. */
const quoteDraftSchema = z
  .strictObject({ underlyingId: idSchema, market: marketSchema })
  .superRefine(({ market }, context) => {
    for (const { field, message } of marketComplaints(market))
      context.addIssue({ code: 'custom', path: ['market', field], message });
  });

const warningKeysSchema = z
  .array(z.string().max(100))
  .max(2 * largestClose)
  .describe('Keys of the warnings that a person has confirmed');

export const snapshotDraftSchema = z.strictObject({
  date: dateSchema.describe('Day of the close'),
  source: z.enum(['typed', 'file']).describe('Where the numbers came from'),
  quotes: z
    .array(quoteDraftSchema)
    .min(1, 'Give the close of at least one underlying.')
    .max(largestClose)
    .describe('One close for each underlying'),
  confirmedWarnings: warningKeysSchema,
});
export type SnapshotDraft = z.infer<typeof snapshotDraftSchema>;

export const snapshotSavingSchema = snapshotDraftSchema.extend({ version: versionSchema });
export type SnapshotSaving = z.infer<typeof snapshotSavingSchema>;

export const snapshotSummarySchema = z.object({
  id: idSchema,
  date: dateSchema.describe('Day of the close'),
  status: statusSchema,
  source: sourceSchema,
  quoteCount: countOf('underlyings', 'Underlyings with a close'),
  enteredBy: personSchema,
  enteredAt: instantSchema,
  approvedBy: personSchema.nullable(),
  approvedAt: instantSchema.nullable(),
});
export type SnapshotSummary = z.infer<typeof snapshotSummarySchema>;

const quoteSchema = z.object({
  underlyingId: idSchema,
  symbol: z.string().describe('Short name'),
  name: z.string().describe('Full name'),
  kind: underlyingKindSchema,
  currency: currencySchema,
  priceDecimals: countOf('decimals', 'Decimals that a price is shown with'),
  market: marketSchema,
});

const closeQuoteSchema = z.object({ underlyingId: idSchema, market: marketSchema });

export const previousCloseSchema = z.object({
  snapshotId: idSchema,
  date: dateSchema.describe('Day of that close'),
  quotes: z.array(closeQuoteSchema).describe('Its numbers, an underlying each'),
});
export type PreviousClose = z.infer<typeof previousCloseSchema>;

export const snapshotSchema = snapshotSummarySchema.extend({
  version: countOf('count', 'To be given back with the next change'),
  reason: z.string().nullable().describe('Why an approved close is restated'),
  restatesId: idSchema.nullable().describe('The approved close that it restates'),
  supersededById: idSchema.nullable().describe('The close that has taken its place'),
  savedAt: instantSchema.nullable().describe('When the draft was saved last'),
  makerIds: z.array(idSchema).describe('Whoever entered or saved it, and so cannot approve it'),
  quotes: z.array(quoteSchema).describe('The numbers, by name of the underlying'),
  missing: z
    .array(z.object({ underlyingId: idSchema, symbol: z.string().describe('Short name') }))
    .describe('Underlyings of the desk that have no close here'),
  previous: previousCloseSchema.nullable().describe('The last approved close of an earlier day'),
  warnings: z
    .array(
      z.object({
        underlyingId: idSchema,
        code: z.enum(marketWarningCodes).describe('Kind of warning'),
        message: z.string().describe('The warning in a sentence'),
      }),
    )
    .describe('What is unlikely, and confirmed by whoever saves or approves'),
});
export type Snapshot = z.infer<typeof snapshotSchema>;

const snapshotParams = deskParamsSchema.extend({ snapshotId: idSchema });

const exampleId = '00000000-0000-4000-8000-000000000000';

const draftExample = {
  date: '2026-07-01',
  source: 'typed' as const,
  quotes: [
    {
      underlyingId: exampleId,
      market: { spot: 212.4, rate: 0.026, carry: 'future' as const, volatility: 0.245 },
    },
  ],
  confirmedWarnings: [],
};

export const listSnapshots = defineEndpoint({
  method: 'GET',
  path: '/desks/:deskId/market-data',
  access: 'read-desk',
  summary: 'Closes of the desk, newest day first',
  params: deskParamsSchema,
  query: pageQuerySchema.extend({ status: statusSchema.optional() }),
  response: pageOf(snapshotSummarySchema),
});

export const getSnapshot = defineEndpoint({
  method: 'GET',
  path: '/desks/:deskId/market-data/:snapshotId',
  access: 'read-desk',
  summary: 'One close with its numbers, its warnings and the close before',
  params: snapshotParams,
  response: snapshotSchema,
});

export const getPreviousClose = defineEndpoint({
  method: 'GET',
  path: '/desks/:deskId/previous-close/:date',
  access: 'read-desk',
  summary: 'The last approved close before a day',
  params: deskParamsSchema.extend({ date: dateSchema.describe('Day that is being entered') }),
  response: z.object({ close: previousCloseSchema.nullable().describe('Null where none is') }),
});

export const createSnapshot = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/market-data',
  access: 'enter-market-data',
  summary: 'Enter the close of a day, as a draft',
  params: deskParamsSchema,
  body: snapshotDraftSchema,
  bodyExample: draftExample,
  response: snapshotSchema,
  successStatus: 201,
  idempotent: true,
});

export const saveSnapshot = defineEndpoint({
  method: 'PUT',
  path: '/desks/:deskId/market-data/:snapshotId',
  access: 'enter-market-data',
  summary: 'Save a draft with all its numbers',
  params: snapshotParams,
  body: snapshotSavingSchema,
  bodyExample: { ...draftExample, version: 0 },
  response: snapshotSchema,
});

export const snapshotApprovalSchema = z.strictObject({
  version: versionSchema,
  confirmedWarnings: warningKeysSchema,
});

export const approveSnapshot = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/market-data/:snapshotId/approval',
  access: 'approve-market-data',
  summary: 'Approve a draft; never one’s own. An approved close of that day is superseded',
  params: snapshotParams,
  body: snapshotApprovalSchema,
  bodyExample: { version: 0, confirmedWarnings: [] },
  response: snapshotSchema,
  stepUp: true,
});

export const restateSnapshot = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/market-data/:snapshotId/restatement',
  access: 'enter-market-data',
  summary: 'Start a new draft from an approved close, with a reason',
  params: snapshotParams,
  body: z.strictObject({ reason: reasonSchema }),
  bodyExample: { reason: 'The exchange has corrected its settlement price' },
  response: snapshotSchema,
  successStatus: 201,
  idempotent: true,
});

/** Of the file itself, before it is written as text. */
export const largestFileBytes = 1_048_576;
/** Base64 takes four characters for three bytes, and the rest of the body some more. */
const largestCheckBytes = Math.ceil(largestFileBytes / 3) * 4 + 4_096;

export const marketFileProblemSchema = z.object({
  row: countOf('row', 'Row of the file, its headings being row 1; 0 for the whole file'),
  column: z.string().nullable().describe('Heading of the column; null for the whole row'),
  code: z.string().describe('Kind of problem'),
  message: z.string().describe('What to do, in a sentence'),
});
export type MarketFileProblem = z.infer<typeof marketFileProblemSchema>;

export const marketFileReportSchema = z.object({
  rowCount: countOf('rows', 'Rows below the headings'),
  problems: z.array(marketFileProblemSchema).describe('Everything that stands in the way'),
  problemCount: countOf('problems', 'All of them, also those that the list leaves out'),
  quotes: z.array(closeQuoteSchema).describe('What was read; empty while there are problems'),
  missing: z.array(z.string()).describe('Symbols of the desk that the file does not have'),
});
export type MarketFileReport = z.infer<typeof marketFileReportSchema>;

export const checkMarketFile = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/market-data-file',
  access: 'enter-market-data',
  summary: 'Read a CSV file of closes and list its problems; nothing is written',
  params: deskParamsSchema,
  body: z.strictObject({
    content: z.base64('Send the file’s bytes in base64.').describe('Bytes of the file, base64'),
  }),
  bodyExample: { content: 'c3ltYm9sLHByaWNlLHJhdGUgJSx5aWVsZCAlLHZvbGF0aWxpdHkgJQ==' },
  bodyLimitBytes: largestCheckBytes,
  response: marketFileReportSchema,
});
