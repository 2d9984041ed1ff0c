/**
 * The engine's only door: prices, the routes of a cross-check and their verdict, and the questions
 * asked the other way round. Plain functions of plain data; safe in a browser worker, in a server
 * thread and in a test.
 */
import {
  checkRequest,
  type Contract,
  type Market,
  type MethodName,
  type PricingFailure,
  type PricingRequest,
  type PricingResult,
} from '@/pricing/contract';
import { solveImpliedVolatility } from '@/pricing/implied/implied-volatility';
import type { Solved } from '@/pricing/implied/solved';
import { solveStrikeForDelta } from '@/pricing/implied/strike-for-delta';
import { methodNamed, methods, methodsFor } from '@/pricing/registry';
import { priceRefined, priceWithin } from '@/pricing/tolerance';
import { judgeRoutes, type ComparedRoute, type RouteVerdict } from '@/pricing/verdict';

export { checkRequest } from '@/pricing/contract';
export type { Solved } from '@/pricing/implied/solved';
export type { RouteVerdict, WorstPair } from '@/pricing/verdict';

/** Recorded with every stored value; raised whenever any value could come out differently. */
export const engineVersion = '1.0.0';

/** What screens and documents say about the methods, in the registry's order. */
export const methodSummaries: readonly { name: MethodName; label: string; summary: string }[] =
  methods.map(({ name, label, summary }) => ({ name, label, summary }));

/** Checks, chooses the method and prices; whatever is wrong with the input is a failure value. */
export function price(input: unknown): PricingResult {
  const checked = checkRequest(input);
  if (!checked.ok) return { ok: false, ...checked.issues[0] };
  const { contract, market, method: choice } = checked.request;
  const able = methodsFor(contract, market);
  if (choice !== undefined && 'tolerance' in choice) {
    return priceWithin(contract, market, choice.tolerance, able);
  }
  if (choice === undefined) return able[0].price(contract, market, {});
  const { name, ...settings } = choice;
  return (
    refusePayoff(contract, market, name) ?? methodNamed(name).price(contract, market, settings)
  );
}

/** No method but the closed form knows payoffs other than vanilla, and none is asked for one. */
function refusePayoff(contract: Contract, market: Market, name: MethodName): PricingFailure | null {
  const method = methodNamed(name);
  if (contract.payoff === 'vanilla' || method.prices(contract, market)) return null;
  return {
    ok: false,
    code: 'method-does-not-price',
    path: 'contract.payoff',
    message: `The method “${method.label}” does not price the payoff “${contract.payoff}”: choose the closed form.`,
  };
}

/** The routes that a cross-check of this contract takes: three at most, the most accurate first. */
export function routesFor(contract: Contract, market: Market): MethodName[] {
  return methodsFor(contract, market)
    .slice(0, 3)
    .map(({ name }) => name);
}

export type PricedRoute = { name: MethodName; result: PricingResult };

export function priceRoutes(contract: Contract, market: Market): PricedRoute[] {
  return routesFor(contract, market).map((name) => ({
    name,
    result: price({ contract, market, method: { name } }),
  }));
}

/** One route, as fine as its own estimate needs to be to hold the tolerance. */
export function priceRouteWithin(
  contract: Contract,
  market: Market,
  name: MethodName,
  tolerance: number,
): PricingResult {
  const checked = checkRequest({ contract, market, method: { tolerance } });
  if (!checked.ok) return { ok: false, ...checked.issues[0] };
  return (
    refusePayoff(contract, market, name) ??
    priceRefined(contract, market, tolerance, methodNamed(name))
  );
}

/** The verdict over the routes that gave a price; `tolerance` in the unit of the values. */
export function compareRoutes(routes: readonly PricedRoute[], tolerance: number): RouteVerdict {
  const compared: ComparedRoute[] = [];
  for (const { name, result } of routes) {
    if (!result.ok) continue;
    const { value, errorEstimate } = result;
    compared.push({ name, value, errorEstimate, machinery: methodNamed(name).machinery });
  }
  return judgeRoutes(compared, tolerance);
}

/** The volatility at which the request is worth the premium; the volatility it carries is not read. */
export function impliedVolatility(request: PricingRequest, premium: number): Solved {
  const market = { ...request.market, volatility: 0.2 };
  const checked = checkRequest({ ...request, market });
  if (!checked.ok) return { ok: false, ...checked.issues[0] };
  if (request.contract.payoff !== 'vanilla') return severalAnswers();
  return solveImpliedVolatility(checked.request, premium, price);
}

/** The strike at which the request has the delta; the strike it carries is not read. */
export function strikeForDelta(request: PricingRequest, delta: number): Solved {
  const contract = { ...request.contract, strike: request.market.spot };
  const checked = checkRequest({ ...request, contract });
  if (!checked.ok) return { ok: false, ...checked.issues[0] };
  if (request.contract.payoff !== 'vanilla') return severalAnswers();
  return solveStrikeForDelta(checked.request, delta, price);
}

/** The value of a digital option rises and falls with the volatility, and so does its delta. */
function severalAnswers(): PricingFailure {
  return {
    ok: false,
    code: 'not-priced',
    path: 'contract.payoff',
    message:
      'A digital option may have several answers to this, which is not solved: ask it of a vanilla option.',
  };
}
