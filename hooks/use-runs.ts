import { useInfiniteQuery, useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import type { Verdict } from '@/pricing/contract';
import { endpoints } from '@/shared/contracts';
import type {
  ExceptionalValuation,
  ExceptionKind,
  Run,
  RunDraft,
  RunStatus,
} from '@/shared/contracts/runs';
import type { BodyOf } from '@/shared/endpoint';
import { call } from './api';

const pageSize = 50;
/** A page of exceptions is read from top to bottom, one after the other. */
const exceptionPageSize = 20;
/** About as often as another chunk of trades is done. */
const progressEveryMs = 700;
const rowsEveryMs = 1_500;

const listKey = (deskId: string) => ['runs', deskId] as const;
const runKey = (deskId: string, runId: string) => ['run', deskId, runId] as const;
const foundKey = (deskId: string, runId: string) => ['run-found', deskId, runId] as const;

export const isActive = (status: RunStatus): boolean => status === 'queued' || status === 'running';

export type RunFilter = { status: RunStatus | null; bookId: string | null };

/** Asks again while one of the runs in sight is being worked off. */
export function useRuns(deskId: string, filter: RunFilter) {
  return useInfiniteQuery({
    queryKey: [...listKey(deskId), filter],
    initialPageParam: undefined as string | undefined,
    queryFn: ({ pageParam, signal }) =>
      call(endpoints.listRuns, {
        params: { deskId },
        query: {
          cursor: pageParam,
          limit: pageSize,
          status: filter.status ?? undefined,
          bookId: filter.bookId ?? undefined,
        },
        signal,
      }),
    getNextPageParam: (page) => page.nextCursor ?? undefined,
    select: ({ pages }) => pages.flatMap(({ items }) => items),
    refetchInterval: ({ state }) =>
      state.data?.pages.some(({ items }) => items.some(({ status }) => isActive(status)))
        ? rowsEveryMs
        : false,
  });
}

export function useRun(deskId: string, runId: string) {
  return useQuery({
    queryKey: runKey(deskId, runId),
    queryFn: ({ signal }) => call(endpoints.getRun, { params: { deskId, runId }, signal }),
    refetchInterval: ({ state }) =>
      state.data && isActive(state.data.status) ? progressEveryMs : false,
  });
}

/** How long the rest takes at the pace since this page was opened; null while that is not known. */
export function useTimeLeft({ done, total }: Run, readAtMs: number): number | null {
  const [first] = useState({ done, readAtMs });
  if (done === first.done || readAtMs === first.readAtMs) return null;
  return ((total - done) * (readAtMs - first.readAtMs)) / (done - first.done);
}

/** A run whose rows are read: they are read anew when it ends. */
export type RunRows = Pick<Run, 'id' | 'status'>;

export type ExceptionFilter = { state: 'open' | 'answered' | null; kind: ExceptionKind | null };

export function useRunExceptions(deskId: string, run: RunRows, filter: ExceptionFilter) {
  return useInfiniteQuery({
    queryKey: [...foundKey(deskId, run.id), 'exceptions', isActive(run.status), filter],
    initialPageParam: undefined as string | undefined,
    queryFn: ({ pageParam, signal }) =>
      call(endpoints.listRunExceptions, {
        params: { deskId, runId: run.id },
        query: {
          cursor: pageParam,
          limit: exceptionPageSize,
          state: filter.state ?? undefined,
          kind: filter.kind ?? undefined,
        },
        signal,
      }),
    getNextPageParam: (page) => page.nextCursor ?? undefined,
    select: ({ pages }) => pages.flatMap(({ items }) => items),
    refetchInterval: isActive(run.status) ? rowsEveryMs : false,
    placeholderData: (previous) => previous,
  });
}

export function useRunException(deskId: string, runId: string, exceptionId: string | null) {
  return useQuery({
    queryKey: [...foundKey(deskId, runId), 'exception', exceptionId],
    enabled: exceptionId !== null,
    queryFn: ({ signal }) =>
      call(endpoints.getRunException, {
        params: { deskId, runId, exceptionId: exceptionId ?? '' },
        signal,
      }),
  });
}

export type ValueFilter = { verdict: Verdict | null; bookId: string | null };

export function useRunValuations(deskId: string, run: RunRows, filter: ValueFilter) {
  return useInfiniteQuery({
    queryKey: [...foundKey(deskId, run.id), 'valuations', isActive(run.status), filter],
    initialPageParam: undefined as string | undefined,
    queryFn: ({ pageParam, signal }) =>
      call(endpoints.listRunValuations, {
        params: { deskId, runId: run.id },
        query: {
          cursor: pageParam,
          limit: pageSize,
          verdict: filter.verdict ?? undefined,
          bookId: filter.bookId ?? undefined,
        },
        signal,
      }),
    getNextPageParam: (page) => page.nextCursor ?? undefined,
    select: ({ pages }) => pages.flatMap(({ items }) => items),
    refetchInterval: isActive(run.status) ? rowsEveryMs : false,
    placeholderData: (previous) => previous,
  });
}

function useKeepRun(deskId: string) {
  const client = useQueryClient();
  return (run: Run) => {
    client.setQueryData(runKey(deskId, run.id), run);
    void client.invalidateQueries({ queryKey: listKey(deskId) });
  };
}

export function useStartRun(deskId: string) {
  const keep = useKeepRun(deskId);
  return useMutation({
    mutationFn: ({ idempotencyKey, body }: { idempotencyKey: string; body: RunDraft }) =>
      call(endpoints.createRun, { params: { deskId }, body, idempotencyKey }),
    onSuccess: keep,
  });
}

/** Repeats a run; the new one is handed back, and the old one then names it. */
export function useRerun(deskId: string, runId: string) {
  const client = useQueryClient();
  const keep = useKeepRun(deskId);
  return useMutation({
    mutationFn: (idempotencyKey: string) =>
      call(endpoints.rerunRun, { params: { deskId, runId }, idempotencyKey }),
    onSuccess: (rerun) => {
      keep(rerun);
      void client.invalidateQueries({ queryKey: runKey(deskId, runId) });
    },
  });
}

export type RunAct =
  { kind: 'cancel' } | { kind: 'sign-off'; body: BodyOf<typeof endpoints.signOffRun> };

export function useRunAct(deskId: string, runId: string) {
  const keep = useKeepRun(deskId);
  return useMutation({
    mutationFn: (act: RunAct) => {
      const params = { deskId, runId };
      if (act.kind === 'cancel') return call(endpoints.cancelRun, { params });
      return call(endpoints.signOffRun, { params, body: act.body });
    },
    onSuccess: keep,
  });
}

/** After somebody else was quicker: what they made of the run. */
export function useReloadRun(deskId: string, runId: string) {
  const client = useQueryClient();
  return () =>
    Promise.all([
      client.invalidateQueries({ queryKey: runKey(deskId, runId) }),
      client.invalidateQueries({ queryKey: foundKey(deskId, runId) }),
    ]);
}

export type ExceptionAct =
  | { kind: 'override'; body: BodyOf<typeof endpoints.answerByOverride> }
  | { kind: 'study'; body: BodyOf<typeof endpoints.answerByStudy> };

/** An answer changes the run's counts as well, and who may sign it off. */
export function useAnswerException(deskId: string, runId: string, exceptionId: string) {
  const reload = useReloadRun(deskId, runId);
  return useMutation({
    mutationFn: (act: ExceptionAct): Promise<ExceptionalValuation> => {
      const params = { deskId, runId, exceptionId };
      return act.kind === 'override'
        ? call(endpoints.answerByOverride, { params, body: act.body })
        : call(endpoints.answerByStudy, { params, body: act.body });
    },
    onSuccess: reload,
  });
}
