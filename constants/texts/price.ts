/** Words about a price, wherever one stands: on the ticket, on a quote, in a list. */
import type { MethodName, MethodSettings, Verdict } from '@/pricing/contract';

/** Names of the routes on a screen; the engine's own labels are longer and stay in the engine. */
const routeLabels: Record<MethodName, string> = {
  'closed-form': 'Closed form',
  'heat-crank-nicolson': 'Heat grid',
  'lattice-crr': 'Walk, CRR',
  'lattice-symmetric': 'Walk, symmetric',
};

export const routeLabel = (name: MethodName): string => routeLabels[name];

const cross = '\u202f×\u202f';

/** The sizes that a route really used: `400 × 200`, `1001 steps`. */
export function routeSizes({ spaceSteps, timeSteps, steps }: MethodSettings): string {
  if (spaceSteps !== undefined && timeSteps !== undefined)
    return `${spaceSteps}${cross}${timeSteps}`;
  return steps === undefined ? '' : `${steps} steps`;
}

export const priceText = {
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
  refuted:
    'An error estimate is refuted: two routes lie further apart than both their errors allow.',
  cautions: 'Cautions',
  cautionsOpen: 'What this price assumes',
  errorUnknown: 'error unknown',
} as const;

export type VerdictFigures = { verdict: Verdict; tolerance: string; largest: string | null };

/** The verdict with its figures, one sentence that says what it means. */
export function verdictSentence({ verdict, tolerance, largest }: VerdictFigures): string {
  switch (verdict) {
    case 'agree':
      return `Routes differ by ${largest} at most, within the tolerance ${tolerance}, and each knows its own error that well.`;
    case 'wide':
      return `Routes differ by up to ${largest}; their error estimates explain it, but the value is not known to the tolerance ${tolerance}.`;
    case 'disagree':
      return `Routes differ by ${largest}, more than the tolerance ${tolerance} and more than their error estimates explain.`;
    case 'one-route':
      return 'Only one route priced these terms, so nothing confirms it.';
  }
}

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
