import type { Desk } from '@/server/models/desk';
import { Quote } from '@/server/models/quote';
import type { Underlying } from '@/server/models/underlying';
import type { User } from '@/server/models/user';
import type { QuoteDraft } from '@/shared/contracts/quotes';
import { addDays, dateInZone } from '@/shared/dates';

export const daysFromNow = (days: number) => addDays(dateInZone(Date.now(), 'Etc/UTC'), days);

/** A draft that the server takes, on a future unless the market says otherwise. */
export const quoteDraft = (
  underlying: Underlying,
  fields: Partial<QuoteDraft> = {},
): QuoteDraft => ({
  underlyingId: underlying.id,
  direction: 'sell',
  quantity: '10',
  contractSize: '50',
  kind: 'put',
  exercise: 'american',
  strike: '210',
  expiryDate: daysFromNow(182),
  market:
    underlying.kind === 'future'
      ? { spot: 212.4, rate: 0.03, carry: 'future', volatility: 0.245 }
      : { spot: 212.4, rate: 0.03, yield: 0.01, volatility: 0.245 },
  pricedAt: new Date().toISOString(),
  indicativeValue: 13.2343,
  note: '',
  ...fields,
});

/** Far above what the desk itself counts to in a test. */
let count = 100_000;

/** A stored quote whose numbers mean nothing: for lists and permissions, never for prices. */
export const makeQuote = (desk: Desk, underlying: Underlying, user: User, createdAt = new Date()) =>
  Quote.create({
    deskId: desk.id,
    number: `Q-${(count += 1)}`,
    underlyingId: underlying.id,
    direction: 'sell',
    quantity: '10',
    contractSize: '50',
    kind: 'put',
    exercise: 'european',
    strike: '210',
    expiryDate: '2030-06-03',
    expiryAt: new Date('2030-06-03T15:30:00Z'),
    expiryYears: 1,
    spot: 212.4,
    rate: 0.03,
    yield: null,
    volatility: 0.245,
    snapshotId: null,
    pricedAt: new Date('2026-11-01T10:00:00Z'),
    value: 13.5,
    errorEstimate: 1e-13,
    total: '-6750',
    tolerance: 0.01,
    verdict: 'agree',
    refuted: false,
    primaryRoute: 'closed-form',
    routes: [],
    engine: 'test',
    indicativeValue: 13.5,
    note: '',
    createdById: user.id,
    createdAt,
  });
