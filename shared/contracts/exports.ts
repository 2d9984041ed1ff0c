import { z } from 'zod';
import { defineEndpoint } from '../endpoint';
import { hashSchema, keyIdSchema, positionSchema } from './chain';
import {
  deskParamsSchema,
  idSchema,
  instantSchema,
  pageOf,
  pageQuerySchema,
  personSchema,
} from './common';
import { historyFilterSchema } from './history';

export const exportFormats = ['csv', 'xlsx'] as const;
export const exportFormatSchema = z.enum(exportFormats).describe('Kind of file');
export type ExportFormat = z.infer<typeof exportFormatSchema>;

/** More than this wants a shorter period: a file stays one that a spreadsheet opens. */
export const mostExportRows = 20_000;

const rowsOf = (description: string) => z.number().int().min(0).meta({ unit: 'rows', description });

/**
 * What a file is, signed. The signature is Ed25519 over the canonical JSON (RFC 8785) of all other
 * fields, so that the manifest may be laid out as one likes.
 */
export const manifestSchema = z.strictObject({
  version: z.literal(1).meta({ unit: 'count', description: 'Version of this form' }),
  exportId: idSchema,
  deskId: idSchema,
  fileName: z.string().describe('Name of the file'),
  format: exportFormatSchema,
  filter: historyFilterSchema.describe('What the history was narrowed to'),
  rows: rowsOf('Rows of the file, its heading not counted'),
  bytes: z.number().int().min(0).meta({ unit: 'bytes', description: 'Size of the file' }),
  sha256: hashSchema.describe('SHA-256 of the file’s bytes'),
  chain: z
    .strictObject({
      name: z.string().describe('Name of the chain'),
      firstPosition: positionSchema.nullable().describe('Lowest place in the file'),
      lastPosition: positionSchema.nullable().describe('Highest place in the file'),
      headPosition: positionSchema.nullable().describe('Place of the head that was signed'),
      headHash: hashSchema.nullable().describe('Hash of the head that was signed'),
    })
    .describe('Where the rows stand in the chain, and its head at that time'),
  engines: z.array(z.string()).describe('Versions of the engine that made the values'),
  caution: z.string().describe('What the values are and what they are not'),
  madeBy: idSchema,
  madeAt: instantSchema,
  keyId: keyIdSchema,
  signature: z
    .string()
    .regex(/^[0-9a-f]{128}$/)
    .describe('Ed25519 signature, hexadecimal'),
});
export type Manifest = z.infer<typeof manifestSchema>;

export const exportSchema = z.object({
  id: idSchema,
  format: exportFormatSchema,
  filter: historyFilterSchema.describe('What the history was narrowed to'),
  status: z.enum(['queued', 'running', 'ready']).describe('How far the work is'),
  total: rowsOf('Rows that the file will have'),
  done: rowsOf('Rows written so far'),
  createdBy: personSchema,
  createdAt: instantSchema,
  manifest: manifestSchema.nullable().describe('The signed manifest, once the file is ready'),
});
export type HistoryExport = z.infer<typeof exportSchema>;

export const createExport = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/exports',
  access: 'export-history',
  summary: 'Make a file of the filtered history, in the background',
  params: deskParamsSchema,
  body: z.strictObject({
    format: exportFormatSchema,
    filter: historyFilterSchema.describe('What the file is to hold'),
  }),
  bodyExample: { format: 'csv', filter: {} },
  response: exportSchema,
  successStatus: 201,
  idempotent: true,
});

export const listExports = defineEndpoint({
  method: 'GET',
  path: '/desks/:deskId/exports',
  access: 'export-history',
  summary: 'Exports of the desk, newest first',
  params: deskParamsSchema,
  query: pageQuerySchema,
  response: pageOf(exportSchema),
});

export const getExport = defineEndpoint({
  method: 'GET',
  path: '/desks/:deskId/exports/:exportId',
  access: 'export-history',
  summary: 'How far an export is, and its manifest',
  params: deskParamsSchema.extend({ exportId: idSchema }),
  response: exportSchema,
});

export const getExportFile = defineEndpoint({
  method: 'GET',
  path: '/desks/:deskId/exports/:exportId/file',
  access: 'export-history',
  summary: 'The file of an export that is ready',
  params: deskParamsSchema.extend({ exportId: idSchema }),
  response: z.object({
    fileName: z.string().describe('Name of the file'),
    mediaType: z.string().describe('Media type of the file'),
    base64: z.string().describe('The bytes of the file in base64'),
  }),
});
