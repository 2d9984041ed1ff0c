/** The one table of errors: code → HTTP status, whether a retry may help, and the sentence shown. */
import { z } from 'zod';

type ErrorRow = { status: number; retryable: boolean; sentence: string };

const errorTable = {
  'validation-failed': {
    status: 422,
    retryable: false,
    sentence: 'Some fields need another look; each one says what to do.',
  },
  'malformed-request': {
    status: 400,
    retryable: false,
    sentence: 'The request is not readable JSON.',
  },
  'request-too-large': {
    status: 413,
    retryable: false,
    sentence: 'The request is larger than this endpoint takes.',
  },
  'not-signed-in': { status: 401, retryable: false, sentence: 'Sign in to go on.' },
  'sign-in-failed': {
    status: 401,
    retryable: false,
    sentence: 'E-mail or password is not right.',
  },
  'session-ended': {
    status: 401,
    retryable: false,
    sentence: 'Your session has ended. Sign in again; what you typed is still here.',
  },
  'too-many-attempts': {
    status: 429,
    retryable: true,
    sentence: 'Too many attempts. Wait a few minutes, then try again.',
  },
  'origin-refused': {
    status: 403,
    retryable: false,
    sentence: 'This request did not come from the tool’s own pages.',
  },
  'not-a-member': { status: 403, retryable: false, sentence: 'You are not a member of this desk.' },
  suspended: {
    status: 403,
    retryable: false,
    sentence: 'Your membership of this desk is suspended. The desk head can say why.',
  },
  'not-permitted': {
    status: 403,
    retryable: false,
    sentence: 'Your role on this desk does not include this.',
  },
  'step-up-required': {
    status: 403,
    retryable: false,
    sentence: 'Enter your password again to confirm this.',
  },
  'own-record': {
    status: 403,
    retryable: false,
    sentence: 'This needs someone else: nobody changes their own permissions.',
  },
  'own-trade': {
    status: 403,
    retryable: false,
    sentence: 'This needs someone else than who proposed the trade or amended it last.',
  },
  'move-not-allowed': {
    status: 409,
    retryable: false,
    sentence: 'This cannot be done with the trade as it stands now.',
  },
  'own-work': {
    status: 403,
    retryable: false,
    sentence: 'This needs someone else: nobody approves or signs off their own work.',
  },
  'control-role': {
    status: 403,
    retryable: false,
    sentence: 'Risk officers and auditors are appointed by the firm’s administrator only.',
  },
  'segregation-broken': {
    status: 409,
    retryable: false,
    sentence: 'One person may not hold both of these permissions on one desk.',
  },
  'not-found': { status: 404, retryable: false, sentence: 'There is no such record on this desk.' },
  'stale-version': {
    status: 409,
    retryable: false,
    sentence: 'Someone changed this record meanwhile. Read it again, then repeat your change.',
  },
  'wrong-state': {
    status: 409,
    retryable: false,
    sentence: 'The record is no longer in a state that allows this. Read it again.',
  },
  'idempotency-key-missing': {
    status: 400,
    retryable: false,
    sentence: 'This request needs an Idempotency-Key header (a UUID).',
  },
  'idempotency-key-reused': {
    status: 409,
    retryable: false,
    sentence: 'This key was already used for other content.',
  },
  'cannot-price': {
    status: 422,
    retryable: false,
    sentence: 'No route could price these terms; each field says why.',
  },
  'method-not-allowed': {
    status: 405,
    retryable: false,
    sentence: 'This address does not take this method.',
  },
  'not-ready': {
    status: 503,
    retryable: true,
    sentence: 'The service is starting or has lost its database. Try again in a moment.',
  },
  unexpected: {
    status: 500,
    retryable: true,
    sentence: 'Something went wrong on our side. The request id helps us find it.',
  },
} as const satisfies Record<string, ErrorRow>;

export type ErrorCode = keyof typeof errorTable;

export const errorCodes = Object.keys(errorTable) as ErrorCode[];

export const errorRow = (code: ErrorCode): ErrorRow => errorTable[code];

export const isErrorCode = (text: string): text is ErrorCode => Object.hasOwn(errorTable, text);

/** One field's complaint. `path` is dotted, as in `terms.strike`; empty means the whole body. */
export const issueSchema = z.strictObject({
  path: z.string().describe('Dotted path of the field; empty for the whole body'),
  code: z.string().describe('Short name of the complaint'),
  message: z.string().describe('One sentence that says what to do'),
});
export type Issue = z.infer<typeof issueSchema>;

/** RFC 9457 problem document with a code, every issue and the request's id. */
export const problemSchema = z.object({
  type: z.string().describe('URI of the kind of problem'),
  title: z.string().describe('The sentence shown to the person'),
  status: z.number().int().meta({ unit: 'HTTP status', description: 'HTTP status code' }),
  code: z.string().describe('Code of the error table'),
  requestId: z.string().describe('Id under which the server logged the request'),
  issues: z.array(issueSchema).describe('Every complaint about the request, with its path'),
});
export type Problem = z.infer<typeof problemSchema>;

/** An operating error with a code of the table; programmers' mistakes throw plain errors instead. */
export class AppError extends Error {
  readonly code: ErrorCode;
  readonly issues: Issue[];

  constructor(code: ErrorCode, issues: Issue[] = []) {
    super(errorTable[code].sentence);
    this.name = 'AppError';
    this.code = code;
    this.issues = issues;
  }
}
