import { z } from 'zod';
import { ladderSeries, methodNames, orderVerdicts } from '@/pricing/contract';
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
import { exerciseSchema, marketSchema, methodSettingsSchema, optionKindSchema } from './pricing';

export const studyStatuses = [
  'queued',
  'running',
  'finished',
  'cancelled',
  'signed-off',
  'sent-back',
] as const;
export const studyStatusSchema = z.enum(studyStatuses).describe('How far the study is');
export type StudyStatus = z.infer<typeof studyStatusSchema>;

export const studySources = ['trade', 'quote', 'free'] as const;

const methodSchema = z.enum(methodNames);
const seriesSchema = z.enum(ladderSeries).describe('Rows that belong together');
const countOf = (unit: string, description: string) =>
  z.number().int().min(0).meta({ unit, description });

/** What is studied: the terms that a price depends on, and nothing of a position. */
export const studyTermsSchema = z.strictObject({
  underlyingId: idSchema,
  kind: optionKindSchema,
  exercise: exerciseSchema,
  strike: positiveDecimalSchema.describe('Strike in the quote currency'),
  expiryDate: dateSchema.describe('Day of expiry, at the desk’s cut-off'),
  market: marketSchema,
  pricedAt: instantSchema.describe('Valuation instant'),
});
export type StudyTerms = z.infer<typeof studyTermsSchema>;

export const studyRows = { min: 3, max: 8 } as const;
export const studyFirstSize = { min: 32, max: 512 } as const;

export const studyLadderSchema = z.strictObject({
  name: methodSchema.describe('Method to study'),
  firstSize: z
    .number()
    .int('Give a whole number of steps.')
    .min(studyFirstSize.min, `Start with at least ${studyFirstSize.min} steps.`)
    .max(studyFirstSize.max, `Start with at most ${studyFirstSize.max} steps.`)
    .optional()
    .meta({ unit: 'steps', description: 'First size; the method’s coarsest where left out' }),
  rows: z
    .number()
    .int('Give a whole number of rows.')
    .min(studyRows.min, `An order needs at least ${studyRows.min} rows.`)
    .max(studyRows.max, `A ladder has at most ${studyRows.max} rows.`)
    .meta({ unit: 'rows', description: 'Sizes, each at least twice the one before' }),
});
export type StudyLadder = z.infer<typeof studyLadderSchema>;

export const studyDraftSchema = z.strictObject({
  source: z
    .discriminatedUnion('kind', [
      z.strictObject({ kind: z.literal('quote').describe('A saved quote'), quoteId: idSchema }),
      z.strictObject({
        kind: z.literal('trade').describe('A trade, on an approved close'),
        tradeId: idSchema,
        snapshotId: idSchema
          .nullable()
          .describe('The close, at whose instant it is priced; null: the last approved one'),
      }),
      z.strictObject({
        kind: z.literal('free').describe('Terms of one’s own'),
        terms: studyTermsSchema.describe('The terms'),
      }),
    ])
    .describe('What is studied'),
  ladders: z
    .array(studyLadderSchema)
    .min(1, 'Choose at least one method.')
    .max(methodNames.length, 'Choose each method once.')
    .refine((ladders) => new Set(ladders.map(({ name }) => name)).size === ladders.length, {
      message: 'Choose each method once.',
    })
    .describe('The methods and their ladders'),
});
export type StudyDraft = z.infer<typeof studyDraftSchema>;

const findingOf = (unit: string, description: string) => numberOf(unit, description).nullable();

export const orderFitSchema = z.object({
  series: seriesSchema,
  points: countOf('rows', 'Rows that the order was fitted to'),
  order: findingOf('order', 'Observed order'),
  standardError: findingOf('order', 'Its standard error'),
  halfWidth: findingOf('order', 'Half the width of its 95 % interval'),
  verdict: z.enum(orderVerdicts).describe('Against the order that the method promises'),
});

const studyRowSchema = z.object({
  ordinal: countOf('count', 'Place in the ladder'),
  series: seriesSchema,
  size: countOf('steps', 'Space steps of a grid, steps of a walk'),
  settings: methodSettingsSchema.describe('Settings of the method'),
  pastLimit: z.boolean().describe('Run past the stability limit on purpose'),
  value: findingOf('quote currency per unit', 'Value of one unit'),
  failure: z.string().nullable().describe('Why there is no value'),
  warning: z.string().nullable().describe('What to know about this value'),
  stability: findingOf('count', 'k/h² of the grid'),
  amplification: findingOf('count', 'Largest factor of a wave per step'),
  milliseconds: numberOf('ms', 'Fastest of up to three runs'),
  error: findingOf('quote currency per unit', 'Distance from the reference'),
  ratio: findingOf('count', 'Error of the row before over this one’s'),
  order: findingOf('order', 'Observed order from the row before to this one'),
  richardson: findingOf('quote currency per unit', 'Extrapolated from this row and the one before'),
  settledDigits: countOf('digits', 'Leading digits that all later rows keep'),
  belowReference: z.boolean().describe('The error is not above the reference’s own'),
});
export type StudyRowOnTheWire = z.infer<typeof studyRowSchema>;

const studyRouteSchema = z.object({
  name: methodSchema.describe('The method'),
  theoreticalOrder: numberOf('order', 'Order that the method promises'),
  planned: countOf('rows', 'Rows that the ladder has'),
  rows: z.array(studyRowSchema).describe('Rows computed so far, in order'),
  fits: z.array(orderFitSchema).describe('One order a series'),
});
export type StudyRoute = z.infer<typeof studyRouteSchema>;

const studiedUnderlyingSchema = z.object({
  id: idSchema,
  symbol: z.string().describe('Short name'),
  name: z.string().describe('Full name'),
  currency: currencySchema,
  unit: z.string().describe('What one unit is'),
  priceDecimals: countOf('decimals', 'Decimals that a price is shown with'),
});

export const studySummarySchema = z.object({
  id: idSchema,
  number: z.string().describe('Number of the study on its desk'),
  source: z.enum(studySources).describe('What it is a study of'),
  quote: z
    .object({ id: idSchema, number: z.string().describe('Number of the quote') })
    .nullable()
    .describe('The quote that it is a study of'),
  trade: z
    .object({ id: idSchema, number: z.string().describe('Number of the trade') })
    .nullable()
    .describe('The trade that it is a study of'),
  underlying: studiedUnderlyingSchema.describe('Underlying'),
  kind: optionKindSchema,
  exercise: exerciseSchema,
  strike: decimalSchema.describe('Strike in the quote currency'),
  expiryDate: dateSchema,
  status: studyStatusSchema,
  total: countOf('rows', 'Rows of all ladders'),
  done: countOf('rows', 'Rows computed so far'),
  orders: z
    .array(
      z.object({
        name: methodSchema.describe('The method'),
        theoreticalOrder: numberOf('order', 'Order that the method promises'),
        fits: z.array(orderFitSchema).describe('One order a series'),
      }),
    )
    .describe('What a finished study found, a method each'),
  startedBy: personSchema,
  createdAt: instantSchema,
});
export type StudySummary = z.infer<typeof studySummarySchema>;

export const studySchema = studySummarySchema.omit({ orders: true }).extend({
  market: marketSchema,
  pricedAt: instantSchema.describe('Valuation instant'),
  expiryYears: numberOf('year', 'Time to expiry, ACT/365 Fixed'),
  engine: z.string().describe('Version of the engine'),
  reference: z
    .object({
      method: methodSettingsSchema.describe('Method and sizes'),
      value: numberOf('quote currency per unit', 'Its value'),
      errorEstimate: numberOf('quote currency per unit', 'Its own error estimate'),
    })
    .describe('What the errors are measured against'),
  routes: z.array(studyRouteSchema).describe('The methods, each with its table'),
  finishedAt: instantSchema.nullable(),
  decision: z
    .object({
      by: personSchema,
      at: instantSchema,
      comment: z.string().describe('What was said with it'),
    })
    .nullable()
    .describe('Who signed it off or sent it back'),
  version: countOf('count', 'Version of the record'),
});
export type Study = z.infer<typeof studySchema>;

const studyParamsSchema = deskParamsSchema.extend({ studyId: idSchema });

export const createStudy = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/studies',
  access: 'run-studies',
  summary: 'Start a convergence study, in the background',
  params: deskParamsSchema,
  body: studyDraftSchema,
  bodyExample: {
    source: { kind: 'quote', quoteId: '00000000-0000-4000-8000-000000000000' },
    ladders: [{ name: 'heat-crank-nicolson', rows: 5 }],
  },
  response: studySchema,
  successStatus: 201,
  idempotent: true,
});

export const listStudies = defineEndpoint({
  method: 'GET',
  path: '/desks/:deskId/studies',
  access: 'read-desk',
  summary: 'Studies of the desk, newest first',
  params: deskParamsSchema,
  query: pageQuerySchema.extend({
    status: studyStatusSchema.optional(),
    quoteId: idSchema.optional().describe('Only studies of this quote'),
    tradeId: idSchema.optional().describe('Only studies of this trade'),
  }),
  response: pageOf(studySummarySchema),
});

export const getStudy = defineEndpoint({
  method: 'GET',
  path: '/desks/:deskId/studies/:studyId',
  access: 'read-desk',
  summary: 'One study with its rows as far as they are computed',
  params: studyParamsSchema,
  response: studySchema,
});

export const getStudyFile = defineEndpoint({
  method: 'GET',
  path: '/desks/:deskId/studies/:studyId/file',
  access: 'read-desk',
  summary: 'The rows of a study as CSV',
  params: studyParamsSchema,
  response: z.object({
    fileName: z.string().describe('Name of the file'),
    csv: z.string().describe('The rows, RFC 4180'),
  }),
});

export const cancelStudy = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/studies/:studyId/cancel',
  access: 'run-studies',
  summary: 'Stop a study that is still computing; its rows stay',
  params: studyParamsSchema,
  response: studySchema,
});

export const studyDecisionSchema = z.strictObject({
  version: countOf('count', 'Version that was read'),
  comment: z
    .string()
    .trim()
    .min(8, 'Give a comment of at least 8 characters; others will read it.')
    .max(500, 'Keep the comment below 500 characters.')
    .describe('What to say with it'),
});

const decisionExample = { version: 0, comment: 'The orders are those of the schemes.' };

export const signOffStudy = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/studies/:studyId/sign-off',
  access: 'sign-off-studies',
  summary: 'Sign off a finished study that someone else started',
  params: studyParamsSchema,
  body: studyDecisionSchema,
  bodyExample: decisionExample,
  response: studySchema,
  stepUp: true,
});

export const sendBackStudy = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/studies/:studyId/send-back',
  access: 'sign-off-studies',
  summary: 'Send a finished study back to whoever started it, with a comment',
  params: studyParamsSchema,
  body: studyDecisionSchema,
  bodyExample: decisionExample,
  response: studySchema,
});
