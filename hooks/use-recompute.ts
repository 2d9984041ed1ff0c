import { useMutation } from '@tanstack/react-query';
import type { Contract, Market, MethodName, MethodSettings } from '@/pricing/contract';
import { pricingThread } from './pricing-thread';

/** What is on record of a price: its inputs, and each route's settings and value. */
export type StoredPrice = {
  contract: Contract;
  market: Market;
  routes: readonly { method: MethodSettings; value: number }[];
};

export type RecomputedRoute = {
  name: MethodName;
  recorded: number;
  /** Null where the engine of this browser gave no value. */
  recomputed: number | null;
};

/** Prices a stored price again in this browser, from the inputs and settings on record. */
export function useRecompute({ contract, market, routes }: StoredPrice) {
  return useMutation({
    networkMode: 'always',
    mutationFn: async (): Promise<RecomputedRoute[]> => {
      const methods = routes.map(({ method }) => method);
      const again = await pricingThread().ask({ kind: 'reprice', contract, market, methods });
      return routes.map(({ method, value }, index) => {
        const { result } = again[index];
        return {
          name: method.name,
          recorded: value,
          recomputed: result.ok ? result.value : null,
        };
      });
    },
  });
}
