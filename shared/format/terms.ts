import type { MethodSettings, OptionKind, PricedExercise } from '@/pricing/contract';
import { formatQuantity, hardSpace } from './numbers';

export type OptionTerms = {
  kind: OptionKind;
  exercise: PricedExercise;
  strike: string;
  expiryDate: string;
};

const exerciseWords: Record<PricedExercise, string> = {
  american: 'American',
  european: 'European',
};

/** An option in a line, as people say it: `put 210.00, American, 2027-06-01`. */
export const optionTerms = (terms: OptionTerms, priceDecimals = 2): string =>
  [
    `${terms.kind} ${formatQuantity(terms.strike, priceDecimals)}`,
    exerciseWords[terms.exercise],
    terms.expiryDate,
  ].join(', ');

/** The sizes that a route really used: `200 × 100`, `1 000 steps`, `16 nodes`; empty where it has none. */
export function routeSizes({ spaceSteps, timeSteps, steps, nodes }: MethodSettings): string {
  if (spaceSteps !== undefined && timeSteps !== undefined)
    return [formatQuantity(spaceSteps), '×', formatQuantity(timeSteps)].join(hardSpace);
  if (nodes !== undefined) return `${formatQuantity(nodes)}${hardSpace}nodes`;
  return steps === undefined ? '' : `${formatQuantity(steps)}${hardSpace}steps`;
}
