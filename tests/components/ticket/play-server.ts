/** A server of one desk that prices what it is sent, and can be away. */
import { compareRoutes, engineVersion, priceRoutes } from '@/pricing/index';
import { quoteDraftSchema, type Quote, type QuoteDraft } from '@/shared/contracts/quotes';
import { positionTotal, pricingRequestOf } from '@/shared/quote-terms';
import { desk, share, wheat } from '../../hooks/ticket-examples';

const maker = { id: '22222222-2222-4222-8222-222222222222', name: 'Analyst' };

function quoteFor(draft: QuoteDraft, count: number): Quote {
  const { contract, market } = pricingRequestOf(draft, desk);
  const routes = priceRoutes(contract, market);
  const primary = routes.find(({ result }) => result.ok);
  if (!primary?.result.ok) throw new Error('The example cannot be priced.');
  const { value, errorEstimate } = primary.result;
  const { verdict, refuted } = compareRoutes(routes, wheat.tolerance);
  return {
    ...draft,
    id: `55555555-5555-4555-8555-55555555555${count}`,
    number: `Q-000${count}`,
    underlying: wheat,
    value,
    errorEstimate,
    total: positionTotal(value, draft),
    tolerance: wheat.tolerance,
    verdict,
    refuted,
    strip: [],
    createdBy: maker,
    createdAt: '2026-12-01T10:00:05Z',
    expiryAt: '2027-03-01T16:30:00Z',
    expiryYears: contract.expiry,
    snapshotId: null,
    primaryRoute: primary.name,
    routes,
    engine: engineVersion,
  };
}

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
