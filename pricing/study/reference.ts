import type { Contract, Market, PricingFailure, StudyReference } from '@/pricing/contract';
import type { MethodSizes } from '@/pricing/method';
import { heatCrankNicolson } from '@/pricing/methods/heat-crank-nicolson';
import { methodsFor } from '@/pricing/registry';

/** The finest grid that a study waits for: about a third of a second. */
const finest: MethodSizes = { spaceSteps: 1600, timeSteps: 800, smoothing: 'richardson' };

/**
 * The best value there is to measure a study's errors against: an exact route where one prices the
 * contract, else the extrapolated concentrated grid at its finest.
 */
export function studyReference(
  contract: Contract,
  market: Market,
): StudyReference | PricingFailure {
  const exact = methodsFor(contract, market).find((method) => method.theoreticalOrder === null);
  const result = (exact ?? heatCrankNicolson).price(contract, market, exact ? {} : finest);
  if (!result.ok) return result;
  if (result.errorEstimate === null) throw new Error('a reference must know its own error');
  return { method: result.method, value: result.value, errorEstimate: result.errorEstimate };
}
