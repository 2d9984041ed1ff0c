import { useLocalSearchParams, useRouter } from 'expo-router';
import { useCallback, useMemo } from 'react';
import { QuoteListScreen } from '@/components/quotes/quote-list-screen';
import { Permitted } from '@/components/shell/permitted';
import { verdicts } from '@/pricing/contract';
import { useDesk } from '@/hooks/use-desk';
import type { QuoteFilter } from '@/hooks/use-quotes';

export default function QuoteListRoute() {
  const desk = useDesk();
  const router = useRouter();
  const params = useLocalSearchParams<{ search?: string; verdict?: string }>();
  const filter = useMemo(
    (): QuoteFilter => ({
      search: params.search ?? '',
      verdict: verdicts.find((one) => one === params.verdict) ?? null,
    }),
    [params.search, params.verdict],
  );
  const onFilter = useCallback(
    ({ search, verdict }: QuoteFilter) =>
      router.setParams({ search: search || undefined, verdict: verdict ?? undefined }),
    [router],
  );
  return (
    <Permitted permission="read-desk">
      <QuoteListScreen key={desk.id} desk={desk} filter={filter} onFilter={onFilter} />
    </Permitted>
  );
}
