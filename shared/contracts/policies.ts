import { z } from 'zod';
import { sizeLimits, type MethodName, type PricedExercise } from '@/pricing/contract';
import { defineEndpoint } from '../endpoint';
import {
  deskParamsSchema,
  idSchema,
  instantSchema,
  personSchema,
  positiveDecimalSchema,
  reasonSchema,
} from './common';

/** The routes that a policy may choose, the most accurate first. */
export const policyMethods = {
  european: ['closed-form', 'heat-crank-nicolson', 'lattice-symmetric', 'lattice-crr'],
  american: ['heat-crank-nicolson', 'lattice-symmetric', 'lattice-crr'],
} as const satisfies Record<PricedExercise, readonly MethodName[]>;
export type PolicyMethod = (typeof policyMethods)['european'][number];

const sizeOf = (size: keyof typeof sizeLimits, description: string) => {
  const { min, max } = sizeLimits[size];
  return z
    .number()
    .int('Give a whole number.')
    .min(min, `Give at least ${min}.`)
    .max(max, `Give at most ${max}.`)
    .meta({ unit: 'steps', description });
};

const gridSizes = z.strictObject({
  spaceSteps: sizeOf('spaceSteps', 'Intervals of the space grid').optional(),
  timeSteps: sizeOf('timeSteps', 'Intervals of the time grid').optional(),
});
const walkSizes = z.strictObject({ steps: sizeOf('steps', 'Steps of the walk').optional() });

/** A size that is left out is the method’s own. */
export const policySizesSchema = z
  .strictObject({
    'heat-crank-nicolson': gridSizes.optional().describe('Sizes of the heat grid'),
    'lattice-symmetric': walkSizes.optional().describe('Sizes of the symmetric walk'),
    'lattice-crr': walkSizes.optional().describe('Sizes of the binomial walk'),
  })
  .describe('Sizes by method');
export type PolicySizes = z.infer<typeof policySizesSchema>;

const europeanSchema = z.enum(policyMethods.european);
const americanSchema = z.enum(policyMethods.american);

const versionSchema = z
  .number()
  .int()
  .min(0)
  .meta({ unit: 'count', description: 'Version of the record that this was made against' });

const policyTermsSchema = z.strictObject({
  primaryEuropean: europeanSchema.describe('Route that values European options'),
  checkEuropean: europeanSchema.describe('Route that checks them'),
  primaryAmerican: americanSchema.describe('Route that values American options'),
  checkAmerican: americanSchema.describe('Route that checks them'),
  refinement: z
    .discriminatedUnion('by', [
      z.strictObject({ by: z.literal('sizes').describe('Fixed sizes'), sizes: policySizesSchema }),
      z.strictObject({
        by: z.literal('tolerance').describe('As fine as it needs to be'),
        share: z
          .number()
          .gt(0, 'Give a share above 0 %.')
          .max(1, 'Give a share of at most 100 %.')
          .meta({
            unit: '1',
            description: 'Share of the tolerance that an error estimate may take',
          }),
      }),
    ])
    .describe('How far routes refine'),
  unitTolerance: z
    .record(
      idSchema,
      z
        .number()
        .gt(0, 'Give a tolerance above zero.')
        .max(1e12)
        .meta({ unit: 'quote currency per unit', description: 'Tolerance of this underlying' }),
    )
    .describe('Tolerance per unit, by underlying'),
  moneyTolerance: z
    .record(
      z.string().regex(/^[A-Z]{3}$/, 'Give a currency by its ISO 4217 code.'),
      positiveDecimalSchema.describe('Amount in that currency'),
    )
    .describe('Tolerance of a whole position, by currency'),
  reason: reasonSchema,
});

export const policyDraftSchema = policyTermsSchema.superRefine((policy, context) => {
  for (const exercise of ['European', 'American'] as const)
    if (policy[`primary${exercise}`] === policy[`check${exercise}`])
      context.addIssue({
        code: 'custom',
        path: [`check${exercise}`],
        message: 'A route cannot check itself; choose another.',
      });
});
export type PolicyDraft = z.infer<typeof policyDraftSchema>;

export const policySchema = policyTermsSchema.extend({
  id: idSchema,
  number: z.number().int().meta({ unit: 'count', description: 'Number on its desk' }),
  status: z.enum(['draft', 'approved', 'superseded']).describe('Where the policy stands'),
  version: versionSchema,
  reason: z.string().describe('Why it was written'),
  author: personSchema,
  authoredAt: instantSchema,
  savedAt: instantSchema.nullable().describe('When the draft was saved last'),
  makerIds: z.array(idSchema).describe('Whoever wrote or saved it, and so cannot approve it'),
  approvedBy: personSchema.nullable(),
  approvedAt: instantSchema.nullable(),
});
export type Policy = z.infer<typeof policySchema>;

const policyParams = deskParamsSchema.extend({ policyId: idSchema });

const draftExample = {
  primaryEuropean: 'closed-form' as const,
  checkEuropean: 'heat-crank-nicolson' as const,
  primaryAmerican: 'heat-crank-nicolson' as const,
  checkAmerican: 'lattice-symmetric' as const,
  refinement: { by: 'tolerance' as const, share: 0.1 },
  unitTolerance: {},
  moneyTolerance: { EUR: '250.00' },
  reason: 'First policy of the desk, as agreed in June',
};

export const listPolicies = defineEndpoint({
  method: 'GET',
  path: '/desks/:deskId/policies',
  access: 'read-desk',
  summary: 'Pricing policies of the desk, newest first',
  params: deskParamsSchema,
  response: z.object({
    policies: z.array(policySchema).describe('The newest two hundred; at most one in force'),
  }),
});

export const createPolicy = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/policies',
  access: 'author-policy',
  summary: 'Write a pricing policy, as a draft',
  params: deskParamsSchema,
  body: policyDraftSchema,
  bodyExample: draftExample,
  response: policySchema,
  successStatus: 201,
  idempotent: true,
});

export const savePolicy = defineEndpoint({
  method: 'PUT',
  path: '/desks/:deskId/policies/:policyId',
  access: 'author-policy',
  summary: 'Save a draft of a pricing policy',
  params: policyParams,
  body: policyDraftSchema.safeExtend({ version: versionSchema }),
  bodyExample: { ...draftExample, version: 0 },
  response: policySchema,
});

export const approvePolicy = defineEndpoint({
  method: 'POST',
  path: '/desks/:deskId/policies/:policyId/approval',
  access: 'author-policy',
  summary: 'Put a draft in force; never one’s own. The policy before it is superseded',
  params: policyParams,
  body: z.strictObject({ version: versionSchema }),
  bodyExample: { version: 0 },
  response: policySchema,
  stepUp: true,
});
