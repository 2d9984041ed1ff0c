import { MarketEditor } from '@/components/forms/lazy-forms';
import { BackLink } from '@/components/ui/back-link';
import { Screen } from '@/components/ui/screen';
import { ErrorState, SkeletonRows } from '@/components/ui/states';
import { marketDataText, marketEditorText } from '@/constants/texts/market-data';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { errorOf } from '@/hooks/error-of';
import { useUnderlyings } from '@/hooks/use-underlyings';

export type NewSnapshotScreenProps = {
  desk: DeskAccess;
  userId: string;
  onSaved: (snapshotId: string) => void;
};

export function NewSnapshotScreen({ desk, userId, onSaved }: NewSnapshotScreenProps) {
  const { data: underlyings, error, refetch } = useUnderlyings(desk.id);
  return (
    <Screen
      title={marketEditorText.newTitle}
      measure={1240}
      overline={<BackLink href={`/desks/${desk.id}/market-data`} label={marketDataText.back} />}
    >
      {underlyings ? (
        <MarketEditor
          desk={desk}
          userId={userId}
          underlyings={underlyings}
          draft={null}
          onSaved={onSaved}
        />
      ) : error ? (
        <ErrorState {...errorOf(error)} onRetry={() => void refetch()} />
      ) : (
        <SkeletonRows rows={6} height={60} />
      )}
    </Screen>
  );
}
