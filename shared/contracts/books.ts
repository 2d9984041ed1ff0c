import { z } from 'zod';
import { defineEndpoint } from '../endpoint';
import { deskParamsSchema, idSchema } from './common';

const bookFields = {
  code: z
    .string()
    .trim()
    .toUpperCase()
    .regex(/^[A-Z0-9][A-Z0-9-]{1,11}$/, 'Give 2 to 12 letters, digits or hyphens.')
    .describe('Short name of the book, its own on the desk'),
  name: z
    .string()
    .trim()
    .min(1, 'Give the book a name.')
    .max(80, 'Keep the name below 80 characters.')
    .describe('Full name of the book'),
};

export const bookDraftSchema = z.strictObject(bookFields);
export type BookDraft = z.infer<typeof bookDraftSchema>;

const countOf = (description: string) => z.number().int().meta({ unit: 'trades', description });

export const bookSchema = z.object({
  id: idSchema,
  code: z.string().describe('Short name of the book'),
  name: z.string().describe('Full name of the book'),
  live: countOf('Trades whose approved terms are in force'),
  waiting: countOf('Trades with a version that waits for approval'),
  returned: countOf('Trades that were returned and not amended since'),
  ended: countOf('Trades that were closed or have expired'),
  doubtful: countOf('Live trades whose last value is wide, in disagreement or refuted'),
  unvalued: countOf('Live trades without a value of the last run'),
});
export type Book = z.infer<typeof bookSchema>;

export const createBook = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/books',
  access: 'approve-trades',
  summary: 'Open a book',
  params: deskParamsSchema,
  body: bookDraftSchema,
  bodyExample: { code: 'GRAIN', name: 'Grain for the mills' },
  response: bookSchema,
  successStatus: 201,
  idempotent: true,
});

export const listBooks = defineEndpoint({
  method: 'GET',
  path: '/desks/:deskId/books',
  access: 'read-desk',
  summary: 'Books of the desk by code, with counts of their trades',
  params: deskParamsSchema,
  response: z.object({ books: z.array(bookSchema).describe('Books, by code') }),
});
