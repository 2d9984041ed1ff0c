import { createPricingClient, PricingThreadError } from '@/hooks/pricing-client';
import type { PricingMessage, PricingReply } from '@/hooks/pricing-messages';
import type { PricingRequest } from '@/pricing/contract';

const request: PricingRequest = {
  contract: { payoff: 'vanilla', exercise: 'european', kind: 'call', strike: 100, expiry: 0.5 },
  market: { spot: 100, rate: 0.05, yield: 0.02, volatility: 0.2 },
};
const task = { kind: 'price', request, tolerance: 0.001 } as const;

/** A thread that answers only when told to. */
function playThread() {
  const sent: PricingMessage[] = [];
  let onReply: (reply: PricingReply) => void = () => undefined;
  let onError: () => void = () => undefined;
  const client = createPricingClient({
    postMessage: (message) => sent.push(message),
    onReply: (listener) => {
      onReply = listener;
    },
    onError: (listener) => {
      onError = listener;
    },
  });
  return {
    client,
    sent,
    answer: (sequence: number) =>
      onReply({ sequence, kind: 'routes', routes: [], comparison: null }),
    solve: (sequence: number, value: number) =>
      onReply({ sequence, kind: 'solution', solution: { ok: true, value } }),
    fail: () => onError(),
  };
}

describe('the page’s end of the pricing thread', () => {
  it('drops answers to terms that are no longer wanted', () => {
    const { client, sent, answer } = playThread();
    const [first, second] = [jest.fn(), jest.fn()];
    client.price(task, first, jest.fn());
    client.price(task, second, jest.fn());
    for (const { sequence } of sent) answer(sequence);
    expect(first).not.toHaveBeenCalled();
    expect(second).toHaveBeenCalledTimes(1);
  });

  it('says nothing more once given up', () => {
    const { client, sent, answer } = playThread();
    const onRoutes = jest.fn();
    const giveUp = client.price(task, onRoutes, jest.fn());
    giveUp();
    answer(sent[0].sequence);
    expect(onRoutes).not.toHaveBeenCalled();
  });

  it('answers questions beside the price, in any order', async () => {
    const { client, sent, solve, answer } = playThread();
    const onRoutes = jest.fn();
    client.price(task, onRoutes, jest.fn());
    const volatility = client.ask({ kind: 'volatility', request, premium: 5 });
    const strike = client.ask({ kind: 'strike', request, delta: 0.25 });
    solve(sent[2].sequence, 108);
    solve(sent[1].sequence, 0.19);
    answer(sent[0].sequence);
    expect(await volatility).toEqual({ ok: true, value: 0.19 });
    expect(await strike).toEqual({ ok: true, value: 108 });
    expect(onRoutes).toHaveBeenCalledTimes(1);
  });

  it('tells everyone who waits, and everyone after, that the thread stopped', async () => {
    const { client, fail } = playThread();
    const onError = jest.fn();
    client.price(task, jest.fn(), onError);
    const asked = client.ask({ kind: 'volatility', request, premium: 5 });
    fail();
    await expect(asked).rejects.toBeInstanceOf(PricingThreadError);
    expect(onError).toHaveBeenCalledTimes(1);
    client.price(task, jest.fn(), onError);
    expect(onError).toHaveBeenCalledTimes(2);
  });
});
