import { useLocalSearchParams, useRouter } from 'expo-router';
import { useCallback, useMemo } from 'react';
import { RunListScreen } from '@/components/runs/run-list-screen';
import { Permitted } from '@/components/shell/permitted';
import { runStatuses } from '@/shared/contracts/runs';
import { useDesk } from '@/hooks/use-desk';
import type { RunFilter } from '@/hooks/use-runs';

export default function RunListRoute() {
  const desk = useDesk();
  const router = useRouter();
  const { state, book } = useLocalSearchParams<{ state?: string; book?: string }>();
  const filter = useMemo(
    (): RunFilter => ({
      status: runStatuses.find((one) => one === state) ?? null,
      bookId: book || null,
    }),
    [state, book],
  );
  const onFilter = useCallback(
    ({ status, bookId }: RunFilter) =>
      router.setParams({ state: status ?? undefined, book: bookId ?? undefined }),
    [router],
  );
  return (
    <Permitted permission="read-desk">
      <RunListScreen key={desk.id} desk={desk} filter={filter} onFilter={onFilter} />
    </Permitted>
  );
}
