import { keepQuote, letGo, mayBeSentLater } from '@/hooks/kept-quotes';
import { ApiError } from '@/shared/api-client';
import type { QuoteDraft } from '@/shared/contracts/quotes';
import { wheat } from './ticket-examples';

const body: QuoteDraft = {
  underlyingId: wheat.id,
  direction: 'sell',
  quantity: '10',
  contractSize: '500',
  kind: 'put',
  exercise: 'american',
  strike: '210',
  expiryDate: '2027-06-01',
  market: { spot: 212.4, rate: 0.03, carry: 'future', volatility: 0.245 },
  pricedAt: '2026-12-01T10:00:00.000Z',
  indicativeValue: 13.2343,
  note: '',
};

const at = '2026-12-01T10:00:01.000Z';

function keys() {
  let count = 0;
  return () => `key-${(count += 1)}`;
}

describe('quotes on their way to the server', () => {
  it('have one key per content, however often they are sent', () => {
    const newKey = keys();
    const first = keepQuote([], body, newKey, at);
    const again = keepQuote(first.kept, { ...body }, newKey, at);
    expect(again.quote.idempotencyKey).toBe(first.quote.idempotencyKey);
    expect(again.kept).toHaveLength(1);
    const other = keepQuote(again.kept, { ...body, strike: '205' }, newKey, at);
    expect(other.quote.idempotencyKey).not.toBe(first.quote.idempotencyKey);
    expect(letGo(other.kept, first.quote.idempotencyKey)).toEqual([other.quote]);
  });

  it.each([
    ['no-connection', true],
    ['unexpected', true],
    ['not-ready', true],
    ['session-ended', true],
    ['validation-failed', false],
    ['not-permitted', false],
  ] as const)('are kept after %s: %p', (code, kept) => {
    expect(mayBeSentLater(new ApiError(code, ''))).toBe(kept);
  });
});
