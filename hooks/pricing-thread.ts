import { createPricingClient, type PricingClient } from './pricing-client';

let client: PricingClient | null = null;

/** The one pricing thread of this tab, started when it is first needed. */
export function pricingThread(): PricingClient {
  if (client) return client;
  const worker = new Worker(new URL('./pricing.worker.ts', import.meta.url));
  client = createPricingClient({
    postMessage: (message) => worker.postMessage(message),
    onReply: (listener) => worker.addEventListener('message', ({ data }) => listener(data)),
    onError: (listener) => worker.addEventListener('error', listener),
  });
  return client;
}
