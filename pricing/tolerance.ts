import type { Contract, Market, PricingResult } from '@/pricing/contract';
import { sizeLimits } from '@/pricing/conventions';
import type { Method, MethodSizes } from '@/pricing/method';

type Candidate = { method: Method; settings: MethodSizes; work: number };

/**
 * The cheapest method and size whose own error estimate holds the tolerance. Every method's sizes
 * are doubled from its coarsest to the cap, all of them are put in the order of their work, and the
 * first that holds is the answer; what was tried before costs no more than it does, or thereabouts.
 */
export function priceWithin(
  contract: Contract,
  market: Market,
  tolerance: number,
  methods: readonly Method[],
): PricingResult {
  const candidates = methods.flatMap(candidatesOf).sort((a, b) => a.work - b.work);
  let best = Infinity;
  for (const { method, settings } of candidates) {
    const result = method.price(contract, market, settings);
    if (!result.ok || result.errorEstimate === null) continue;
    if (result.errorEstimate <= tolerance) return result;
    best = Math.min(best, result.errorEstimate);
  }
  const reached = best < Infinity ? `the smallest estimate reached is ${best.toPrecision(2)}` : '';
  return {
    ok: false,
    code: 'tolerance-not-reached',
    path: 'method.tolerance',
    message: `No method holds this tolerance within the largest sizes allowed${reached && `; ${reached}`}. Ask for a larger tolerance.`,
  };
}

/** How many times as long as with its usual sizes one route may work before it stops to refine. */
const longestWork = 16;

/**
 * One route, refined until its own estimate holds the tolerance. Where it does not within its
 * longest work, the finest that was reached: its estimate says how far that is.
 */
export function priceRefined(
  contract: Contract,
  market: Market,
  tolerance: number,
  method: Method,
): PricingResult {
  const limit = longestWork * method.work(method.defaultSettings);
  let finest: PricingResult | null = null;
  for (const { settings, work } of candidatesOf(method)) {
    if (finest !== null && work > limit) break;
    const result = method.price(contract, market, settings);
    if (result.ok || finest === null || !finest.ok) finest = result;
    if (result.ok && result.errorEstimate !== null && result.errorEstimate <= tolerance) break;
  }
  if (finest === null) throw new Error(`${method.name} has no coarsest settings`);
  return finest;
}

function candidatesOf(method: Method): Candidate[] {
  const candidates: Candidate[] = [];
  let settings: MethodSizes | null = method.coarsestSettings;
  while (settings !== null) {
    candidates.push({ method, settings, work: method.work(settings) });
    settings = doubled(method, settings);
  }
  return candidates;
}

/**
 * Null where a size would pass its cap, or where there is none to double. A walk of odd sizes goes
 * to the odd size above.
 */
function doubled({ oddSteps }: Method, settings: MethodSizes): MethodSizes | null {
  const next = { ...settings };
  let sized = false;
  for (const size of ['spaceSteps', 'timeSteps', 'steps', 'nodes'] as const) {
    const before = settings[size];
    if (before === undefined) continue;
    const after = oddSteps ? 2 * before + 1 : 2 * before;
    if (after > sizeLimits[size].max) return null;
    next[size] = after;
    sized = true;
  }
  return sized ? next : null;
}
