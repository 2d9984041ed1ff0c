import { useLocalSearchParams, useRouter } from 'expo-router';
import { useCallback, useMemo } from 'react';
import { HistoryListScreen } from '@/components/history/history-list-screen';
import { Permitted } from '@/components/shell/permitted';
import { useDesk } from '@/hooks/use-desk';
import { verdicts } from '@/pricing/contract';
import type { HistoryFilter } from '@/shared/contracts/history';
import { isCalendarDate } from '@/shared/dates';

type Params = Partial<
  Record<'trade' | 'run' | 'book' | 'underlying' | 'verdict' | 'from' | 'to', string>
>;

const dayOf = (text: string | undefined) => (text && isCalendarDate(text) ? text : undefined);

/** The filters as they stand in the address; what is empty narrows nothing. */
const filterOf = (params: Params): HistoryFilter => ({
  trade: params.trade || undefined,
  run: params.run || undefined,
  bookId: params.book || undefined,
  underlyingId: params.underlying || undefined,
  verdict: verdicts.find((one) => one === params.verdict),
  from: dayOf(params.from),
  to: dayOf(params.to),
});

export default function HistoryRoute() {
  const desk = useDesk();
  const router = useRouter();
  const { trade, run, book, underlying, verdict, from, to } = useLocalSearchParams<Params>();
  const filter = useMemo(
    () => filterOf({ trade, run, book, underlying, verdict, from, to }),
    [trade, run, book, underlying, verdict, from, to],
  );
  const onFilter = useCallback(
    ({ bookId, underlyingId, ...rest }: HistoryFilter) =>
      router.setParams({
        trade: rest.trade,
        run: rest.run,
        book: bookId,
        underlying: underlyingId,
        verdict: rest.verdict,
        from: rest.from,
        to: rest.to,
      }),
    [router],
  );
  return (
    <Permitted permission="read-desk">
      <HistoryListScreen key={desk.id} desk={desk} filter={filter} onFilter={onFilter} />
    </Permitted>
  );
}
