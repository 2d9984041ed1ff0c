import { useState } from 'react';
import { ConfirmDialog } from '@/components/ui/confirm-dialog';
import { TextAreaField } from '@/components/ui/text-field';
import { exceptionText, runText, signOffText } from '@/constants/texts/runs';
import { runSignOffSchema, type Run } from '@/shared/contracts/runs';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { newIdempotencyKey } from '@/hooks/api';
import { storeKey } from '@/hooks/local-store';
import { useKeptFields } from '@/hooks/use-kept-fields';
import { useReloadRun, useRerun, useRunAct } from '@/hooks/use-runs';
import { bookCodes } from './run-words';
import { useRunConfirmation } from './use-run-confirmation';

type RunDialogProps = { desk: DeskAccess; run: Run; onClose: () => void };

export function CancelDialog({ desk, run, onClose }: RunDialogProps) {
  const { mutateAsync, isPending } = useRunAct(desk.id, run.id);
  const { confirm, ...told } = useRunConfirmation(useReloadRun(desk.id, run.id));
  return (
    <ConfirmDialog
      {...told}
      danger
      title={runText.cancelTitle(run.number)}
      act={runText.cancel}
      otherwise={runText.keepRunning}
      busy={isPending}
      willHappen={{
        title: exceptionText.willHappen,
        sentences: [runText.willCancel(run.done)],
        foot: runText.cancelFoot,
      }}
      onSubmit={(event) => {
        event.preventDefault();
        void confirm(() => mutateAsync({ kind: 'cancel' }), onClose);
      }}
      onClose={onClose}
    />
  );
}

type RerunDialogProps = RunDialogProps & { onStarted: (runId: string) => void };

export function RerunDialog({ desk, run, onClose, onStarted }: RerunDialogProps) {
  const { mutateAsync, isPending } = useRerun(desk.id, run.id);
  const [idempotencyKey, setKey] = useState(newIdempotencyKey);
  const reload = useReloadRun(desk.id, run.id);
  const { confirm, ...told } = useRunConfirmation(() => {
    // The server has answered: what is sent next is another request.
    setKey(newIdempotencyKey());
    return reload();
  });
  return (
    <ConfirmDialog
      {...told}
      title={runText.rerunTitle(run.number)}
      act={runText.rerun}
      busy={isPending}
      willHappen={{
        title: exceptionText.willHappen,
        sentences: [
          runText.willRerun(bookCodes(run), run.snapshot.date),
          ...(run.openExceptions > 0 ? [runText.rerunAnswers] : []),
        ],
        foot: runText.rerunFoot,
      }}
      onSubmit={(event) => {
        event.preventDefault();
        void confirm(
          () => mutateAsync(idempotencyKey),
          ({ id }) => onStarted(id),
        );
      }}
      onClose={onClose}
    />
  );
}

type SignOffDialogProps = RunDialogProps & { userId: string };

export function SignOffDialog({ desk, userId, run, onClose }: SignOffDialogProps) {
  const keptAs = storeKey(`sign-off.${run.id}`, userId, desk.id);
  const { values: typed, change, forget } = useKeptFields(keptAs, { comment: '' });
  const [complaint, setComplaint] = useState<string>();
  const { mutateAsync, isPending } = useRunAct(desk.id, run.id);
  const { confirm, ...told } = useRunConfirmation(useReloadRun(desk.id, run.id));
  const submit = () => {
    const read = runSignOffSchema.safeParse({ version: run.version, ...typed });
    setComplaint(read.error?.issues.at(0)?.message);
    if (read.success)
      void confirm(
        () => mutateAsync({ kind: 'sign-off', body: read.data }),
        () => {
          forget();
          onClose();
        },
      );
  };
  const values = signOffText.values(run.total);
  return (
    <ConfirmDialog
      {...told}
      title={signOffText.title(run.number)}
      act={signOffText.act}
      busy={isPending}
      willHappen={{
        title: exceptionText.willHappen,
        sentences: [
          signOffText.will(values, bookCodes(run), run.snapshot.date),
          signOffText.willAnchor,
        ],
        foot: signOffText.foot,
      }}
      onSubmit={(event) => {
        event.preventDefault();
        submit();
      }}
      onClose={onClose}
    >
      <TextAreaField
        label={signOffText.comment}
        hint={signOffText.commentHint}
        value={typed.comment}
        error={complaint}
        maxLength={500}
        required
        onChangeText={(comment) => change({ comment })}
      />
    </ConfirmDialog>
  );
}
