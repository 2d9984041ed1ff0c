/** Shorthands for tests of runs: acts of members on a desk, through the whole server. */
import { call } from './server';
import { randomUUID } from 'node:crypto';
import type { Desk } from '@/server/models/desk';
import * as contracts from '@/shared/contracts/runs';
import type { ExceptionalValuation, Run, RunValuation } from '@/shared/contracts/runs';
import type { Endpoint } from '@/shared/endpoint';
import type { Issue } from '@/shared/errors';
import type { TestMember } from '../../factories/people';

type Refusal = { code: string; issues: Issue[] };
export type Answer<Body> = { status: number; body: Body & Refusal };

export const comment = 'All exceptions were looked into and answered.';
export const reason = 'The dealer’s own mark, confirmed by two others';

/** What tells one refusal from another. */
export const told = ({ status, body }: Answer<unknown>) => [status, body.code];

export const sentenceOf = ({ body }: Answer<unknown>) => body.issues[0].message;

export function runActs(desk: Desk) {
  const send =
    <Body>(endpoint: Endpoint) =>
    async (
      who: TestMember,
      params: Record<string, string>,
      body: object = {},
      key: string = randomUUID(),
    ): Promise<Answer<Body>> => {
      const all = { deskId: desk.id, ...params };
      const query = endpoint.method === 'GET' ? (body as Record<string, string>) : {};
      const answer = await call(endpoint, {
        params: all,
        query,
        token: who.token,
        body,
        idempotencyKey: key,
      });
      return { status: answer.status, body: answer.body };
    };
  type Page<Item> = { items: Item[]; nextCursor: string | null };
  type Key = { runId: string; exceptionId: string };
  return {
    start: (who: TestMember, draft: contracts.RunDraft, key?: string) =>
      send<Run>(contracts.createRun)(who, {}, draft, key),
    read: async (who: TestMember, runId: string) =>
      (await send<Run>(contracts.getRun)(who, { runId })).body,
    list: async (who: TestMember, query: Record<string, string> = {}) =>
      (await send<Page<Run>>(contracts.listRuns)(who, {}, query)).body,
    cancel: (who: TestMember, runId: string) => send<Run>(contracts.cancelRun)(who, { runId }),
    rerun: (who: TestMember, runId: string) => send<Run>(contracts.rerunRun)(who, { runId }),
    signOff: (who: TestMember, { id, version }: Pick<Run, 'id' | 'version'>) =>
      send<Run>(contracts.signOffRun)(who, { runId: id }, { version, comment }),
    valuations: async (who: TestMember, runId: string, query: Record<string, string> = {}) =>
      (await send<Page<RunValuation>>(contracts.listRunValuations)(who, { runId }, query)).body,
    exceptions: async (who: TestMember, runId: string, query: Record<string, string> = {}) =>
      (await send<Page<ExceptionalValuation>>(contracts.listRunExceptions)(who, { runId }, query))
        .body,
    override: (who: TestMember, key: Key, value: string | null = null) =>
      send<ExceptionalValuation>(contracts.answerByOverride)(who, key, { value, reason }),
    study: (who: TestMember, key: Key, studyId: string) =>
      send<ExceptionalValuation>(contracts.answerByStudy)(who, key, { studyId, reason }),
  };
}
