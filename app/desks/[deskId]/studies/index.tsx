import { useLocalSearchParams, useRouter } from 'expo-router';
import { useCallback } from 'react';
import { Permitted } from '@/components/shell/permitted';
import { StudyListScreen } from '@/components/studies/study-list-screen';
import { studyStatuses, type StudyStatus } from '@/shared/contracts/studies';
import { useDesk } from '@/hooks/use-desk';

export default function StudyListRoute() {
  const desk = useDesk();
  const router = useRouter();
  const params = useLocalSearchParams<{ state?: string }>();
  const status = studyStatuses.find((one) => one === params.state) ?? null;
  const onStatus = useCallback(
    (state: StudyStatus | null) => router.setParams({ state: state ?? undefined }),
    [router],
  );
  return (
    <Permitted permission="read-desk">
      <StudyListScreen key={desk.id} desk={desk} status={status} onStatus={onStatus} />
    </Permitted>
  );
}
