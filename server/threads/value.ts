/** Trades of a valuation run beside the event loop: both routes, and what they say together. */
import os from 'node:os';
import type {
  VanillaContract,
  Market,
  MethodSettings,
  PricingResult,
  Verdict,
} from '@/pricing/contract';
import { compareRoutes, price, priceRouteWithin } from '@/pricing/index';

/** A route with its sizes, or as fine as a tolerance asks for. */
export type RouteTask = MethodSettings | { name: MethodSettings['name']; within: number };

export type ValuationTask = {
  contract: VanillaContract;
  market: Market;
  tolerance: number;
  primary: RouteTask;
  check: RouteTask;
};

/** What was asked of one route, so that the same bits can be had again, and what it found. */
export type ValuedRoute = {
  request: { contract: VanillaContract; market: Market; method: MethodSettings };
  result: PricingResult;
};

export type TaskFinding = {
  primary: ValuedRoute;
  check: ValuedRoute;
  verdict: Verdict;
  refuted: boolean;
  /** How far the routes lie apart; null where there is nothing to compare. */
  distance: number | null;
};

/** Requests of people go first: on Linux, this lowers the calling thread alone. */
const niceness = 5;
os.setPriority(niceness);

function valueRoute({ contract, market }: ValuationTask, route: RouteTask): ValuedRoute {
  const { name } = route;
  const result =
    'within' in route
      ? priceRouteWithin(contract, market, name, route.within)
      : price({ contract, market, method: route });
  const asked = 'within' in route ? { name } : route;
  return { request: { contract, market, method: result.ok ? result.method : asked }, result };
}

function valueTrade(task: ValuationTask): TaskFinding {
  const primary = valueRoute(task, task.primary);
  const check = valueRoute(task, task.check);
  const { verdict, refuted, worst } = compareRoutes(
    [primary, check].map(({ request, result }) => ({ name: request.method.name, result })),
    task.tolerance,
  );
  return { primary, check, verdict, refuted, distance: worst?.distance ?? null };
}

export const valueTrades = (tasks: readonly ValuationTask[]): TaskFinding[] =>
  tasks.map(valueTrade);
