import { z } from 'zod';
import { methodNames } from '@/pricing/contract';
import { defineEndpoint } from '../endpoint';
import { tradeStatuses } from '../trade-moves';
import {
  currencySchema,
  dateSchema,
  decimalSchema,
  deskParamsSchema,
  idSchema,
  instantSchema,
  numberOf,
  pageOf,
  pageQuerySchema,
  personSchema,
  positiveDecimalSchema,
} from './common';
import { exerciseSchema, optionKindSchema, verdictSchema } from './pricing';
import { directionSchema, quotedUnderlyingSchema } from './quotes';

export const tradeStatusSchema = z.enum(tradeStatuses).describe('Where the trade stands');

const nonNegativeDecimalSchema = decimalSchema.refine((text) => Number(text) >= 0, {
  message: 'This must be zero or more.',
});

/** What was agreed besides the option itself. */
export const dealSchema = z.strictObject({
  counterparty: z
    .string()
    .trim()
    .min(1, 'Say whom the trade is with.')
    .max(120, 'Keep the counterparty below 120 characters.')
    .describe('Whom the trade is with, as the desk writes it'),
  premiumAmount: nonNegativeDecimalSchema.describe('Premium of the whole trade'),
  premiumCurrency: currencySchema.describe('Currency of the premium'),
  premiumDate: dateSchema.describe('Day on which the premium is paid'),
  tradedAt: instantSchema.describe('When the trade was agreed'),
  note: z.string().trim().max(500, 'Keep the note below 500 characters.').describe('Free text'),
});
export type Deal = z.infer<typeof dealSchema>;

/** The option itself, as far as an amendment may change it. */
export const tradedTermsSchema = z.strictObject({
  direction: directionSchema,
  quantity: positiveDecimalSchema.describe('Number of lots'),
  contractSize: positiveDecimalSchema.describe('Units in one lot'),
  kind: optionKindSchema,
  exercise: exerciseSchema,
  strike: positiveDecimalSchema.describe('Strike in the quote currency'),
  expiryDate: dateSchema.describe('Day of expiry, at the desk’s cut-off'),
});
export type TradedTerms = z.infer<typeof tradedTermsSchema>;

const bookNameSchema = z
  .object({
    id: idSchema,
    code: z.string().describe('Short name of the book'),
    name: z.string().describe('Full name of the book'),
  })
  .describe('Book that the trade is on');

/** What the last run found, and how far that is from the run on the close before. */
export const lastValuationSchema = z.object({
  runId: idSchema,
  snapshotDate: dateSchema.describe('Day of the close that it was valued on'),
  value: numberOf('quote currency per unit', 'Value of one unit'),
  errorEstimate: numberOf('quote currency per unit', 'Error estimate of that value').nullable(),
  total: decimalSchema.describe(
    'Value of the position in the quote currency: positive when the desk holds it',
  ),
  change: numberOf(
    'quote currency per unit',
    'Change since the run on the close before',
  ).nullable(),
  tolerance: numberOf('quote currency per unit', 'Tolerance that the verdict used'),
  verdict: verdictSchema,
  refuted: z.boolean().describe('Whether an error estimate was refuted by another route'),
  strip: z
    .array(
      z.object({
        name: z.enum(methodNames).describe('Route'),
        value: numberOf('quote currency per unit', 'Its value'),
        errorEstimate: numberOf('quote currency per unit', 'Its error estimate').nullable(),
      }),
    )
    .describe('The routes that gave a value'),
});
export type LastValuation = z.infer<typeof lastValuationSchema>;

/** A row of a book: the terms in force, or those proposed while none are. */
export const tradeSummarySchema = z.object({
  id: idSchema,
  number: z.string().describe('Number of the trade on its desk'),
  status: tradeStatusSchema,
  book: bookNameSchema,
  underlying: quotedUnderlyingSchema,
  ...tradedTermsSchema.shape,
  expiryAt: instantSchema.describe('Instant of expiry'),
  counterparty: z.string().describe('Whom the trade is with'),
  proposedBy: personSchema,
  proposedAt: instantSchema,
  lastValuation: lastValuationSchema.nullable().describe('Null before the first run'),
});
export type TradeSummary = z.infer<typeof tradeSummarySchema>;

export const versionStates = ['proposed', 'approved', 'returned', 'superseded'] as const;

export const tradeVersionSchema = dealSchema.extend({
  ...tradedTermsSchema.shape,
  id: idSchema,
  number: z.number().int().meta({ unit: 'count', description: 'Number of the version' }),
  state: z.enum(versionStates).describe('What became of the version'),
  expiryAt: instantSchema.describe('Instant of expiry'),
  quoteId: idSchema.nullable().describe('Quote that the terms were taken from'),
  amendmentReason: z.string().nullable().describe('Why it was amended; null in the first version'),
  proposedBy: personSchema,
  proposedAt: instantSchema,
  decidedBy: personSchema.nullable(),
  decidedAt: instantSchema.nullable(),
  decisionReason: z.string().nullable().describe('Why it was returned'),
});
export type TradeVersion = z.infer<typeof tradeVersionSchema>;

export const tradeEventKinds = [
  'proposed',
  'amended',
  'approved',
  'returned',
  'closed',
  'lapsed',
  'exercised',
] as const;

/** One line of the time line, as it is sealed in the desk's chain of records. */
export const tradeEventSchema = z.object({
  position: z.number().int().meta({ unit: 'count', description: 'Place in the chain of records' }),
  event: z.enum(tradeEventKinds).describe('What happened'),
  at: instantSchema,
  by: personSchema,
  versionNumber: z
    .number()
    .int()
    .meta({ unit: 'count', description: 'Version of the terms that it concerns' }),
  reason: z.string().nullable().describe('Why, where a reason was given'),
});
export type TradeEvent = z.infer<typeof tradeEventSchema>;

export const tradeEndSchema = z.object({
  outcome: z.enum(['closed', 'lapsed', 'exercised']).describe('How the trade ended'),
  date: dateSchema.describe('Day on which it ended'),
  amount: decimalSchema
    .nullable()
    .describe('What the desk received for closing it; negative when it paid'),
  currency: currencySchema.nullable().describe('Currency of that amount'),
});
export type TradeEnd = z.infer<typeof tradeEndSchema>;

export const tradeSchema = tradeSummarySchema.extend({
  version: z
    .number()
    .int()
    .meta({ unit: 'count', description: 'To be given back with the next change' }),
  liveVersionId: idSchema.nullable().describe('Version in force; null before the first approval'),
  latestVersionId: idSchema.describe('Version proposed last'),
  versions: z.array(tradeVersionSchema).describe('Every version, newest first'),
  events: z.array(tradeEventSchema).describe('What happened, oldest first'),
  end: tradeEndSchema.nullable().describe('How it ended; null while it has not'),
});
export type Trade = z.infer<typeof tradeSchema>;

export const tradeSorts = ['number', 'underlying', 'expiry', 'value', 'change', 'total'] as const;
export type TradeSort = (typeof tradeSorts)[number];

export const sortDirections = ['ascending', 'descending'] as const;
export type SortDirection = (typeof sortDirections)[number];

/** A status, or both that wait for approval. */
export const statusFilters = ['waiting', ...tradeStatuses] as const;

export const tradeParams = deskParamsSchema.extend({ tradeId: idSchema });

export const listTrades = defineEndpoint({
  method: 'GET',
  path: '/desks/:deskId/trades',
  access: 'read-desk',
  summary: 'Trades of the desk or of one book, sorted, filtered and searched',
  params: deskParamsSchema,
  query: pageQuerySchema.extend({
    bookId: idSchema.optional().describe('Only trades on this book'),
    status: z.enum(statusFilters).optional().describe('Only trades that stand here'),
    verdict: verdictSchema.optional(),
    underlyingId: idSchema.optional().describe('Only trades on this underlying'),
    search: z
      .string()
      .trim()
      .max(100)
      .optional()
      .describe('Part of number, counterparty, symbol or name'),
    sort: z.enum(tradeSorts).default('number').describe('What the rows are ordered by'),
    direction: z.enum(sortDirections).default('descending').describe('Which way round'),
  }),
  response: pageOf(tradeSummarySchema),
});

export const getTrade = defineEndpoint({
  method: 'GET',
  path: '/desks/:deskId/trades/:tradeId',
  access: 'read-desk',
  summary: 'One trade with its versions and everything that happened to it',
  params: tradeParams,
  response: tradeSchema,
});
