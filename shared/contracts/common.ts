/** Pieces that several contracts share: ids, dates, decimals, numbers with units, pages. */
import { z } from 'zod';

export const idSchema = z.uuid().describe('Identifier of a record');

export const dateSchema = z.iso
  .date('Give a date as YYYY-MM-DD.')
  .describe('Calendar date, ISO 8601');

export const instantSchema = z.iso
  .datetime({ offset: true, message: 'Give an instant with its offset, ISO 8601.' })
  .describe('Instant, ISO 8601');

export const currencySchema = z
  .string()
  .regex(/^[A-Z]{3}$/, 'Give a currency by its ISO 4217 code.')
  .describe('Currency, ISO 4217');

/** A booked amount: a decimal string from end to end, never a binary number. */
export const decimalSchema = z
  .string()
  .regex(/^-?\d{1,15}(\.\d{1,10})?$/, 'Give a plain decimal number, such as 1250.5.')
  .describe('Decimal number as text');

export const positiveDecimalSchema = decimalSchema.refine((text) => Number(text) > 0, {
  message: 'This must be more than zero.',
});

/** A double with its unit, so that no number crosses the wire without saying what it measures. */
export const numberOf = (unit: string, description: string) =>
  z.number().meta({ unit, description });

export const reasonSchema = z
  .string()
  .trim()
  .min(8, 'Give a reason of at least 8 characters; others will read it.')
  .max(500, 'Keep the reason below 500 characters.')
  .describe('Why, in the words of whoever did it');

export const personSchema = z
  .object({ id: idSchema, name: z.string().describe('Name shown to others') })
  .describe('A person');

export const deskParamsSchema = z.strictObject({ deskId: idSchema });

export const maximumPageSize = 200;

/** Keyset pages: the cursor is opaque and comes from the page before. */
export const pageQuerySchema = z.strictObject({
  cursor: z.string().max(500).optional().describe('Where the page before ended'),
  limit: z.coerce
    .number()
    .int()
    .min(1)
    .max(maximumPageSize)
    .default(50)
    .meta({ unit: 'rows', description: 'Rows on a page' }),
});

export const pageOf = <Item extends z.ZodType>(item: Item) =>
  z.object({
    items: z.array(item).describe('The rows of this page, in order'),
    nextCursor: z.string().nullable().describe('Cursor of the next page; null on the last one'),
  });
