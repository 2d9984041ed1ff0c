import { useInfiniteQuery, useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type { Verdict } from '@/pricing/contract';
import { endpoints } from '@/shared/contracts';
import type { QuoteDraft } from '@/shared/contracts/quotes';
import { call } from './api';

export type QuoteFilter = { search: string; verdict: Verdict | null };

const pageSize = 50;

export function useQuotes(deskId: string, { search, verdict }: QuoteFilter) {
  return useInfiniteQuery({
    queryKey: ['quotes', deskId, search, verdict],
    initialPageParam: undefined as string | undefined,
    queryFn: ({ pageParam, signal }) =>
      call(endpoints.listQuotes, {
        params: { deskId },
        query: {
          cursor: pageParam,
          limit: pageSize,
          search: search === '' ? undefined : search,
          verdict: verdict ?? undefined,
        },
        signal,
      }),
    getNextPageParam: (page) => page.nextCursor ?? undefined,
    select: ({ pages }) => pages.flatMap(({ items }) => items),
    // Typing in the search field keeps the rows that stand there until the new ones arrive.
    placeholderData: (previous) => previous,
  });
}

/** A quote never changes once it is saved, so that it is read once. */
export function useQuote(deskId: string, quoteId: string | null) {
  return useQuery({
    queryKey: ['quote', deskId, quoteId],
    queryFn: ({ signal }) =>
      call(endpoints.getQuote, { params: { deskId, quoteId: quoteId ?? '' }, signal }),
    enabled: quoteId !== null,
    staleTime: Infinity,
  });
}

export type QuoteToSave = { idempotencyKey: string; body: QuoteDraft };

export function useSaveQuote(deskId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ idempotencyKey, body }: QuoteToSave) =>
      call(endpoints.createQuote, { params: { deskId }, body, idempotencyKey }),
    onSuccess: (quote) => {
      client.setQueryData(['quote', deskId, quote.id], quote);
      void client.invalidateQueries({ queryKey: ['quotes', deskId] });
    },
  });
}
