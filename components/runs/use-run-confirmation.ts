import { useState } from 'react';
import { exceptionText } from '@/constants/texts/runs';
import { ApiError } from '@/shared/api-client';

/** Codes that say that what was read is no longer so. */
const movedOn = ['stale-version', 'wrong-state', 'not-found'];

/** Sends a binding act; where someone was quicker, what they made of it is read and told. */
export function useRunConfirmation(reload: () => Promise<unknown>) {
  const [stale, setStale] = useState<{ title: string; body: string }>();
  const [failure, setFailure] = useState<string | null>(null);
  const confirm = async <Answer>(send: () => Promise<Answer>, onDone: (answer: Answer) => void) => {
    setFailure(null);
    setStale(undefined);
    try {
      onDone(await send());
    } catch (error) {
      if (!(error instanceof ApiError)) throw error;
      const said = error.issues.at(0)?.message;
      if (!error.retryable) await reload();
      if (movedOn.includes(error.code))
        setStale({ title: said ?? exceptionText.staleTitle, body: exceptionText.staleBody });
      else setFailure(said ?? error.message);
    }
  };
  return { stale, failure, confirm };
}
