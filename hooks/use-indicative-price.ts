import { useEffect, useState } from 'react';
import type { PricingRequest } from '@/pricing/contract';
import type { Comparison, PricedRoute } from './pricing-messages';
import { pricingThread } from './pricing-thread';

/** What is to be priced, for which underlying, and how closely routes have to agree. */
export type PricingSubject = { request: PricingRequest; underlyingId: string; tolerance: number };

export type IndicativePrice = PricingSubject & {
  routes: readonly PricedRoute[];
  /** Null until every route has come in. */
  comparison: Comparison | null;
};

export type PricingView = {
  /** The newest price there is: of these terms, or the last one of this underlying. */
  price: IndicativePrice | null;
  /** The newest price whose routes have all come in; a moment behind `price` while they do. */
  compared: IndicativePrice | null;
  /** Whether `price` belongs to the terms that were asked for. */
  current: boolean;
  failed: boolean;
};

const keyOf = ({ request, underlyingId, tolerance }: PricingSubject) =>
  JSON.stringify({ request, underlyingId, tolerance });

/**
 * Prices the subject in the thread whenever it changes. Without a request nothing is asked, and the
 * last price of the underlying stays.
 */
export function useIndicativePrice(
  underlyingId: string | null,
  tolerance: number,
  request: PricingRequest | null,
): PricingView {
  const [price, setPrice] = useState<IndicativePrice | null>(null);
  const [compared, setCompared] = useState<IndicativePrice | null>(null);
  const [failed, setFailed] = useState(false);
  const key = underlyingId && request ? keyOf({ request, underlyingId, tolerance }) : null;
  useEffect(() => {
    if (key === null) return;
    const subject = JSON.parse(key) as PricingSubject;
    return pricingThread().price(
      { kind: 'price', request: subject.request, tolerance: subject.tolerance },
      ({ routes, comparison }) => {
        const next = { ...subject, routes, comparison };
        setPrice(next);
        if (comparison !== null) setCompared(next);
      },
      () => setFailed(true),
    );
  }, [key]);
  const own = (one: IndicativePrice | null) => (one?.underlyingId === underlyingId ? one : null);
  const newest = own(price);
  return {
    price: newest,
    compared: own(compared),
    current: newest !== null && keyOf(newest) === key,
    failed,
  };
}
