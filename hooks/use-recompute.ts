import { useMutation } from '@tanstack/react-query';
import type { MethodName } from '@/pricing/contract';
import type { Quote } from '@/shared/contracts/quotes';
import { pricingThread } from './pricing-thread';

export type RecomputedRoute = {
  name: MethodName;
  recorded: number;
  /** Null where the engine of this browser gave no value. */
  recomputed: number | null;
};

/** The contract exactly as it was priced: its time to expiry is on record as a double. */
const contractOf = ({ exercise, kind, strike, expiryYears }: Quote) =>
  ({ payoff: 'vanilla', exercise, kind, strike: Number(strike), expiry: expiryYears }) as const;

/** Prices a stored quote again in this browser, from the inputs and settings on record. */
export function useRecompute(quote: Quote) {
  return useMutation({
    networkMode: 'always',
    mutationFn: async (): Promise<RecomputedRoute[]> => {
      const recorded = quote.routes.flatMap(({ name, result }) =>
        result.ok ? [{ name, result }] : [],
      );
      const again = await pricingThread().ask({
        kind: 'reprice',
        contract: contractOf(quote),
        market: quote.market,
        methods: recorded.map(({ result }) => result.method),
      });
      return recorded.map(({ name, result }, index) => {
        const { result: recomputed } = again[index];
        return {
          name,
          recorded: result.value,
          recomputed: recomputed.ok ? recomputed.value : null,
        };
      });
    },
  });
}
