import { useInfiniteQuery, useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { endpoints } from '@/shared/contracts';
import { maximumPageSize } from '@/shared/contracts/common';
import type { Study, StudyDraft, StudyStatus, StudySummary } from '@/shared/contracts/studies';
import { call } from './api';
import { saveText } from './save-file';

const pageSize = 50;
/** Rows come in about as fast as this. */
const progressEveryMs = 600;

const listKey = (deskId: string) => ['studies', deskId] as const;
const studyKey = (deskId: string, studyId: string) => ['study', deskId, studyId] as const;

export const isComputing = (status: StudyStatus): boolean =>
  status === 'queued' || status === 'running';

export function useStudies(deskId: string, status: StudyStatus | null) {
  return useInfiniteQuery({
    queryKey: [...listKey(deskId), status],
    initialPageParam: undefined as string | undefined,
    queryFn: ({ pageParam, signal }) =>
      call(endpoints.listStudies, {
        params: { deskId },
        query: { cursor: pageParam, limit: pageSize, status: status ?? undefined },
        signal,
      }),
    getNextPageParam: (page) => page.nextCursor ?? undefined,
    select: ({ pages }) => pages.flatMap(({ items }) => items),
  });
}

type StudiedTerms = Pick<StudySummary, 'kind' | 'exercise' | 'strike' | 'expiryDate'> & {
  underlyingId: string;
};

const isOf = (terms: StudiedTerms) => (study: StudySummary) =>
  study.underlying.id === terms.underlyingId &&
  study.kind === terms.kind &&
  study.exercise === terms.exercise &&
  Number(study.strike) === Number(terms.strike) &&
  study.expiryDate === terms.expiryDate;

/** Studies of these terms that have come to an end, those signed off before others. */
export function useStudiesOfTerms(deskId: string, terms: StudiedTerms) {
  return useQuery({
    queryKey: [...listKey(deskId), 'of-terms', terms],
    queryFn: async ({ signal }) => {
      const pages = await Promise.all(
        (['signed-off', 'finished'] as const).map((status) =>
          call(endpoints.listStudies, {
            params: { deskId },
            query: { status, limit: maximumPageSize },
            signal,
          }),
        ),
      );
      return pages.flatMap(({ items }) => items).filter(isOf(terms));
    },
  });
}

/** Asks again and again while rows are still being computed. */
export function useStudy(deskId: string, studyId: string) {
  return useQuery({
    queryKey: studyKey(deskId, studyId),
    queryFn: ({ signal }) => call(endpoints.getStudy, { params: { deskId, studyId }, signal }),
    refetchInterval: ({ state }) =>
      state.data && isComputing(state.data.status) ? progressEveryMs : false,
  });
}

function useKeepStudy(deskId: string) {
  const client = useQueryClient();
  return (study: Study) => {
    client.setQueryData(studyKey(deskId, study.id), study);
    void client.invalidateQueries({ queryKey: listKey(deskId) });
  };
}

export function useStartStudy(deskId: string) {
  const keep = useKeepStudy(deskId);
  return useMutation({
    mutationFn: ({ idempotencyKey, body }: { idempotencyKey: string; body: StudyDraft }) =>
      call(endpoints.createStudy, { params: { deskId }, body, idempotencyKey }),
    onSuccess: keep,
  });
}

export type StudyAct =
  { kind: 'cancel' } | { kind: 'sign-off' | 'send-back'; version: number; comment: string };

function perform(deskId: string, studyId: string, act: StudyAct): Promise<Study> {
  const params = { deskId, studyId };
  if (act.kind === 'cancel') return call(endpoints.cancelStudy, { params });
  const { version, comment } = act;
  const endpoint = act.kind === 'sign-off' ? endpoints.signOffStudy : endpoints.sendBackStudy;
  return call(endpoint, { params, body: { version, comment } });
}

/** A refused act shows the study as it stands now. */
export function useStudyAct(deskId: string, studyId: string) {
  const client = useQueryClient();
  const keep = useKeepStudy(deskId);
  return useMutation({
    mutationFn: (act: StudyAct) => perform(deskId, studyId, act),
    onSuccess: keep,
    onError: () => void client.invalidateQueries({ queryKey: studyKey(deskId, studyId) }),
  });
}

export function useStudyFile(deskId: string, studyId: string) {
  return useMutation({
    mutationFn: () => call(endpoints.getStudyFile, { params: { deskId, studyId } }),
    onSuccess: ({ fileName, csv }) => saveText(fileName, csv, 'text/csv;charset=utf-8'),
  });
}
