import { z } from 'zod';
import { defineEndpoint } from '../endpoint';
import {
  currencySchema,
  dateSchema,
  decimalSchema,
  deskParamsSchema,
  idSchema,
  numberOf,
} from './common';
import { marketSchema } from './pricing';

export const underlyingKinds = ['share', 'index', 'currency-pair', 'future'] as const;
export type UnderlyingKind = (typeof underlyingKinds)[number];
export const underlyingKindSchema = z.enum(underlyingKinds).describe('What it is');

/** The desk's last approved close of one underlying. */
const closeSchema = z.object({
  snapshotId: idSchema,
  date: dateSchema.describe('Day of the close'),
  market: marketSchema,
});

export const underlyingSchema = z.object({
  id: idSchema,
  symbol: z.string().describe('Short name'),
  name: z.string().describe('Full name'),
  kind: underlyingKindSchema,
  currency: currencySchema.describe('Quote currency'),
  unit: z.string().describe('What one unit is, such as t or share'),
  contractSize: decimalSchema.describe('Units in one lot'),
  priceDecimals: z
    .number()
    .int()
    .meta({ unit: 'decimals', description: 'Decimals that a price is shown with' }),
  tolerance: numberOf(
    'quote currency per unit',
    'How far routes may lie apart and still agree, per unit',
  ),
  moneyTolerance: decimalSchema
    .nullable()
    .describe('The same for a whole position, in the quote currency; null where none is set'),
  close: closeSchema.nullable().describe('Last approved close; null where none is approved yet'),
});
export type Underlying = z.infer<typeof underlyingSchema>;

export const listUnderlyings = defineEndpoint({
  method: 'GET',
  path: '/desks/:deskId/underlyings',
  access: 'read-desk',
  summary: 'Underlyings of the desk with their last approved close',
  params: deskParamsSchema,
  response: z.object({ underlyings: z.array(underlyingSchema).describe('Underlyings, by name') }),
});
