import { z } from 'zod';
import { defineEndpoint } from '../endpoint';
import { deskParamsSchema, idSchema, instantSchema, personSchema } from './common';

export const chainKinds = ['valuations', 'records'] as const;
export const chainKindSchema = z
  .enum(chainKinds)
  .describe('Valuations, or the records of trades, approvals, sign-offs and permissions');
export type ChainKind = z.infer<typeof chainKindSchema>;

/** What can be wrong with a chain, by what gave it away. */
export const breakKinds = [
  'missing',
  'previous',
  'hash',
  'time',
  'head',
  'cut',
  'anchor-hash',
  'held-hash',
  'signature',
] as const;
export type BreakKind = (typeof breakKinds)[number];

const entriesOf = (description: string) =>
  z.number().int().min(0).meta({ unit: 'entries', description });

export const positionSchema = z
  .number()
  .int()
  .min(1)
  .meta({ unit: 'entries', description: 'Place in the chain, counted from 1' });

export const hashSchema = z
  .string()
  .regex(/^[0-9a-f]{64}$/, 'Give a SHA-256 as 64 hexadecimal digits.')
  .describe('SHA-256, hexadecimal');

export const keyIdSchema = z.string().describe('First 16 digits of the SHA-256 of the public key');

/** A place and its hash as someone has them from elsewhere, such as from an export’s manifest. */
export const heldPlaceSchema = z.strictObject({ position: positionSchema, hash: hashSchema });
export type HeldPlace = z.infer<typeof heldPlaceSchema>;

export const verificationSchema = z.object({
  id: idSchema,
  chain: chainKindSchema,
  status: z.enum(['queued', 'running', 'finished']).describe('How far the work is'),
  held: heldPlaceSchema.nullable().describe('Place that the chain was compared with besides'),
  total: entriesOf('Entries of the chain when the work began'),
  checked: entriesOf('Entries found in order so far'),
  anchors: entriesOf('Signed heads that the chain was compared with'),
  firstBreak: z
    .object({
      kind: z.enum(breakKinds).describe('What gave it away'),
      position: entriesOf('Place of the first entry that is wrong or missing'),
    })
    .nullable()
    .describe('The first thing found wrong; null when nothing was'),
  startedBy: personSchema,
  startedAt: instantSchema,
  finishedAt: instantSchema.nullable(),
});
export type Verification = z.infer<typeof verificationSchema>;

export const anchorSchema = z.object({
  id: idSchema,
  position: positionSchema,
  hash: hashSchema,
  purpose: z.enum(['sign-off', 'export']).describe('What the head was signed for'),
  signedAt: instantSchema,
  keyId: keyIdSchema,
});
export type Anchor = z.infer<typeof anchorSchema>;

export const chainSchema = z.object({
  kind: chainKindSchema,
  position: entriesOf('Entries of the chain'),
  at: instantSchema.nullable().describe('Time of the newest entry; null in an empty chain'),
  hash: hashSchema.describe('Hash of the newest entry; zeros in an empty chain'),
  anchors: z.array(anchorSchema).describe('Signed heads, newest first, at most 20'),
  verifications: z.array(verificationSchema).describe('Verifications, newest first, at most 5'),
});
export type Chain = z.infer<typeof chainSchema>;

export const getChains = defineEndpoint({
  method: 'GET',
  path: '/desks/:deskId/chains',
  access: 'export-history',
  summary: 'The chains of the desk with their heads, signed heads and verifications',
  params: deskParamsSchema,
  response: z.object({
    chains: z.array(chainSchema).describe('Valuations and records'),
    publicKey: z
      .object({
        keyId: keyIdSchema,
        pem: z.string().describe('Ed25519 public key, SubjectPublicKeyInfo in PEM'),
      })
      .describe('What signatures of heads and exports are checked with; keep a copy'),
  }),
});

export const startVerification = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/chains/verifications',
  access: 'export-history',
  summary: 'Verify a chain from its first entry, in the background',
  params: deskParamsSchema,
  body: z.strictObject({
    chain: chainKindSchema,
    held: heldPlaceSchema
      .nullable()
      .describe('A place and hash that you kept yourself, to compare the chain with'),
  }),
  bodyExample: { chain: 'valuations', held: null },
  response: verificationSchema,
  successStatus: 201,
  idempotent: true,
});

export const getVerification = defineEndpoint({
  method: 'GET',
  path: '/desks/:deskId/chains/verifications/:verificationId',
  access: 'export-history',
  summary: 'How far a verification is and what it found',
  params: deskParamsSchema.extend({ verificationId: idSchema }),
  response: verificationSchema,
});
