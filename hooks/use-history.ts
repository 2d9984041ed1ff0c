import { useInfiniteQuery, useQuery } from '@tanstack/react-query';
import { endpoints } from '@/shared/contracts';
import type { HistoryFilter } from '@/shared/contracts/history';
import { call } from './api';

/** A trade that is valued every day fills a quarter of a year with one page. */
const pageSize = 100;

export function useHistory(deskId: string, filter: HistoryFilter) {
  return useInfiniteQuery({
    queryKey: ['history', deskId, filter],
    initialPageParam: undefined as string | undefined,
    queryFn: ({ pageParam, signal }) =>
      call(endpoints.listHistory, {
        params: { deskId },
        query: { ...filter, cursor: pageParam, limit: pageSize },
        signal,
      }),
    getNextPageParam: (page) => page.nextCursor ?? undefined,
    select: ({ pages }) => pages.flatMap(({ items }) => items),
    placeholderData: (previous) => previous,
  });
}

/** The value itself never changes; what is on record about it may grow. */
export function useHistoryValue(deskId: string, position: string) {
  return useQuery({
    queryKey: ['history-value', deskId, position],
    queryFn: ({ signal }) =>
      call(endpoints.getHistoryValue, { params: { deskId, position }, signal }),
  });
}
