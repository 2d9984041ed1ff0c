import { useState, type FormEvent } from 'react';
import { ConfirmDialog } from '@/components/ui/confirm-dialog';
import { marketActText, marketDataText, marketEditorText } from '@/constants/texts/market-data';
import { ApiError } from '@/shared/api-client';
import type { Snapshot } from '@/shared/contracts/market-data';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { warningKey } from '@/shared/market-warnings';
import { useApproveSnapshot } from '@/hooks/use-market-data';
import { WarningList } from './warning-list';

export type SnapshotDialogProps = { desk: DeskAccess; snapshot: Snapshot; onClose: () => void };

/** Makes a close official; whoever does so confirms what is unlikely about it. */
export function ApproveDialog({ desk, snapshot, onClose }: SnapshotDialogProps) {
  const { date, quoteCount, restatesId, warnings } = snapshot;
  const { mutateAsync, isPending, error } = useApproveSnapshot(desk.id, snapshot);
  const [confirmed, setConfirmed] = useState(false);
  const [unconfirmed, setUnconfirmed] = useState(false);
  const refusal = error instanceof ApiError ? error : null;
  const isStale = refusal?.code === 'stale-version' || refusal?.code === 'wrong-state';
  const sentence = refusal?.issues[0]?.message ?? refusal?.message ?? null;

  async function approve(event: FormEvent) {
    event.preventDefault();
    setUnconfirmed(warnings.length > 0 && !confirmed);
    if (warnings.length > 0 && !confirmed) return;
    try {
      await mutateAsync(warnings.map(warningKey));
      onClose();
    } catch (failure) {
      // Shown in the dialog.
      if (!(failure instanceof ApiError)) throw failure;
    }
  }

  return (
    <ConfirmDialog
      title={marketActText.approveTitle(date)}
      act={marketDataText.approve}
      willHappen={{
        title: marketActText.willHappen,
        sentences: [
          marketActText.willApprove(date, quoteCount),
          ...(restatesId ? [marketActText.willSupersede(date)] : []),
          marketActText.willStart,
        ],
        foot: marketActText.recorded,
      }}
      stale={
        isStale
          ? { title: sentence ?? marketActText.staleTitle, body: marketActText.staleBody }
          : undefined
      }
      failure={unconfirmed ? marketEditorText.confirmFirst : isStale ? null : sentence}
      busy={isPending}
      onSubmit={(event) => void approve(event)}
      onClose={onClose}
    >
      <WarningList warnings={warnings} confirmation={{ confirmed, onConfirm: setConfirmed }} />
    </ConfirmDialog>
  );
}
