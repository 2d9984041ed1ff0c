import type { Contract, Market, MethodName } from '@/pricing/contract';
import type { Method } from '@/pricing/method';
import { closedForm } from '@/pricing/methods/closed-form';
import { heatCrankNicolson } from '@/pricing/methods/heat-crank-nicolson';
import { heatExplicit } from '@/pricing/methods/heat-explicit';
import { heatImplicit } from '@/pricing/methods/heat-implicit';
import { latticeCrr } from '@/pricing/methods/lattice-crr';
import { latticeJarrowRudd } from '@/pricing/methods/lattice-jarrow-rudd';
import { latticeLeisenReimer } from '@/pricing/methods/lattice-leisen-reimer';
import { latticeSymmetric } from '@/pricing/methods/lattice-symmetric';
import { spectralBoundary } from '@/pricing/methods/spectral-boundary';
import { latticeTian } from '@/pricing/methods/lattice-tian';
import { latticeTrinomial } from '@/pricing/methods/lattice-trinomial';

/**
 * The one list of methods, the most accurate first: the first that prices a contract is what a
 * request without a method gets, and the first three are what a cross-check compares.
 */
export const methods: readonly Method[] = [
  closedForm,
  heatCrankNicolson,
  latticeSymmetric,
  latticeCrr,
  heatImplicit,
  heatExplicit,
  spectralBoundary,
  latticeJarrowRudd,
  latticeTian,
  latticeTrinomial,
  latticeLeisenReimer,
];

export function methodNamed(name: MethodName): Method {
  const method = methods.find((candidate) => candidate.name === name);
  if (method === undefined) throw new Error(`no method named ${name} is registered`);
  return method;
}

/** The methods that may be chosen for a contract. */
export function methodsFor(contract: Contract, market: Market): Method[] {
  return methods.filter((method) => !method.byNameOnly && method.prices(contract, market));
}
