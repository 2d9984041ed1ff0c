import { randomUUID } from 'node:crypto';
import type { Transaction } from 'sequelize';
import { engineVersion, price } from '@/pricing/index';
import type { PricingRequest } from '@/pricing/contract';
import { appendRecord, appendValuations } from '@/server/chain/append';
import { sequelize } from '@/server/database';
import type { Desk } from '@/server/models/desk';
import type { Underlying } from '@/server/models/underlying';
import type { RecordBody, ValuationBody } from '@/shared/contracts/chain-bodies';

type Method = ValuationBody['request']['method'];

const primaryMethod: Method = { name: 'closed-form' };
const checkMethod: Method = {
  name: 'lattice-symmetric',
  steps: 101,
  smoothing: 'none',
};

/** The body of one route's entry, with what the engine really finds. */
export function valuationBody(
  underlying: Underlying,
  fields: Partial<ValuationBody> = {},
): ValuationBody {
  const role = fields.role ?? 'primary';
  const method = role === 'primary' ? primaryMethod : checkMethod;
  const request = {
    contract: { payoff: 'vanilla', exercise: 'european', kind: 'put', strike: 210, expiry: 0.5 },
    market: { spot: 212.4, rate: 0.03, carry: 'future', volatility: 0.245 },
    method,
  } satisfies PricingRequest;
  return {
    kind: 'valuation',
    runId: randomUUID(),
    runNumber: 'R-0001',
    tradeId: randomUUID(),
    tradeNumber: 'T-0001',
    tradeVersionId: randomUUID(),
    route: method.name,
    role,
    request,
    result: price(fields.request ?? request),
    engine: engineVersion,
    snapshotId: randomUUID(),
    policyId: randomUUID(),
    valuedAt: '2026-11-30T16:30:00.000Z',
    underlyingId: underlying.id,
    bookId: randomUUID(),
    bookCode: 'GRAIN',
    tolerance: 0.01,
    ...(role === 'primary' ? { verdict: 'agree' as const, refuted: false } : {}),
    ...fields,
  };
}

/** A primary entry and its check, as a run makes them. */
export function valuationPair(underlying: Underlying, fields: Partial<ValuationBody> = {}) {
  const primary = valuationBody(underlying, fields);
  const { runId, runNumber, tradeId, tradeNumber, tradeVersionId, bookId, valuedAt } = primary;
  const shared = { runId, runNumber, tradeId, tradeNumber, tradeVersionId, bookId, valuedAt };
  const { snapshotId, policyId } = primary;
  return [
    primary,
    valuationBody(underlying, { ...shared, snapshotId, policyId, role: 'check' }),
  ] as const;
}

export const recordBody = (fields: Partial<RecordBody> = {}): RecordBody => ({
  kind: 'trade-event',
  event: 'proposed',
  subject: { type: 'trade', id: randomUUID() },
  by: randomUUID(),
  details: {},
  ...fields,
});

const inTransaction = <Answer>(work: (transaction: Transaction) => Promise<Answer>) =>
  sequelize.transaction(work);

export const storeValuations = (desk: Desk, bodies: readonly ValuationBody[]) =>
  inTransaction((transaction) => appendValuations(transaction, desk.id, bodies));

export const storeRecord = (desk: Desk, body: RecordBody) =>
  inTransaction((transaction) => appendRecord(transaction, desk.id, body));
