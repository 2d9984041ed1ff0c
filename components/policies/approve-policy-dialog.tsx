import type { FormEvent } from 'react';
import { ConfirmDialog } from '@/components/ui/confirm-dialog';
import { policiesText, policyActText } from '@/constants/texts/policies';
import { ApiError } from '@/shared/api-client';
import type { Policy } from '@/shared/contracts/policies';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { useApprovePolicy } from '@/hooks/use-policies';

export type ApprovePolicyDialogProps = {
  desk: DeskAccess;
  draft: Policy;
  active: Policy | null;
  onClose: () => void;
};

export function ApprovePolicyDialog({ desk, draft, active, onClose }: ApprovePolicyDialogProps) {
  const { mutateAsync, isPending, error } = useApprovePolicy(desk.id, draft);
  const refusal = error instanceof ApiError ? error : null;
  const isStale = refusal?.code === 'stale-version';
  const sentence = refusal?.issues[0]?.message ?? refusal?.message ?? null;

  async function approve(event: FormEvent) {
    event.preventDefault();
    try {
      await mutateAsync();
      onClose();
    } catch (failure) {
      // Shown in the dialog.
      if (!(failure instanceof ApiError)) throw failure;
    }
  }

  return (
    <ConfirmDialog
      title={policyActText.title(draft.number)}
      act={policiesText.approve}
      willHappen={{
        title: policyActText.willHappen,
        sentences: [
          policyActText.willApprove(draft.number),
          ...(active ? [policyActText.willSupersede(active.number)] : []),
        ],
        foot: policyActText.recorded,
      }}
      stale={
        isStale ? { title: policyActText.staleTitle, body: policyActText.staleBody } : undefined
      }
      failure={isStale ? null : sentence}
      busy={isPending}
      onSubmit={(event) => void approve(event)}
      onClose={onClose}
    />
  );
}
