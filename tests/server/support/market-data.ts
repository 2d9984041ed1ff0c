/** Shorthands for tests of closes and policies: acts of members on a desk, through the whole server. */
import { call } from './server';
import { randomUUID } from 'node:crypto';
import type { Market } from '@/pricing/contract';
import type { Desk } from '@/server/models/desk';
import type { Underlying } from '@/server/models/underlying';
import * as contracts from '@/shared/contracts/market-data';
import type { Snapshot } from '@/shared/contracts/market-data';
import * as policies from '@/shared/contracts/policies';
import type { Policy } from '@/shared/contracts/policies';
import { addDays, dateInZone } from '@/shared/dates';
import type { Endpoint } from '@/shared/endpoint';
import type { Issue } from '@/shared/errors';
import type { TestMember } from '../../factories/people';

type Refusal = { code: string; issues: Issue[] };
export type Answer<Body> = { status: number; body: Body & Refusal };

/** A day of the desk, counted from its today. */
export const dayBefore = ({ timeZone }: Desk, days: number) =>
  addDays(dateInZone(Date.now(), timeZone), -days);

export const futureMarket = {
  spot: 212.4,
  rate: 0.026,
  carry: 'future',
  volatility: 0.245,
} as const;

export const quotesOf = (
  underlyings: readonly Underlying[],
  changes: Partial<Pick<Market, 'spot' | 'volatility'>> = {},
) => underlyings.map(({ id }) => ({ underlyingId: id, market: { ...futureMarket, ...changes } }));

const sender =
  <Body>(desk: Desk) =>
  async (
    endpoint: Endpoint,
    who: TestMember,
    params: Record<string, string>,
    body: object,
    idempotencyKey: string = randomUUID(),
  ): Promise<Answer<Body>> => {
    const all = { deskId: desk.id, ...params };
    const answer = await call(endpoint, { params: all, token: who.token, body, idempotencyKey });
    return { status: answer.status, body: answer.body };
  };

type Draft = Partial<contracts.SnapshotDraft> & Pick<contracts.SnapshotDraft, 'date' | 'quotes'>;

export function closeActs(desk: Desk) {
  const send = sender<Snapshot>(desk);
  const filled = (draft: Draft) => ({ source: 'typed', confirmedWarnings: [], ...draft });
  return {
    enter: (who: TestMember, draft: Draft, key?: string) =>
      send(contracts.createSnapshot, who, {}, filled(draft), key),
    save: (who: TestMember, { id, version }: Pick<Snapshot, 'id' | 'version'>, draft: Draft) =>
      send(contracts.saveSnapshot, who, { snapshotId: id }, { ...filled(draft), version }),
    approve: (
      who: TestMember,
      { id, version }: Pick<Snapshot, 'id' | 'version'>,
      confirmedWarnings: string[] = [],
    ) => send(contracts.approveSnapshot, who, { snapshotId: id }, { version, confirmedWarnings }),
    restate: (who: TestMember, id: string) =>
      send(
        contracts.restateSnapshot,
        who,
        { snapshotId: id },
        { reason: 'The exchange has corrected its settlement price' },
      ),
    read: async (who: TestMember, id: string): Promise<Snapshot> =>
      (await send(contracts.getSnapshot, who, { snapshotId: id }, {})).body,
  };
}

export function policyActs(desk: Desk) {
  const send = sender<Policy>(desk);
  return {
    write: (who: TestMember, draft: object) => send(policies.createPolicy, who, {}, draft),
    save: (who: TestMember, { id, version }: Policy, draft: object) =>
      send(policies.savePolicy, who, { policyId: id }, { ...draft, version }),
    approve: (who: TestMember, { id, version }: Pick<Policy, 'id' | 'version'>) =>
      send(policies.approvePolicy, who, { policyId: id }, { version }),
    list: async (who: TestMember): Promise<Policy[]> => {
      const params = { deskId: desk.id };
      return (await call(policies.listPolicies, { params, token: who.token })).body.policies;
    },
  };
}
