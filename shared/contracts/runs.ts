/** Valuation runs: every live trade of some books on one approved close, by two routes. */
import { z } from 'zod';
import { defineEndpoint } from '../endpoint';
import { positionSchema } from './chain';
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
  reasonSchema,
} from './common';
import { routeSchema, verdictSchema } from './pricing';
import { quotedUnderlyingSchema } from './quotes';
import { lastValuationSchema, tradedTermsSchema } from './trades';

export const runStatuses = ['queued', 'running', 'finished', 'cancelled', 'signed-off'] as const;
export const runStatusSchema = z.enum(runStatuses).describe('How far the run is');
export type RunStatus = z.infer<typeof runStatusSchema>;

const countOf = (unit: string, description: string) =>
  z.number().int().min(0).meta({ unit, description });

const namedRunSchema = z.object({
  id: idSchema,
  number: z.string().describe('Number of the run on its desk'),
});

const bookNameSchema = z
  .object({
    id: idSchema,
    code: z.string().describe('Short name of the book'),
    name: z.string().describe('Full name of the book'),
  })
  .describe('A book');

/** Each trade counts once among the first five; those whose estimate was refuted count besides. */
export const runCountsSchema = z
  .object({
    agree: countOf('trades', 'Trades whose routes agree'),
    wide: countOf('trades', 'Trades whose routes are too rough to tell'),
    disagree: countOf('trades', 'Trades whose routes disagree'),
    oneRoute: countOf('trades', 'Trades with nothing to compare their value with'),
    failed: countOf('trades', 'Trades of which a route gave no value'),
    refuted: countOf('trades', 'Trades of which an error estimate was refuted'),
  })
  .describe('What was found so far');
export type RunCounts = z.infer<typeof runCountsSchema>;

export const runSummarySchema = z.object({
  ...namedRunSchema.shape,
  status: runStatusSchema,
  version: countOf('count', 'To be given back with the sign-off'),
  snapshot: z
    .object({ id: idSchema, date: dateSchema.describe('Day of the close') })
    .describe('The close that it values on'),
  policy: z
    .object({ id: idSchema, number: countOf('count', 'Number of the policy on its desk') })
    .describe('The pricing policy that it follows'),
  books: z.array(bookNameSchema).describe('The books that it values, by code'),
  valuedAt: instantSchema.describe('Valuation instant: the desk’s cut-off on the day of the close'),
  total: countOf('trades', 'Trades to value'),
  done: countOf('trades', 'Trades valued so far'),
  leftOut: countOf('trades', 'Live trades that had expired by then, or were agreed only later'),
  counts: runCountsSchema,
  exceptions: countOf('exceptions', 'Exceptions found so far'),
  openExceptions: countOf('exceptions', 'Exceptions without an answer'),
  rerunOf: namedRunSchema.nullable().describe('The run that this one repeats'),
  startedBy: personSchema,
  startedAt: instantSchema,
  finishedAt: instantSchema.nullable().describe('When its last trade was valued'),
  cancellation: z
    .object({ by: personSchema, at: instantSchema })
    .nullable()
    .describe('Who stopped it; what was valued before stays'),
  signOff: z
    .object({ by: personSchema, at: instantSchema, comment: z.string().describe('What was said') })
    .nullable()
    .describe('Who signed it off'),
});
export type RunSummary = z.infer<typeof runSummarySchema>;

/** Amounts of different currencies are never added. */
export const runTotalSchema = z.object({
  currency: currencySchema,
  total: decimalSchema.describe('Value of all positions; positive when the desk holds it'),
  before: decimalSchema.nullable().describe('The same in the run before; null where it has none'),
  change: decimalSchema.nullable().describe('Change since the run before'),
});
export type RunTotal = z.infer<typeof runTotalSchema>;

export const runSchema = runSummarySchema.extend({
  engine: z.string().describe('Version of the engine'),
  reruns: z
    .array(namedRunSchema.extend({ status: runStatusSchema }))
    .describe('Runs that repeat this one, oldest first'),
  before: namedRunSchema
    .extend({ date: dateSchema.describe('Day of its close') })
    .nullable()
    .describe('The last finished run of the same books on an earlier close'),
  totals: z.array(runTotalSchema).describe('By currency; empty until the run has finished'),
  makerIds: z
    .array(idSchema)
    .describe('Whoever started it, touched one of its trades or overrode a value: cannot sign off'),
});
export type Run = z.infer<typeof runSchema>;

export const exceptionKinds = ['failure', 'disagree', 'refuted', 'unchecked', 'wide'] as const;
export const exceptionKindSchema = z
  .enum(exceptionKinds)
  .describe('What is wrong, the gravest first: one kind a trade');
export type ExceptionKind = z.infer<typeof exceptionKindSchema>;

export const exceptionStates = ['open', 'answered'] as const;
export const exceptionStateSchema = z.enum(exceptionStates).describe('Whether it has its answer');

export const exceptionAnswerSchema = z.discriminatedUnion('kind', [
  z.object({
    kind: z.literal('study').describe('A convergence study'),
    by: personSchema,
    at: instantSchema,
    study: z
      .object({ id: idSchema, number: z.string().describe('Number of the study on its desk') })
      .describe('The study'),
    reason: z.string().describe('What the study shows'),
  }),
  z.object({
    kind: z.literal('override').describe('A note by someone who had no hand in it'),
    by: personSchema,
    at: instantSchema,
    value: decimalSchema
      .nullable()
      .describe('Value per unit to use beside the model value, which stays; null: the model’s'),
    reason: z.string().describe('Why'),
  }),
  z.object({
    kind: z.literal('rerun').describe('A run that repeated this one, in which the routes agree'),
    by: personSchema,
    at: instantSchema,
    run: namedRunSchema.describe('That run'),
  }),
]);
export type ExceptionAnswer = z.infer<typeof exceptionAnswerSchema>;

export const runExceptionSchema = z.object({
  id: idSchema,
  kind: exceptionKindSchema,
  state: exceptionStateSchema,
  materiality: decimalSchema
    .nullable()
    .describe(
      'How far the routes lie apart on the whole position, in the quote currency; null where a route gave no value',
    ),
  makerIds: z
    .array(idSchema)
    .describe('Whoever started the run or touched the trade: cannot answer by a note'),
  answer: exceptionAnswerSchema.nullable().describe('Null while it is open'),
});
export type RunException = z.infer<typeof runExceptionSchema>;

/** One trade of a run. */
export const runValuationSchema = z.object({
  position: positionSchema.describe('Place of the primary entry in the chain of valuations'),
  trade: z
    .object({ id: idSchema, number: z.string().describe('Number of the trade on its desk') })
    .describe('The trade'),
  tradeVersionId: idSchema.describe('The version of its terms that was valued'),
  book: bookNameSchema,
  underlying: quotedUnderlyingSchema,
  terms: tradedTermsSchema.describe('The terms that were valued'),
  primary: routeSchema.describe('The route that values the trade'),
  check: routeSchema.describe('The route that checks the value'),
  tolerance: numberOf('quote currency per unit', 'Tolerance that the verdict used'),
  verdict: verdictSchema,
  refuted: z.boolean().describe('Whether an error estimate was refuted by the other route'),
  strip: lastValuationSchema.shape.strip,
  total: decimalSchema
    .nullable()
    .describe('Value of the position in the quote currency; null where there is no value'),
  before: z
    .object({
      run: namedRunSchema.describe('The run'),
      valuedAt: instantSchema.describe('Its valuation instant'),
      value: numberOf('quote currency per unit', 'Value of one unit then'),
    })
    .nullable()
    .describe('The value of the trade in the last finished run on an earlier close'),
  change: numberOf('quote currency per unit', 'Change since that value').nullable(),
  exception: runExceptionSchema.nullable().describe('Null where nothing is wrong'),
});
export type RunValuation = z.infer<typeof runValuationSchema>;

export const exceptionalValuationSchema = runValuationSchema.extend({
  exception: runExceptionSchema.describe('What is wrong, and its answer'),
});
export type ExceptionalValuation = z.infer<typeof exceptionalValuationSchema>;

const exampleId = '00000000-0000-4000-8000-000000000000';

const runParams = deskParamsSchema.extend({ runId: idSchema });
const exceptionParams = runParams.extend({ exceptionId: idSchema });

export const listRuns = defineEndpoint({
  method: 'GET',
  path: '/desks/:deskId/runs',
  access: 'read-desk',
  summary: 'Valuation runs of the desk, newest first',
  params: deskParamsSchema,
  query: pageQuerySchema.extend({
    status: runStatusSchema.optional(),
    bookId: idSchema.optional().describe('Only runs of this book'),
  }),
  response: pageOf(runSummarySchema),
});

export const runDraftSchema = z.strictObject({
  bookIds: z
    .array(idSchema)
    .min(1, 'Choose at least one book.')
    .max(100, 'Choose at most a hundred books.')
    .refine((ids) => new Set(ids).size === ids.length, { message: 'Choose each book once.' })
    .describe('The books to value'),
  snapshotId: idSchema.describe('The approved close to value on'),
});
export type RunDraft = z.infer<typeof runDraftSchema>;

export const createRun = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/runs',
  access: 'start-runs',
  summary: 'Start a valuation run, in the background; a book is in one run at a time',
  params: deskParamsSchema,
  body: runDraftSchema,
  bodyExample: { bookIds: [exampleId], snapshotId: exampleId },
  response: runSchema,
  successStatus: 201,
  idempotent: true,
});

export const getRun = defineEndpoint({
  method: 'GET',
  path: '/desks/:deskId/runs/:runId',
  access: 'read-desk',
  summary: 'One run with its progress and what it found so far',
  params: runParams,
  response: runSchema,
});

export const cancelRun = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/runs/:runId/cancel',
  access: 'start-runs',
  summary: 'Stop a run that is not finished; what was valued stays in the history',
  params: runParams,
  response: runSchema,
});

export const rerunRun = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/runs/:runId/rerun',
  access: 'start-runs',
  summary: 'Run the same books on the same close again; answers the exceptions that then agree',
  params: runParams,
  response: runSchema,
  successStatus: 201,
  idempotent: true,
});

export const listRunValuations = defineEndpoint({
  method: 'GET',
  path: '/desks/:deskId/runs/:runId/valuations',
  access: 'read-desk',
  summary: 'What a run found for each trade so far, exceptions first, the gravest on top',
  params: runParams,
  query: pageQuerySchema.extend({
    verdict: verdictSchema.optional(),
    bookId: idSchema.optional().describe('Only trades on this book'),
  }),
  response: pageOf(runValuationSchema),
});

export const listRunExceptions = defineEndpoint({
  method: 'GET',
  path: '/desks/:deskId/runs/:runId/exceptions',
  access: 'read-desk',
  summary: 'Exceptions of a run: open ones first, by kind, the largest on top',
  params: runParams,
  query: pageQuerySchema.extend({
    state: exceptionStateSchema.optional(),
    kind: exceptionKindSchema.optional(),
  }),
  response: pageOf(exceptionalValuationSchema),
});

export const getRunException = defineEndpoint({
  method: 'GET',
  path: '/desks/:deskId/runs/:runId/exceptions/:exceptionId',
  access: 'read-desk',
  summary: 'One exception with the values that it is about',
  params: exceptionParams,
  response: exceptionalValuationSchema,
});

export const overrideSchema = z.strictObject({
  value: decimalSchema
    .nullable()
    .describe('Value per unit to use beside the model value; null where the model’s is kept'),
  reason: reasonSchema,
});

export const answerByOverride = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/runs/:runId/exceptions/:exceptionId/override',
  access: 'start-runs',
  summary: 'Answer an exception by a note; never of one’s own run or trade',
  params: exceptionParams,
  body: overrideSchema,
  bodyExample: { value: '12.75', reason: 'The dealer’s own mark, confirmed by two others' },
  response: exceptionalValuationSchema,
  stepUp: true,
});

export const studyAnswerSchema = z.strictObject({
  studyId: idSchema.describe('A finished or signed-off study of the same terms'),
  reason: reasonSchema,
});

export const answerByStudy = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/runs/:runId/exceptions/:exceptionId/study',
  access: 'run-studies',
  summary: 'Answer an exception by a convergence study of the trade’s terms',
  params: exceptionParams,
  body: studyAnswerSchema,
  bodyExample: { studyId: exampleId, reason: 'Both routes converge on the same value' },
  response: exceptionalValuationSchema,
});

export const runSignOffSchema = z.strictObject({
  version: countOf('count', 'Version that was read'),
  comment: z
    .string()
    .trim()
    .min(8, 'Give a comment of at least 8 characters; others will read it.')
    .max(500, 'Keep the comment below 500 characters.')
    .describe('What to say with it'),
});
export type RunSignOff = z.infer<typeof runSignOffSchema>;

export const signOffRun = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/runs/:runId/sign-off',
  access: 'sign-off-runs',
  summary: 'Sign off a finished run without open exceptions; never one’s own run or trades',
  params: runParams,
  body: runSignOffSchema,
  bodyExample: { version: 0, comment: 'All exceptions were looked into and answered.' },
  response: runSchema,
  stepUp: true,
});
