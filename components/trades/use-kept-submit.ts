import { useEffect, useState } from 'react';
import type { FieldValues, Path, UseFormReturn } from 'react-hook-form';
import { tradeFormText } from '@/constants/texts/trades';
import { forgetForm, keepForm, keyForContent } from '@/hooks/kept-form';
import { ApiError } from '@/shared/api-client';
import type { Trade } from '@/shared/contracts/trades';

type Sending<Body> = {
  /** Where the form is kept in this browser. */
  keptAs: string;
  send: (request: { body: Body; idempotencyKey: string }) => Promise<Trade>;
  onSent: (trade: Trade) => void;
  /** Someone changed what the form is about; it is read again. */
  onStale?: () => Promise<unknown>;
};

/** Keeps a form while it is typed, sends it once, and puts the server's complaints at its fields. */
export function useKeptSubmit<Values extends FieldValues, Read, Body>(
  form: UseFormReturn<Values, unknown, Read>,
  { keptAs, send, onSent, onStale }: Sending<Body>,
) {
  const [failure, setFailure] = useState<string | null>(null);
  const { subscribe } = form;
  useEffect(
    () =>
      subscribe({
        formState: { values: true },
        callback: ({ values }) => keepForm(keptAs, values),
      }),
    [subscribe, keptAs],
  );

  function complain({ issues, message, retryable }: ApiError) {
    const fields = Object.keys(form.getValues());
    const atFields = issues.filter(({ path }) => fields.includes(path));
    for (const issue of atFields)
      form.setError(issue.path as Path<Values>, issue, { shouldFocus: issue === atFields[0] });
    const [other] = issues.filter((issue) => !atFields.includes(issue));
    if (other) setFailure(other.message);
    else if (atFields.length === 0) setFailure(retryable ? tradeFormText.unsent : message);
  }

  async function submit(body: Body) {
    setFailure(null);
    try {
      const trade = await send({ body, idempotencyKey: keyForContent(keptAs, body) });
      forgetForm(keptAs);
      onSent(trade);
    } catch (error) {
      if (!(error instanceof ApiError)) throw error;
      if (error.code !== 'stale-version' || !onStale) return complain(error);
      await onStale();
      setFailure(tradeFormText.stale);
    }
  }
  return { submit, failure };
}
