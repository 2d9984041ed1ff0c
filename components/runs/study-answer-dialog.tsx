import { useState } from 'react';
import { Button } from '@/components/ui/button';
import { ConfirmDialog } from '@/components/ui/confirm-dialog';
import { Dialog } from '@/components/ui/dialog';
import { SelectField } from '@/components/ui/select-field';
import { ErrorState, SkeletonRows } from '@/components/ui/states';
import { Text } from '@/components/ui/text';
import { TextAreaField } from '@/components/ui/text-field';
import { exceptionText } from '@/constants/texts/runs';
import { studiesText } from '@/constants/texts/studies';
import { studyAnswerSchema } from '@/shared/contracts/runs';
import type { StudySummary } from '@/shared/contracts/studies';
import { errorOf } from '@/hooks/error-of';
import { storeKey } from '@/hooks/local-store';
import { useKeptFields } from '@/hooks/use-kept-fields';
import { useAnswerException, useReloadRun } from '@/hooks/use-runs';
import { useStudiesOfTerms } from '@/hooks/use-studies';
import type { AnswerDialogProps } from './override-dialog';
import { useRunConfirmation } from './use-run-confirmation';

/** Links a study of the trade's terms that has come to an end. */
export function StudyAnswerDialog(props: AnswerDialogProps) {
  const { desk, run, valuation, onClose } = props;
  const { terms, underlying, trade } = valuation;
  const { data, error, refetch } = useStudiesOfTerms(desk.id, {
    ...terms,
    underlyingId: underlying.id,
  });
  if (data && data.length > 0) return <AnswerForm {...props} studies={data} />;
  return (
    <Dialog
      open
      title={exceptionText.studyTitle(trade.number)}
      onClose={onClose}
      actions={
        data ? (
          <Button
            label={exceptionText.startStudy}
            href={`/desks/${desk.id}/studies/new?trade=${trade.id}&snapshot=${run.snapshot.id}`}
          />
        ) : undefined
      }
    >
      {error ? (
        <ErrorState {...errorOf(error)} onRetry={() => void refetch()} />
      ) : data ? (
        <Text>{exceptionText.noStudies}</Text>
      ) : (
        <SkeletonRows rows={2} />
      )}
    </Dialog>
  );
}

const optionsOf = (studies: readonly StudySummary[]) => [
  { value: '', label: exceptionText.chooseStudy },
  ...studies.map(({ id, number, status, startedBy }) => ({
    value: id,
    label: exceptionText.studyOption(number, studiesText.statuses[status], startedBy.name),
  })),
];

type Complaints = { study?: string; reason?: string };

function AnswerForm(props: AnswerDialogProps & { studies: readonly StudySummary[] }) {
  const { desk, userId, run, valuation, studies, onClose } = props;
  const [studyId, setStudyId] = useState(studies.length === 1 ? studies[0].id : '');
  const keptAs = storeKey(`study-answer.${valuation.exception.id}`, userId, desk.id);
  const { values, change, forget } = useKeptFields(keptAs, { reason: '' });
  const [complaints, setComplaints] = useState<Complaints>({});
  const answer = useAnswerException(desk.id, run.id, valuation.exception.id);
  const { confirm, ...told } = useRunConfirmation(useReloadRun(desk.id, run.id));
  const submit = () => {
    const read = studyAnswerSchema.safeParse({ studyId, ...values });
    setComplaints({
      study: studyId === '' ? exceptionText.noStudy : undefined,
      reason: read.error?.issues.find(({ path }) => path[0] === 'reason')?.message,
    });
    if (read.success)
      void confirm(
        () => answer.mutateAsync({ kind: 'study', body: read.data }),
        () => {
          forget();
          onClose();
        },
      );
  };
  return (
    <ConfirmDialog
      {...told}
      title={exceptionText.studyTitle(valuation.trade.number)}
      act={exceptionText.study}
      busy={answer.isPending}
      willHappen={{
        title: exceptionText.willHappen,
        sentences: [exceptionText.willLink(valuation.trade.number)],
        foot: exceptionText.recorded,
      }}
      onSubmit={(event) => {
        event.preventDefault();
        submit();
      }}
      onClose={onClose}
    >
      <SelectField
        label={exceptionText.studyField}
        value={studyId}
        options={optionsOf(studies)}
        error={complaints.study}
        onChange={setStudyId}
      />
      <TextAreaField
        label={exceptionText.finding}
        hint={exceptionText.findingHint}
        value={values.reason}
        error={complaints.reason}
        maxLength={500}
        required
        onChangeText={(reason) => change({ reason })}
      />
    </ConfirmDialog>
  );
}
