/** What is chosen for a run that is not started yet, and its start. */
import { useState } from 'react';
import { newRunText } from '@/constants/texts/runs';
import { newIdempotencyKey } from '@/hooks/api';
import { storeKey } from '@/hooks/local-store';
import { useKeptFields } from '@/hooks/use-kept-fields';
import { useStartRun } from '@/hooks/use-runs';
import { ApiError } from '@/shared/api-client';
import type { Book } from '@/shared/contracts/books';
import type { SnapshotSummary } from '@/shared/contracts/market-data';
import type { DeskAccess } from '@/shared/contracts/sessions';

type RunChoiceOf = {
  desk: DeskAccess;
  userId: string;
  books: readonly Book[];
  closes: readonly SnapshotSummary[];
};

/** The chosen books and the chosen close, which a newer close that was approved since replaces. */
export function useRunChoice({ desk, userId, books, closes }: RunChoiceOf) {
  const latestId = closes.at(0)?.id ?? '';
  const { values, change, forget } = useKeptFields(storeKey('new-run', userId, desk.id), {
    bookIds: books.length === 1 ? books[0].id : '',
    closeId: '',
    latestId,
  });
  const closeId = values.latestId === latestId ? values.closeId : '';
  return {
    chosen: values.bookIds.split(' '),
    choose: (ids: readonly string[]) => change({ bookIds: ids.join(' ') }),
    close: closes.find(({ id }) => id === closeId) ?? closes.at(0),
    chooseClose: (id: string) => change({ closeId: id, latestId }),
    forget,
  };
}

/** Sends the run once however often it is pressed, and sorts what the server says against it. */
export function useRunStart(deskId: string, onStarted: (runId: string) => void) {
  const { mutate, error, isPending } = useStartRun(deskId);
  const [idempotencyKey, setKey] = useState(newIdempotencyKey);
  const issues = error instanceof ApiError ? error.issues : [];
  const inForm = ['bookIds', 'snapshotId'];
  const fieldOf = (path: string) => path.split('.')[0];
  const other = issues.find(({ path }) => !inForm.includes(fieldOf(path)));
  const unanswered = error instanceof ApiError && error.retryable;
  const whole = issues.length === 0 && error !== null ? error.message : null;
  return {
    busy: isPending,
    failure: other?.message ?? (unanswered ? newRunText.unsent : whole),
    issueAt: (field: string) => issues.find(({ path }) => fieldOf(path) === field)?.message,
    send: (body: { bookIds: string[]; snapshotId: string }) =>
      mutate(
        { idempotencyKey, body },
        {
          onSuccess: ({ id }) => onStarted(id),
          // The server has answered: what is sent next is another request.
          onError: (failure) => {
            if (failure instanceof ApiError && !failure.retryable) setKey(newIdempotencyKey());
          },
        },
      ),
  };
}
