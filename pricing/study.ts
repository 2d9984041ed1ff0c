/**
 * The engine's door to convergence studies: plan a ladder, run it row by row, say what the rows show.
 * It stands beside `index.ts`, so that a browser that only prices does not load the statistics.
 */
import type {
  Contract,
  LadderStep,
  Market,
  MethodName,
  PricedExercise,
  StudyRow,
} from '@/pricing/contract';
import { methodNamed, methods } from '@/pricing/registry';

export { planLadder, type LadderBase } from '@/pricing/study/ladder';
export { studyReference } from '@/pricing/study/reference';
export { summariseStudy } from '@/pricing/study/summary';

/** The order that the registry promises; null where there is nothing to refine. */
export function theoreticalOrder(name: MethodName, exercise: PricedExercise): number | null {
  const { theoreticalOrder: order, americanOrder } = methodNamed(name);
  return exercise === 'american' ? (americanOrder ?? order) : order;
}

/** The methods that a study of this contract can take, in the registry's order. */
export function studiedMethods(contract: Contract, market: Market): MethodName[] {
  return methods
    .filter((method) => method.theoreticalOrder !== null && method.prices(contract, market))
    .map(({ name }) => name);
}

/** One row; a size that cannot be priced is a row that says why. */
export function runStudyRow(contract: Contract, market: Market, step: LadderStep): StudyRow {
  const { name, ...settings } = step.settings;
  return { ...step, result: methodNamed(name).price(contract, market, settings) };
}
