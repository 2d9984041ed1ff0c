/** The engine's request and result on the wire. The types of `pricing/contract.ts` rule. */
import { z } from 'zod';
import {
  methodNames,
  optionKinds,
  pricedExercises,
  pricingIssueCodes,
  verdicts,
  type Greeks,
  type Market,
  type MethodSettings,
} from '@/pricing/contract';
import { numberOf } from './common';

export const optionKindSchema = z.enum(optionKinds).describe('Call or put');
export const exerciseSchema = z.enum(pricedExercises).describe('When the holder may exercise');
export const verdictSchema = z.enum(verdicts).describe('What the comparison of routes says');

const marketNumbers = {
  spot: numberOf('quote currency', 'Spot price, or the futures price of a future'),
  rate: numberOf('1/year', 'Continuously compounded domestic rate'),
  volatility: numberOf('1/sqrt(year)', 'Volatility'),
};

export const marketSchema = z
  .union([
    z.strictObject({
      ...marketNumbers,
      yield: numberOf('1/year', 'Continuous dividend yield or foreign rate'),
    }),
    z.strictObject({ ...marketNumbers, carry: z.literal('future').describe('A future') }),
  ])
  .describe('Market numbers that price one option') satisfies z.ZodType<Market>;

const sizeOf = (description: string) =>
  z.number().int().meta({ unit: 'steps', description }).optional();

export const methodSettingsSchema = z.strictObject({
  name: z.enum(methodNames).describe('Name of the method'),
  spaceSteps: sizeOf('Intervals of the space grid'),
  timeSteps: sizeOf('Intervals of the time grid'),
  steps: sizeOf('Steps of the walk'),
  nodes: sizeOf('Nodes of the exercise boundary'),
  smoothing: z.enum(['none', 'richardson']).optional().describe('How a lattice value is refined'),
  beyondStability: z
    .boolean()
    .optional()
    .describe('Whether an explicit grid runs past its stability limit on purpose'),
}) satisfies z.ZodType<MethodSettings>;

export const greeksSchema = z.object({
  delta: numberOf('per 1.00 of spot', 'Change of value with spot'),
  gamma: numberOf('per 1.00 of spot, twice', 'Change of delta with spot'),
  vega: numberOf('per 1.00 of volatility', 'Change of value with volatility'),
  theta: numberOf('per year', 'Change of value as time passes'),
  rho: numberOf('per 1.00 of rate', 'Change of value with the rate'),
  yieldRho: numberOf('per 1.00 of yield', 'Change of value with the yield').nullable(),
  vanna: numberOf(
    'per 1.00 of spot and of volatility',
    'Change of delta with volatility',
  ).optional(),
  volga: numberOf('per 1.00 of volatility, twice', 'Change of vega with volatility').optional(),
}) satisfies z.ZodType<Greeks>;

export const warningSchema = z.object({
  code: z.string().describe('Short name of the warning'),
  message: z.string().describe('The warning in a sentence'),
});

/** One route's answer as it is stored and shown. */
export const routeResultSchema = z.discriminatedUnion('ok', [
  z.object({
    ok: z.literal(true),
    value: numberOf('quote currency per unit', 'Value of one unit'),
    errorEstimate: numberOf(
      'quote currency per unit',
      'The route’s own estimate of its absolute error',
    ).nullable(),
    greeks: greeksSchema.describe('Sensitivities of the value'),
    method: methodSettingsSchema.describe('The settings that were really used'),
    diagnostics: z
      .record(
        z.string(),
        z.number().meta({ unit: 'as named', description: 'Figure of the method' }),
      )
      .describe('Figures of the method itself'),
    warnings: z.array(warningSchema).describe('What to know about this value'),
  }),
  z.object({
    ok: z.literal(false),
    code: z.enum(pricingIssueCodes).describe('Kind of failure'),
    path: z.string().describe('Field that is to blame'),
    message: z.string().describe('What to do, in a sentence'),
  }),
]);

export const routeSchema = z.object({
  name: z.enum(methodNames).describe('Name of the method'),
  result: routeResultSchema.describe('What it found'),
});
export type Route = z.infer<typeof routeSchema>;
