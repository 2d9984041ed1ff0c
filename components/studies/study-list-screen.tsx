import { StyleSheet, View } from 'react-native';
import { ListFoot } from '@/components/tables/list-foot';
import { Button } from '@/components/ui/button';
import { DataTable } from '@/components/ui/data-table';
import { Screen } from '@/components/ui/screen';
import { SelectField } from '@/components/ui/select-field';
import { EmptyState, ErrorState, SkeletonRows } from '@/components/ui/states';
import { studiesText } from '@/constants/texts/studies';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { studyStatuses, type StudyStatus } from '@/shared/contracts/studies';
import { errorOf } from '@/hooks/error-of';
import { useStudies } from '@/hooks/use-studies';
import { StudyCard, studyColumns } from './study-rows';

export type StudyListScreenProps = {
  desk: DeskAccess;
  status: StudyStatus | null;
  onStatus: (status: StudyStatus | null) => void;
};

const anyState = 'any';

export function StudyListScreen({ desk, status, onStatus }: StudyListScreenProps) {
  return (
    <Screen title={studiesText.title} measure={1240} actions={<StartButton desk={desk} />}>
      <View style={styles.filter}>
        <SelectField
          label={studiesText.state}
          value={status ?? anyState}
          options={[
            { value: anyState, label: studiesText.anyState },
            ...studyStatuses.map((one) => ({ value: one, label: studiesText.statuses[one] })),
          ]}
          onChange={(one) => onStatus(one === anyState ? null : one)}
        />
      </View>
      <StudyRows desk={desk} status={status} onStatus={onStatus} />
    </Screen>
  );
}

function StartButton({ desk }: { desk: DeskAccess }) {
  if (!desk.permissions.includes('run-studies')) return null;
  return <Button label={studiesText.start} href={`/desks/${desk.id}/studies/new`} />;
}

function StudyRows({ desk, status, onStatus }: StudyListScreenProps) {
  const studies = useStudies(desk.id, status);
  const { data: rows, error, isError } = studies;
  if (isError && !rows)
    return <ErrorState {...errorOf(error)} onRetry={() => void studies.refetch()} />;
  if (!rows) return <SkeletonRows rows={6} height={56} />;
  if (rows.length === 0)
    return status === null ? (
      <EmptyState
        title={studiesText.emptyTitle}
        body={studiesText.emptyBody}
        action={<StartButton desk={desk} />}
      />
    ) : (
      <EmptyState
        title={studiesText.nothingTitle}
        body={studiesText.nothingBody}
        action={
          <Button kind="secondary" label={studiesText.showAll} onPress={() => onStatus(null)} />
        }
      />
    );
  return (
    <>
      <DataTable
        sticky
        caption={studiesText.caption}
        columns={studyColumns(desk)}
        rows={rows}
        rowId={({ id }) => id}
        rowHref={({ id }) => `/desks/${desk.id}/studies/${id}`}
        card={(row) => <StudyCard study={row} desk={desk} />}
      />
      <ListFoot pages={studies} />
    </>
  );
}

const styles = StyleSheet.create({
  filter: { maxWidth: 260 },
});
