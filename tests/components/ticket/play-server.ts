/** A server of one desk that prices what it is sent, and can be away. */
import { quoteDraftSchema, type Quote } from '@/shared/contracts/quotes';
import { share, wheat } from '../../hooks/ticket-examples';
import { quoteFor } from '../play-quotes';

const answerOf = (status: number, body: unknown) => ({
  ok: status < 400,
  status,
  json: () => Promise.resolve(body),
});

const refusal = {
  type: 'about:blank',
  title: 'Some fields need another look; each one says what to do.',
  status: 422,
  code: 'validation-failed',
  requestId: 'request-1',
  issues: [
    { path: 'strike', code: 'out-of-range', message: 'Give a strike that the desk trades.' },
  ],
};

export function playServer() {
  const state = { away: false, refuses: false, posted: [] as string[] };
  const quotes = new Map<string, Quote>();
  const fetch = jest.fn((url: string, init: RequestInit) => {
    if (state.away) return Promise.reject(new TypeError('Failed to fetch'));
    if (url.endsWith('/underlyings'))
      return Promise.resolve(answerOf(200, { underlyings: [wheat, share] }));
    const key = new Headers(init.headers).get('idempotency-key') ?? '';
    state.posted.push(key);
    if (state.refuses) return Promise.resolve(answerOf(422, refusal));
    const draft = quoteDraftSchema.parse(JSON.parse(String(init.body)));
    const quote = quotes.get(key) ?? quoteFor(draft, quotes.size + 1);
    quotes.set(key, quote);
    return Promise.resolve(answerOf(201, quote));
  });
  Object.assign(globalThis, { fetch });
  return { state, quotes };
}
