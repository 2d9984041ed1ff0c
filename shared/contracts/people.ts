import { z } from 'zod';
import { defineEndpoint } from '../endpoint';
import { rolesADeskHeadSets } from '../permissions';
import {
  dateSchema,
  deskParamsSchema,
  idSchema,
  instantSchema,
  pageOf,
  pageQuerySchema,
  personSchema,
  reasonSchema,
} from './common';
import { permissionSchema, roleSchema } from './sessions';

const memberParams = deskParamsSchema.extend({ userId: idSchema });

/** The version of the membership that the change was made against. */
const versionSchema = z
  .number()
  .int()
  .min(0)
  .meta({ unit: 'count', description: 'Version of the membership that was read' });

export const permissionEffectSchema = z
  .enum(['grant', 'withdraw'])
  .describe('Whether the permission is given or taken');

const activeChangeSchema = z.object({
  id: idSchema,
  permission: permissionSchema,
  effect: permissionEffectSchema,
  reason: z.string().describe('Why'),
  endsOn: dateSchema.nullable().describe('Last day on which it holds; null without end'),
  madeBy: personSchema,
  madeAt: instantSchema,
});

export const memberSchema = z.object({
  user: personSchema
    .extend({ email: z.string().describe('E-mail address') })
    .describe('The member'),
  role: roleSchema,
  memberSince: dateSchema,
  suspendedAt: instantSchema.nullable(),
  suspensionReason: z.string().nullable().describe('Why the membership is suspended'),
  permissions: z.array(permissionSchema).describe('What this person may do now'),
  changes: z.array(activeChangeSchema).describe('Single grants and withdrawals in force'),
  version: versionSchema,
});
export type Member = z.infer<typeof memberSchema>;

export const listMembers = defineEndpoint({
  method: 'GET',
  path: '/desks/:deskId/people',
  access: 'read-desk',
  summary: 'Members of the desk with roles and single permissions',
  params: deskParamsSchema,
  response: z.object({ members: z.array(memberSchema).describe('Members, by name') }),
});

export const roleChangeSchema = z.strictObject({
  role: z.enum(rolesADeskHeadSets).describe('The new role'),
  reason: reasonSchema,
  version: versionSchema,
});

export const setRole = defineEndpoint({
  method: 'PUT',
  path: '/desks/:deskId/people/:userId/role',
  access: 'manage-people',
  summary: 'Set a member’s role',
  params: memberParams,
  body: roleChangeSchema,
  bodyExample: { role: 'analyst', reason: 'Moves to the pricing team', version: 0 },
  response: memberSchema,
  stepUp: true,
});

export const permissionChangeSchema = z.strictObject({
  permission: permissionSchema,
  effect: permissionEffectSchema,
  endsOn: dateSchema.nullable().describe('Last day on which it holds; null without end'),
  reason: reasonSchema,
  version: versionSchema,
});

export const changePermission = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/people/:userId/permissions',
  access: 'manage-people',
  summary: 'Grant or withdraw one permission for one member',
  params: memberParams,
  body: permissionChangeSchema,
  bodyExample: {
    permission: 'export-history',
    effect: 'grant',
    endsOn: null,
    reason: 'Prepares the quarterly file',
    version: 0,
  },
  response: memberSchema,
  successStatus: 201,
  idempotent: true,
  stepUp: true,
});

const reasonOnly = z.strictObject({ reason: reasonSchema, version: versionSchema });

export const endPermissionChange = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/people/:userId/permissions/:changeId/end',
  access: 'manage-people',
  summary: 'End a single grant or withdrawal before its date',
  params: memberParams.extend({ changeId: idSchema }),
  body: reasonOnly,
  bodyExample: { reason: 'No longer needed', version: 0 },
  response: memberSchema,
  stepUp: true,
});

export const suspendMember = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/people/:userId/suspension',
  access: 'manage-people',
  summary: 'Suspend a membership; every request is refused at once',
  params: memberParams,
  body: reasonOnly,
  bodyExample: { reason: 'On leave until the new year', version: 0 },
  response: memberSchema,
  stepUp: true,
});

export const reinstateMember = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/people/:userId/reinstatement',
  access: 'manage-people',
  summary: 'End a suspension',
  params: memberParams,
  body: reasonOnly,
  bodyExample: { reason: 'Back from leave', version: 0 },
  response: memberSchema,
  stepUp: true,
});

export const accessEventKinds = [
  'role-set',
  'permission-granted',
  'permission-withdrawn',
  'change-ended',
  'suspended',
  'reinstated',
] as const;

export const accessEventSchema = z.object({
  id: idSchema,
  kind: z.enum(accessEventKinds).describe('What was changed'),
  at: instantSchema,
  madeBy: personSchema,
  subject: personSchema,
  permission: permissionSchema.nullable(),
  role: roleSchema.nullable(),
  previousRole: roleSchema.nullable(),
  reason: z.string().describe('Why'),
  endsOn: dateSchema.nullable().describe('Last day on which it holds; null without end'),
});
export type AccessEvent = z.infer<typeof accessEventSchema>;

export const listAccessEvents = defineEndpoint({
  method: 'GET',
  path: '/desks/:deskId/access-events',
  access: 'read-audit-log',
  summary: 'Who changed whose permissions, when and why; newest first',
  params: deskParamsSchema,
  query: pageQuerySchema.extend({
    userId: idSchema.optional().describe('Only changes of this person’s permissions'),
  }),
  response: pageOf(accessEventSchema),
});
