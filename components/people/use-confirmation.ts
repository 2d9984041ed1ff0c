import { useState } from 'react';
import { useMemberAct, useReloadPeople, type MemberAct } from '@/hooks/use-people';
import { ApiError } from '@/shared/api-client';
import type { Member } from '@/shared/contracts/people';

export type Confirmation = {
  busy: boolean;
  /** Someone else changed the membership; it was read again and can be confirmed anew. */
  stale: boolean;
  /** What stands in the way of the whole act. */
  failure: string | null;
  /** Sends the act; complaints about single fields are handed to the form. */
  confirm: (act: MemberAct, showIssue: (path: string, message: string) => void) => Promise<void>;
};

export function useConfirmation(deskId: string, member: Member, onDone: () => void): Confirmation {
  const { mutateAsync, isPending } = useMemberAct(deskId, member.user.id);
  const reload = useReloadPeople(deskId);
  const [stale, setStale] = useState(false);
  const [failure, setFailure] = useState<string | null>(null);
  const confirm: Confirmation['confirm'] = async (act, showIssue) => {
    setFailure(null);
    setStale(false);
    try {
      await mutateAsync(act);
      onDone();
    } catch (error) {
      if (!(error instanceof ApiError)) throw error;
      if (error.code === 'stale-version') {
        await reload();
        setStale(true);
        return;
      }
      for (const { path, message } of error.issues) if (path !== '') showIssue(path, message);
      const general = error.issues.find(({ path }) => path === '');
      if (general) setFailure(general.message);
      else if (error.issues.length === 0) setFailure(error.message);
    }
  };
  return { busy: isPending, stale, failure, confirm };
}
