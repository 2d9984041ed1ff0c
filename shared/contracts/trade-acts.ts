/** What people do to trades: each act with what it sends, and the trade as it stands after. */
import { z } from 'zod';
import { defineEndpoint } from '../endpoint';
import {
  currencySchema,
  dateSchema,
  decimalSchema,
  deskParamsSchema,
  idSchema,
  reasonSchema,
} from './common';
import { dealSchema, tradedTermsSchema, tradeParams, tradeSchema } from './trades';

const versionLockSchema = z
  .number()
  .int()
  .min(0)
  .meta({ unit: 'count', description: 'Version of the trade that this was made against' });

export const tradeProposalSchema = dealSchema.extend({
  quoteId: idSchema.describe('Quote that the terms are taken from'),
  bookId: idSchema.describe('Book that the trade goes on'),
});
export type TradeProposal = z.infer<typeof tradeProposalSchema>;

export const tradeAmendmentSchema = dealSchema.extend({
  ...tradedTermsSchema.shape,
  reason: reasonSchema,
  version: versionLockSchema,
});
export type TradeAmendment = z.infer<typeof tradeAmendmentSchema>;

const exampleId = '00000000-0000-4000-8000-000000000000';

const dealExample = {
  counterparty: 'Grenmoor Mills',
  premiumAmount: '6750.00',
  premiumCurrency: 'EUR',
  premiumDate: '2026-12-03',
  tradedAt: '2026-07-01T10:05:00Z',
  note: '',
};

export const proposeTrade = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/trades',
  access: 'propose-trades',
  summary: 'Propose a trade on the terms of a quote',
  params: deskParamsSchema,
  body: tradeProposalSchema,
  bodyExample: { ...dealExample, quoteId: exampleId, bookId: exampleId },
  response: tradeSchema,
  successStatus: 201,
  idempotent: true,
});

export const amendTrade = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/trades/:tradeId/versions',
  access: 'propose-trades',
  summary: 'Propose a new version; terms in force stay so until it is approved',
  params: tradeParams,
  body: tradeAmendmentSchema,
  bodyExample: {
    ...dealExample,
    direction: 'sell',
    quantity: '12',
    contractSize: '50',
    kind: 'put',
    exercise: 'american',
    strike: '210',
    expiryDate: '2030-06-03',
    reason: 'Two more lots were agreed by phone',
    version: 0,
  },
  response: tradeSchema,
  successStatus: 201,
  idempotent: true,
});

export const approveTrade = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/trades/:tradeId/approval',
  access: 'approve-trades',
  summary: 'Approve the version that waits; never one’s own',
  params: tradeParams,
  body: z.strictObject({ version: versionLockSchema }),
  bodyExample: { version: 0 },
  response: tradeSchema,
  stepUp: true,
});

export const returnTrade = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/trades/:tradeId/return',
  access: 'approve-trades',
  summary: 'Return the version that waits, with a reason; never one’s own',
  params: tradeParams,
  body: z.strictObject({ reason: reasonSchema, version: versionLockSchema }),
  bodyExample: { reason: 'The premium does not match the quote', version: 0 },
  response: tradeSchema,
  stepUp: true,
});

export const tradeClosingSchema = z.strictObject({
  date: dateSchema.describe('Day on which it was closed'),
  amount: decimalSchema.describe('What the desk received; negative when it paid'),
  currency: currencySchema.describe('Currency of that amount'),
  reason: reasonSchema,
  version: versionLockSchema,
});

export const closeTrade = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/trades/:tradeId/closing',
  access: 'approve-trades',
  summary: 'Record that a live trade was closed before its end; never one’s own',
  params: tradeParams,
  body: tradeClosingSchema,
  bodyExample: {
    date: '2026-07-01',
    amount: '-1250.00',
    currency: 'EUR',
    reason: 'Bought back at the client’s wish',
    version: 1,
  },
  response: tradeSchema,
  stepUp: true,
});

export const tradeExpirySchema = z.strictObject({
  outcome: z.enum(['lapsed', 'exercised']).describe('Whether the holder exercised'),
  date: dateSchema.describe('Day on which it lapsed or was exercised'),
  version: versionLockSchema,
});

export const recordExpiry = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/trades/:tradeId/expiry',
  access: 'propose-trades',
  summary: 'Record that a trade lapsed or was exercised',
  params: tradeParams,
  body: tradeExpirySchema,
  bodyExample: { outcome: 'exercised', date: '2026-07-01', version: 1 },
  response: tradeSchema,
  stepUp: true,
});
