/** Words about a price, wherever one stands: on the ticket, on a quote, in a list. */
import type { MethodName } from '@/pricing/contract';

/** Names of the routes on a screen; the engine's own labels are longer and stay in the engine. */
const routeLabels: Record<MethodName, string> = {
  'closed-form': 'Closed form',
  'heat-crank-nicolson': 'Heat grid',
  'lattice-crr': 'CRR walk',
  'lattice-symmetric': 'Plain walk',
  'heat-explicit': 'Explicit grid',
  'heat-implicit': 'Implicit grid',
  'spectral-boundary': 'Exercise boundary',
  'lattice-jarrow-rudd': 'Jarrow–Rudd walk',
  'lattice-tian': 'Tian walk',
  'lattice-trinomial': 'Trinomial walk',
  'lattice-leisen-reimer': 'Leisen–Reimer walk',
};

export const routeLabel = (name: MethodName): string => routeLabels[name];

/** The same within a sentence; capitals that are no beginning stay, and so do people’s. */
export const routeInSentence = (name: MethodName): string =>
  routeLabels[name].replace(/^(?!Jarrow|Tian|Leisen)[A-Z](?=[a-z])/, (first) =>
    first.toLowerCase(),
  );

export const priceText = {
  title: 'Price',
  trusted: 'Why it can be trusted',
  moves: 'How it moves',
  assumes: 'What it assumes',
  route: 'route',
  value: 'value',
  error: '±',
  apart: 'apart',
  answer: 'answer',
  failed: 'no value',
  sensitivity: 'sensitivity',
  unit: 'unit',
  position: (currency: string) => `position, ${currency}`,
  warnings: 'To know about these values',
  cautionsOpen: 'What this price assumes',
  errorUnknown: 'error unknown',
} as const;

/** What every model value rests on, whatever the numbers say. */
export const modelCautions: readonly string[] = [
  'A model value is indicative.',
  'One volatility per strike and expiry, lognormal moves and no jumps are assumptions.',
  '“Routes agree” says that the sums are right, not that the model is.',
  'This is not investment advice; firm policy, local regulation and licensed practice decide.',
];

export const exerciseCautions = {
  european: 'The holder exercises at expiry only.',
  american: 'The holder exercises when it pays most, on any day up to expiry.',
} as const;
