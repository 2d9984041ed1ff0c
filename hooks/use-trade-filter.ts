import { useLocalSearchParams, useRouter } from 'expo-router';
import { useCallback, useMemo } from 'react';
import { verdicts } from '@/pricing/contract';
import { sortDirections, statusFilters, tradeSorts } from '@/shared/contracts/trades';
import type { TradeFilter } from './use-trades';

const oneOf = <Choice extends string>(choices: readonly Choice[], text: string | undefined) =>
  choices.find((choice) => choice === text) ?? null;

type Params = Partial<
  Record<'search' | 'status' | 'verdict' | 'underlying' | 'sort' | 'way', string>
>;

/** Filters and order of a list of trades, in the address: a link opens the same view. */
export function useTradeFilter(bookId: string | null) {
  const router = useRouter();
  const { search, status, verdict, underlying, sort, way } = useLocalSearchParams<Params>();
  const filter = useMemo(
    (): TradeFilter => ({
      bookId,
      search: search ?? '',
      status: oneOf(statusFilters, status),
      verdict: oneOf(verdicts, verdict),
      underlyingId: underlying ?? null,
      sort: oneOf(tradeSorts, sort) ?? 'number',
      direction: oneOf(sortDirections, way) ?? 'descending',
    }),
    [bookId, search, status, verdict, underlying, sort, way],
  );
  const onFilter = useCallback(
    (change: Partial<TradeFilter>) => {
      const next = { ...filter, ...change };
      router.setParams({
        search: next.search || undefined,
        status: next.status ?? undefined,
        verdict: next.verdict ?? undefined,
        underlying: next.underlyingId ?? undefined,
        sort: next.sort,
        way: next.direction,
      });
    },
    [router, filter],
  );
  return { filter, onFilter };
}
