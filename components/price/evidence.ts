/** A price with everything that speaks for and against it, as every screen shows it. */
import type { MethodName, PricedExercise, Verdict } from '@/pricing/contract';
import type { Route } from '@/shared/contracts/pricing';
import type { Underlying } from '@/shared/contracts/underlyings';
import type { PositionTerms } from '@/shared/quote-terms';
import { routeLabel } from '@/constants/texts/price';
import { valueDecimals } from '@/shared/format/numbers';
import type { Agreement, StripRoute } from '@/components/charts/agreement-finding';

export type PricedUnderlying = Pick<Underlying, 'currency' | 'unit' | 'priceDecimals'>;

export type Evidence = {
  routes: readonly Route[];
  /** The route whose value is the price. */
  primary: MethodName;
  /** Null while routes are still coming in. */
  verdict: Verdict | null;
  refuted: boolean;
  tolerance: number;
  underlying: PricedUnderlying;
  exercise: PricedExercise;
  /** Null while the quantity cannot be read. */
  position: PositionTerms | null;
};

export type RouteSuccess = Extract<Route['result'], { ok: true }>;

/** The price itself; null where the primary route gave none. */
export function answerOf({ routes, primary }: Evidence): RouteSuccess | null {
  const result = routes.find(({ name }) => name === primary)?.result;
  return result?.ok ? result : null;
}

export const decimalsOf = ({ tolerance, underlying }: Evidence): number =>
  valueDecimals(tolerance, underlying.priceDecimals);

/** The routes that gave a value, the primary first. */
function stripRoutes({ routes, primary }: Evidence): StripRoute[] {
  const placed = routes.flatMap(({ name, result }): StripRoute[] =>
    result.ok
      ? [
          {
            name,
            label: routeLabel(name),
            value: result.value,
            errorEstimate: result.errorEstimate,
          },
        ]
      : [],
  );
  return [
    ...placed.filter(({ name }) => name === primary),
    ...placed.filter(({ name }) => name !== primary),
  ];
}

export function agreementOf(evidence: Evidence, verdict: Verdict): Agreement {
  const { tolerance, refuted, underlying } = evidence;
  return {
    routes: stripRoutes(evidence),
    tolerance,
    verdict,
    refuted,
    decimals: decimalsOf(evidence),
    currency: underlying.currency,
  };
}

/** Whether the number should not be used without reading why. */
export function needsCaution({ verdict, refuted, routes }: Evidence): boolean {
  const warned = routes.some(({ result }) => !result.ok || result.warnings.length > 0);
  return refuted || warned || (verdict !== null && verdict !== 'agree');
}
