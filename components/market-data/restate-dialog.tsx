import { zodResolver } from '@hookform/resolvers/zod';
import { useRouter, type Href } from 'expo-router';
import { useState } from 'react';
import { useController, useForm } from 'react-hook-form';
import { z } from 'zod';
import { ConfirmDialog } from '@/components/ui/confirm-dialog';
import { TextAreaField } from '@/components/ui/text-field';
import { marketActText, marketDataText } from '@/constants/texts/market-data';
import { ApiError } from '@/shared/api-client';
import { reasonSchema } from '@/shared/contracts/common';
import { newIdempotencyKey } from '@/hooks/api';
import { forgetForm, keepForm, readKeptForm } from '@/hooks/kept-form';
import { storeKey } from '@/hooks/local-store';
import { useRestateSnapshot } from '@/hooks/use-market-data';
import type { SnapshotDialogProps } from './approve-dialog';

const restatementForm = z.object({ reason: reasonSchema });

/** Opens a draft with the numbers of an approved close. */
export function RestateDialog({
  desk,
  userId,
  snapshot,
  onClose,
}: SnapshotDialogProps & { userId: string }) {
  const router = useRouter();
  const { mutateAsync, isPending } = useRestateSnapshot(desk.id, snapshot.id);
  const [idempotencyKey] = useState(newIdempotencyKey);
  const [failure, setFailure] = useState<string | null>(null);
  const keptAs = storeKey(`restatement.${snapshot.id}`, userId, desk.id);
  const form = useForm({
    resolver: zodResolver(restatementForm),
    defaultValues: readKeptForm(keptAs, { reason: '' }),
  });
  const { field, fieldState } = useController({ control: form.control, name: 'reason' });
  const { onChange, ...rest } = field;
  const submit = form.handleSubmit(async ({ reason }) => {
    try {
      const { id } = await mutateAsync({ reason, idempotencyKey });
      forgetForm(keptAs);
      onClose();
      router.push(`/desks/${desk.id}/market-data/${id}` as Href);
    } catch (error) {
      if (!(error instanceof ApiError)) throw error;
      setFailure(error.issues[0]?.message ?? error.message);
    }
  });
  return (
    <ConfirmDialog
      title={marketActText.restateTitle(snapshot.date)}
      act={marketDataText.restate}
      willHappen={{
        title: marketActText.willHappen,
        sentences: [marketActText.willRestate(snapshot.date)],
      }}
      failure={failure}
      busy={isPending}
      onSubmit={(event) => void submit(event)}
      onClose={onClose}
    >
      <TextAreaField
        {...rest}
        label={marketActText.restateReason}
        hint={marketActText.restateReasonHint}
        maxLength={500}
        required
        onChangeText={(reason) => {
          onChange(reason);
          keepForm(keptAs, { reason });
        }}
        error={fieldState.error?.message}
      />
    </ConfirmDialog>
  );
}
