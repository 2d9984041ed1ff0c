import { useLocalSearchParams, useRouter } from 'expo-router';
import { useCallback } from 'react';
import { SnapshotListScreen } from '@/components/market-data/snapshot-list-screen';
import { Permitted } from '@/components/shell/permitted';
import { snapshotStatuses, type SnapshotStatus } from '@/shared/contracts/market-data';
import { useDesk } from '@/hooks/use-desk';

export default function MarketDataRoute() {
  const desk = useDesk();
  const router = useRouter();
  const params = useLocalSearchParams<{ state?: string }>();
  const status = snapshotStatuses.find((one) => one === params.state) ?? null;
  const onStatus = useCallback(
    (state: SnapshotStatus | null) => router.setParams({ state: state ?? undefined }),
    [router],
  );
  return (
    <Permitted permission="read-desk">
      <SnapshotListScreen key={desk.id} desk={desk} status={status} onStatus={onStatus} />
    </Permitted>
  );
}
