import { zodResolver } from '@hookform/resolvers/zod';
import { useRef, useState } from 'react';
import { Controller, useForm, useWatch } from 'react-hook-form';
import { ConfirmDialog } from '@/components/ui/confirm-dialog';
import { Text } from '@/components/ui/text';
import { TextField } from '@/components/ui/text-field';
import { booksText } from '@/constants/texts/books';
import { tradeActText } from '@/constants/texts/trades';
import { newIdempotencyKey } from '@/hooks/api';
import { useCreateBook } from '@/hooks/use-books';
import { ApiError } from '@/shared/api-client';
import { bookDraftSchema, type BookDraft } from '@/shared/contracts/books';

export type OpenBookDialogProps = {
  deskId: string;
  onClose: () => void;
  onOpened: (code: string) => void;
};

/** One key for one content, so that a second press opens no second book. */
function useContentKey() {
  const last = useRef<{ content: string; key: string } | null>(null);
  return (body: BookDraft) => {
    const content = JSON.stringify(body);
    if (last.current?.content !== content) last.current = { content, key: newIdempotencyKey() };
    return last.current.key;
  };
}

export function OpenBookDialog({ deskId, onClose, onOpened }: OpenBookDialogProps) {
  const { mutateAsync, isPending } = useCreateBook(deskId);
  const [failure, setFailure] = useState<string | null>(null);
  const keyOf = useContentKey();
  const form = useForm<BookDraft>({
    resolver: zodResolver(bookDraftSchema),
    defaultValues: { code: '', name: '' },
  });
  const code = useWatch({ control: form.control, name: 'code' }).trim().toUpperCase();
  const submit = form.handleSubmit(async (body) => {
    setFailure(null);
    try {
      onOpened((await mutateAsync({ body, idempotencyKey: keyOf(body) })).code);
    } catch (error) {
      if (!(error instanceof ApiError)) throw error;
      const issue = error.issues.find(({ path }) => path === 'code' || path === 'name');
      if (issue) form.setError(issue.path as keyof BookDraft, { message: issue.message });
      else setFailure(error.message);
    }
  });
  return (
    <ConfirmDialog
      title={booksText.open}
      act={booksText.open}
      willHappen={{
        title: tradeActText.willHappen,
        sentences: [booksText.willOpen(code)],
      }}
      failure={failure}
      busy={isPending}
      onSubmit={(event) => void submit(event)}
      onClose={onClose}
    >
      <Text tone="muted">{booksText.openBody}</Text>
      <Controller
        control={form.control}
        name="code"
        render={({ field: { onChange, ...field }, fieldState }) => (
          <TextField
            {...field}
            onChangeText={onChange}
            label={booksText.code}
            hint={booksText.codeHint}
            error={fieldState.error?.message}
            maxLength={12}
            required
          />
        )}
      />
      <Controller
        control={form.control}
        name="name"
        render={({ field: { onChange, ...field }, fieldState }) => (
          <TextField
            {...field}
            onChangeText={onChange}
            label={booksText.name}
            error={fieldState.error?.message}
            maxLength={80}
            required
          />
        )}
      />
    </ConfirmDialog>
  );
}
