import { z } from 'zod';
import { methodNames } from '@/pricing/contract';
import { defineEndpoint } from '../endpoint';
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
import {
  exerciseSchema,
  marketSchema,
  optionKindSchema,
  routeSchema,
  verdictSchema,
} from './pricing';

export const directionSchema = z.enum(['buy', 'sell']).describe('What the desk does');

/** The terms as they stand on a ticket and in a quote. */
export const quoteTermsSchema = z.strictObject({
  underlyingId: idSchema,
  direction: directionSchema,
  quantity: positiveDecimalSchema.describe('Number of lots'),
  contractSize: positiveDecimalSchema.describe('Units in one lot'),
  kind: optionKindSchema,
  exercise: exerciseSchema,
  strike: positiveDecimalSchema.describe('Strike in the quote currency'),
  expiryDate: dateSchema.describe('Day of expiry, at the desk’s cut-off'),
  market: marketSchema,
  pricedAt: instantSchema.describe('Valuation instant'),
});
export type QuoteTerms = z.infer<typeof quoteTermsSchema>;

export const quoteDraftSchema = quoteTermsSchema.extend({
  indicativeValue: numberOf(
    'quote currency per unit',
    'What the ticket showed; kept beside the server’s own value',
  ),
  note: z.string().trim().max(500, 'Keep the note below 500 characters.').describe('Free text'),
});
export type QuoteDraft = z.infer<typeof quoteDraftSchema>;

export const quotedUnderlyingSchema = z
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
  .describe('What the option is on');

/** What the list shows of a quote: enough for a row with its agreement strip. */
export const quoteSummarySchema = z.object({
  id: idSchema,
  number: z.string().describe('Number of the quote on its desk'),
  underlying: quotedUnderlyingSchema,
  direction: directionSchema,
  quantity: decimalSchema.describe('Number of lots'),
  contractSize: decimalSchema.describe('Units in one lot'),
  kind: optionKindSchema,
  exercise: exerciseSchema,
  strike: decimalSchema.describe('Strike in the quote currency'),
  expiryDate: dateSchema,
  value: numberOf('quote currency per unit', 'The server’s own value of one unit'),
  errorEstimate: numberOf('quote currency per unit', 'Error estimate of that value').nullable(),
  total: decimalSchema.describe(
    'Value of the position in the quote currency: positive when the desk holds it',
  ),
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
  createdBy: personSchema,
  createdAt: instantSchema,
});
export type QuoteSummary = z.infer<typeof quoteSummarySchema>;

export const quoteSchema = quoteSummarySchema.extend({
  market: marketSchema,
  pricedAt: instantSchema.describe('Valuation instant'),
  expiryAt: instantSchema.describe('Instant of expiry'),
  expiryYears: numberOf('year', 'Time to expiry, ACT/365 Fixed'),
  snapshotId: idSchema.nullable().describe('Approved close that the desk had then'),
  primaryRoute: z.enum(methodNames).describe('Route whose value is the quote’s value'),
  routes: z.array(routeSchema).describe('Every route with settings, Greeks and warnings'),
  indicativeValue: numberOf('quote currency per unit', 'What the ticket showed'),
  engine: z.string().describe('Version of the engine that priced it'),
  note: z.string().describe('Free text'),
});
export type Quote = z.infer<typeof quoteSchema>;

const exampleId = '00000000-0000-4000-8000-000000000000';

export const createQuote = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/quotes',
  access: 'price',
  summary: 'Save a quote, priced again by the server',
  params: deskParamsSchema,
  body: quoteDraftSchema,
  bodyExample: {
    underlyingId: exampleId,
    direction: 'sell',
    quantity: '10',
    contractSize: '500',
    kind: 'put',
    exercise: 'american',
    strike: '210',
    expiryDate: '2027-06-01',
    market: { spot: 212.4, rate: 0.03, carry: 'future', volatility: 0.245 },
    pricedAt: '2026-12-01T10:00:00Z',
    indicativeValue: 13.2343,
    note: '',
  },
  response: quoteSchema,
  successStatus: 201,
  idempotent: true,
});

export const listQuotes = defineEndpoint({
  method: 'GET',
  path: '/desks/:deskId/quotes',
  access: 'read-desk',
  summary: 'Quotes of the desk, newest first',
  params: deskParamsSchema,
  query: pageQuerySchema.extend({
    search: z.string().trim().max(100).optional().describe('Part of number, symbol or name'),
    verdict: verdictSchema.optional(),
  }),
  response: pageOf(quoteSummarySchema),
});

export const getQuote = defineEndpoint({
  method: 'GET',
  path: '/desks/:deskId/quotes/:quoteId',
  access: 'read-desk',
  summary: 'One quote with everything that it rests on',
  params: deskParamsSchema.extend({ quoteId: idSchema }),
  response: quoteSchema,
});
