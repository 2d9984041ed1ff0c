import { z } from 'zod';
import { defineEndpoint } from '../endpoint';
import { deskRoles, permissions, type Permission } from '../permissions';
import { idSchema, instantSchema, personSchema } from './common';

export const permissionSchema = z
  .enum(permissions as [Permission, ...Permission[]])
  .describe('A permission of the table');
export const roleSchema = z.enum(deskRoles).describe('Role on a desk');

export const deskAccessSchema = z
  .object({
    id: idSchema,
    name: z.string().describe('Name of the desk'),
    timeZone: z.string().describe('IANA time zone of the desk'),
    expiryCutoff: z.string().describe('Local time of day at which options expire, HH:MM'),
    role: roleSchema,
    suspended: z.boolean().describe('Whether the membership is suspended'),
    permissions: z.array(permissionSchema).describe('What this person may do here now'),
  })
  .describe('A desk as one member sees it');
export type DeskAccess = z.infer<typeof deskAccessSchema>;

export const meSchema = z.object({
  user: personSchema
    .extend({ email: z.string().describe('E-mail address') })
    .describe('The person who is signed in'),
  desks: z.array(deskAccessSchema).describe('Desks of this person, by name'),
});
export type Me = z.infer<typeof meSchema>;

const sessionSchema = z.object({
  accessToken: z.string().describe('Bearer token; kept in memory only'),
  expiresInSeconds: z
    .number()
    .int()
    .meta({ unit: 's', description: 'Life of the access token from now' }),
  me: meSchema.describe('Who signed in'),
});
export type Session = z.infer<typeof sessionSchema>;

/** Passwords are counted in bytes: bcrypt reads no more than 72. */
const passwordBytes = (text: string) => new TextEncoder().encode(text).length;

export const signInSchema = z.strictObject({
  email: z
    .string()
    .trim()
    .toLowerCase()
    .pipe(z.email('Give an e-mail address, such as name@firm.example.'))
    .describe('E-mail address'),
  password: z
    .string()
    .min(1, 'Enter your password.')
    .refine((text) => passwordBytes(text) <= 72, 'A password has at most 72 bytes.')
    .describe('Password'),
});

export const signIn = defineEndpoint({
  method: 'POST',
  path: '/sessions',
  access: 'public',
  summary: 'Sign in; sets the refresh cookie',
  body: signInSchema,
  bodyExample: { email: 'analyst@tarnfield.example', password: 'a long enough password' },
  response: sessionSchema,
  successStatus: 201,
});

export const refreshSession = defineEndpoint({
  method: 'POST',
  path: '/sessions/refresh',
  access: 'public',
  summary: 'A new access token from the refresh cookie, which is rotated',
  response: sessionSchema,
});

export const signOut = defineEndpoint({
  method: 'DELETE',
  path: '/sessions/current',
  access: 'public',
  summary: 'End the session of the refresh cookie',
  response: z.object({ ended: z.boolean().describe('Whether a session was ended') }),
});

export const stepUp = defineEndpoint({
  method: 'POST',
  path: '/sessions/step-up',
  access: 'session',
  summary: 'Confirm the password again before a binding act',
  body: signInSchema.pick({ password: true }),
  bodyExample: { password: 'a long enough password' },
  response: z.object({ validUntil: instantSchema.describe('Until when binding acts are open') }),
});

export const getMe = defineEndpoint({
  method: 'GET',
  path: '/me',
  access: 'session',
  summary: 'Who is signed in, with desks and permissions as of now',
  response: meSchema,
});
