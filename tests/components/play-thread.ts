/** The pricing thread of a test: the same engine, in the test's own thread. */
import { createPricingClient } from '@/hooks/pricing-client';
import type { PricingMessage, PricingReply } from '@/hooks/pricing-messages';
import {
  compareRoutes,
  impliedVolatility,
  price,
  priceRoutes,
  strikeForDelta,
} from '@/pricing/index';

let tell: (reply: PricingReply) => void = () => undefined;

function answer({ sequence, task }: PricingMessage): PricingReply {
  switch (task.kind) {
    case 'price': {
      const routes = priceRoutes(task.request.contract, task.request.market);
      const comparison = compareRoutes(routes, task.tolerance);
      return { sequence, kind: 'routes', routes, comparison };
    }
    case 'volatility':
      return {
        sequence,
        kind: 'solution',
        solution: impliedVolatility(task.request, task.premium),
      };
    case 'strike':
      return { sequence, kind: 'solution', solution: strikeForDelta(task.request, task.delta) };
    case 'reprice': {
      const { contract, market, methods } = task;
      const routes = methods.map((method) => ({
        name: method.name,
        result: price({ contract, market, method }),
      }));
      return { sequence, kind: 'routes', routes, comparison: null };
    }
  }
}

const client = createPricingClient({
  postMessage: (message) => queueMicrotask(() => tell(answer(message))),
  onReply: (listener) => {
    tell = listener;
  },
  onError: () => undefined,
});

export const pricingThread = () => client;
