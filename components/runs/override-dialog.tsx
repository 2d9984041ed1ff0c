import { useState } from 'react';
import { ConfirmDialog } from '@/components/ui/confirm-dialog';
import { TextAreaField, TextField } from '@/components/ui/text-field';
import { exceptionText } from '@/constants/texts/runs';
import { overrideSchema, type ExceptionalValuation, type Run } from '@/shared/contracts/runs';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { formatQuantity } from '@/shared/format/numbers';
import { parseDecimal } from '@/shared/format/parse';
import { storeKey } from '@/hooks/local-store';
import { useKeptFields } from '@/hooks/use-kept-fields';
import { useAnswerException, useReloadRun } from '@/hooks/use-runs';
import { valueText } from './run-words';
import { useRunConfirmation } from './use-run-confirmation';

export type AnswerDialogProps = {
  desk: DeskAccess;
  userId: string;
  run: Run;
  valuation: ExceptionalValuation;
  onClose: () => void;
};

type Typed = { value: string; reason: string };
type Complaints = Partial<Record<keyof Typed, string>>;

/** Reads what was typed; an empty value keeps the model's. */
function readNote({ value, reason }: Typed) {
  const typed = value.trim() === '' ? null : parseDecimal(value);
  const read = overrideSchema.safeParse({ value: typed?.ok ? typed.value : null, reason });
  const issueAt = (field: keyof Typed) =>
    read.error?.issues.find(({ path }) => path[0] === field)?.message;
  const complaints: Complaints = {
    value: typed && !typed.ok ? typed.message : issueAt('value'),
    reason: issueAt('reason'),
  };
  const note = read.success && complaints.value === undefined ? read.data : null;
  return { note, complaints };
}

/** What the note will do, in a sentence, as far as it can be read. */
function willSentence(valuation: ExceptionalValuation, typed: string): string {
  const { number } = valuation.trade;
  const model = valueText(valuation);
  if (typed.trim() === '')
    return model === null
      ? exceptionText.willKeepNothing(number)
      : exceptionText.willKeep(number, model);
  const parsed = parseDecimal(typed);
  const value = parsed.ok ? formatQuantity(parsed.value) : '…';
  return model === null
    ? exceptionText.willOverrideNothing(number, value)
    : exceptionText.willOverride(number, value, model);
}

/** A note by somebody who had no hand in it, with a value of its own or without. */
export function OverrideDialog({ desk, userId, run, valuation, onClose }: AnswerDialogProps) {
  const keptAs = storeKey(`override.${valuation.exception.id}`, userId, desk.id);
  const { values: typed, change, forget } = useKeptFields(keptAs, { value: '', reason: '' });
  const [complaints, setComplaints] = useState<Complaints>({});
  const answer = useAnswerException(desk.id, run.id, valuation.exception.id);
  const { confirm, ...told } = useRunConfirmation(useReloadRun(desk.id, run.id));
  const { currency, unit } = valuation.underlying;
  const submit = () => {
    const { note, complaints: found } = readNote(typed);
    setComplaints(found);
    if (note)
      void confirm(
        () => answer.mutateAsync({ kind: 'override', body: note }),
        () => {
          forget();
          onClose();
        },
      );
  };
  return (
    <ConfirmDialog
      {...told}
      title={exceptionText.overrideTitle(valuation.trade.number)}
      act={exceptionText.override}
      busy={answer.isPending}
      willHappen={{
        title: exceptionText.willHappen,
        sentences: [
          willSentence(valuation, typed.value),
          ...(desk.permissions.includes('sign-off-runs') ? [exceptionText.cannotSignOff] : []),
        ],
        foot: exceptionText.recorded,
      }}
      onSubmit={(event) => {
        event.preventDefault();
        submit();
      }}
      onClose={onClose}
    >
      <TextField
        label={exceptionText.overrideValue}
        unit={exceptionText.overrideUnit(currency, unit)}
        hint={exceptionText.overrideHint}
        inputMode="decimal"
        selectAllOnFocus
        value={typed.value}
        error={complaints.value}
        onChangeText={(value) => change({ value })}
      />
      <TextAreaField
        label={exceptionText.reason}
        hint={exceptionText.reasonHint}
        value={typed.reason}
        error={complaints.reason}
        maxLength={500}
        required
        onChangeText={(reason) => change({ reason })}
      />
    </ConfirmDialog>
  );
}
