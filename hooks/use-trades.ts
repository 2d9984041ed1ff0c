import {
  useInfiniteQuery,
  useMutation,
  useQuery,
  useQueryClient,
  type QueryClient,
} from '@tanstack/react-query';
import type { Verdict } from '@/pricing/contract';
import { endpoints } from '@/shared/contracts';
import type { TradeAmendment, TradeProposal } from '@/shared/contracts/trade-acts';
import type { SortDirection, statusFilters, Trade, TradeSort } from '@/shared/contracts/trades';
import type { BodyOf } from '@/shared/endpoint';
import { call } from './api';
import { booksKey } from './use-books';

/** What a list of trades shows, and in which order. Lives in the address. */
export type TradeFilter = {
  /** Null for every book of the desk. */
  bookId: string | null;
  search: string;
  status: (typeof statusFilters)[number] | null;
  verdict: Verdict | null;
  underlyingId: string | null;
  sort: TradeSort;
  direction: SortDirection;
};

const pageSize = 50;

const tradesKey = (deskId: string) => ['trades', deskId] as const;
const tradeKey = (deskId: string, tradeId: string) => ['trade', deskId, tradeId] as const;

export function useTrades(deskId: string, filter: TradeFilter) {
  const { bookId, search, status, verdict, underlyingId, sort, direction } = filter;
  return useInfiniteQuery({
    queryKey: [...tradesKey(deskId), filter],
    initialPageParam: undefined as string | undefined,
    queryFn: ({ pageParam, signal }) =>
      call(endpoints.listTrades, {
        params: { deskId },
        query: {
          cursor: pageParam,
          limit: pageSize,
          bookId: bookId ?? undefined,
          search: search === '' ? undefined : search,
          status: status ?? undefined,
          verdict: verdict ?? undefined,
          underlyingId: underlyingId ?? undefined,
          sort,
          direction,
        },
        signal,
      }),
    getNextPageParam: (page) => page.nextCursor ?? undefined,
    select: ({ pages }) => pages.flatMap(({ items }) => items),
    // Rows stay in sight until those of the new order or filter arrive.
    placeholderData: (previous) => previous,
  });
}

/** The first few trades that wait for approval, newest first. */
export function useWaitingTrades(deskId: string, limit: number) {
  return useQuery({
    queryKey: [...tradesKey(deskId), 'waiting', limit],
    queryFn: ({ signal }) =>
      call(endpoints.listTrades, {
        params: { deskId },
        query: { status: 'waiting', limit },
        signal,
      }),
    select: ({ items }) => items,
  });
}

export function useTrade(deskId: string, tradeId: string) {
  return useQuery({
    queryKey: tradeKey(deskId, tradeId),
    queryFn: ({ signal }) => call(endpoints.getTrade, { params: { deskId, tradeId }, signal }),
  });
}

function putTrade(client: QueryClient, deskId: string, trade: Trade) {
  client.setQueryData(tradeKey(deskId, trade.id), trade);
  void client.invalidateQueries({ queryKey: tradesKey(deskId) });
  void client.invalidateQueries({ queryKey: booksKey(deskId) });
}

export function useProposeTrade(deskId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ body, idempotencyKey }: { body: TradeProposal; idempotencyKey: string }) =>
      call(endpoints.proposeTrade, { params: { deskId }, body, idempotencyKey }),
    onSuccess: (trade) => putTrade(client, deskId, trade),
  });
}

export function useAmendTrade(deskId: string, tradeId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ body, idempotencyKey }: { body: TradeAmendment; idempotencyKey: string }) =>
      call(endpoints.amendTrade, { params: { deskId, tradeId }, body, idempotencyKey }),
    onSuccess: (trade) => putTrade(client, deskId, trade),
  });
}

/** A binding act on a trade, as its dialog hands it over. */
export type TradeAct =
  | { kind: 'approve'; body: BodyOf<typeof endpoints.approveTrade> }
  | { kind: 'return'; body: BodyOf<typeof endpoints.returnTrade> }
  | { kind: 'close'; body: BodyOf<typeof endpoints.closeTrade> }
  | { kind: 'expire'; body: BodyOf<typeof endpoints.recordExpiry> };

function perform(params: { deskId: string; tradeId: string }, act: TradeAct): Promise<Trade> {
  switch (act.kind) {
    case 'approve':
      return call(endpoints.approveTrade, { params, body: act.body });
    case 'return':
      return call(endpoints.returnTrade, { params, body: act.body });
    case 'close':
      return call(endpoints.closeTrade, { params, body: act.body });
    case 'expire':
      return call(endpoints.recordExpiry, { params, body: act.body });
  }
}

export function useTradeAct(deskId: string, tradeId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (act: TradeAct) => perform({ deskId, tradeId }, act),
    onSuccess: (trade) => putTrade(client, deskId, trade),
  });
}

/** After a stale version: what the other person made of it. */
export function useReloadTrade(deskId: string, tradeId: string) {
  const client = useQueryClient();
  return () => client.invalidateQueries({ queryKey: tradeKey(deskId, tradeId) });
}
