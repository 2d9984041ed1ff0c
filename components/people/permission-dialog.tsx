import { zodResolver } from '@hookform/resolvers/zod';
import { useRef, useState } from 'react';
import { Controller, useForm, useWatch } from 'react-hook-form';
import { z } from 'zod';
import { SelectField } from '@/components/ui/select-field';
import { TextField } from '@/components/ui/text-field';
import { memberText } from '@/constants/texts/people';
import { newIdempotencyKey } from '@/hooks/api';
import { useDesk } from '@/hooks/use-desk';
import { permissionChangeSchema } from '@/shared/contracts/people';
import { permissionSchema } from '@/shared/contracts/sessions';
import { dateInZone, dateOfTenor, isCalendarDate } from '@/shared/dates';
import { permissionSentence } from '@/shared/permissions';
import { ActDialog } from './act-dialog';
import { ReasonField, type MemberDialogProps } from './act-dialogs';
import { changeable, type Effect } from './changeable';
import { consequencesOfChange } from './consequences';
import { useConfirmation } from './use-confirmation';

/** A day, a tenor such as `3m` counted from today, or nothing for no end. */
const endsOnSchema = (today: string) =>
  z.string().transform((text, context): string | null => {
    const typed = text.trim();
    if (typed === '') return null;
    const date = dateOfTenor(typed, today) ?? typed;
    if (isCalendarDate(date) && date >= today) return date;
    context.addIssue({ code: 'custom', message: memberText.endsOnPast });
    return z.NEVER;
  });

const formSchema = (today: string) =>
  z.object({
    permission: permissionSchema,
    endsOn: endsOnSchema(today),
    reason: permissionChangeSchema.shape.reason,
  });

type FormInput = z.input<ReturnType<typeof formSchema>>;
type FormOutput = z.output<ReturnType<typeof formSchema>>;

/** One key for one content: sending the same again makes no second record. */
function useContentKey() {
  const kept = useRef({ content: '', key: '' });
  return (body: object) => {
    const content = JSON.stringify(body);
    if (kept.current.content !== content) kept.current = { content, key: newIdempotencyKey() };
    return kept.current.key;
  };
}

function usePermissionForm({ member, onDone, effect }: PermissionDialogProps) {
  const desk = useDesk();
  const [today] = useState(() => dateInZone(Date.now(), desk.timeZone));
  const keyFor = useContentKey();
  const confirmation = useConfirmation(desk.id, member, onDone);
  const options = changeable(member, effect);
  const form = useForm<FormInput, unknown, FormOutput>({
    resolver: zodResolver(formSchema(today)),
    defaultValues: { permission: options[0], endsOn: '', reason: '' },
  });
  const submit = form.handleSubmit((values) => {
    const body = { ...values, effect, version: member.version };
    const act = { kind: 'change-permission', body, idempotencyKey: keyFor(body) } as const;
    return confirmation.confirm(act, (path, message) => {
      const field = (['permission', 'endsOn', 'reason'] as const).find((name) => name === path);
      form.setError(field ?? 'reason', { message });
    });
  });
  const typed = useWatch({ control: form.control });
  const endsOn = endsOnSchema(today).safeParse(typed.endsOn);
  const permission = typed.permission ?? options[0];
  const consequences = consequencesOfChange(
    member,
    { permission, effect },
    endsOn.success ? endsOn.data : null,
  );
  return { form, submit, confirmation, consequences, options, endsOn: endsOn.data ?? null };
}

type PermissionDialogProps = MemberDialogProps & { effect: Effect };

/** Grants or withdraws one permission for one person, with reason and last day. */
export function PermissionDialog(props: PermissionDialogProps) {
  const { form, submit, confirmation, consequences, options, endsOn } = usePermissionForm(props);
  const title = props.effect === 'grant' ? memberText.grant : memberText.withdraw;
  return (
    <ActDialog
      title={title}
      act={title}
      danger={props.effect === 'withdraw'}
      consequences={consequences}
      confirmation={confirmation}
      onSubmit={(event) => void submit(event)}
      onClose={props.onClose}
    >
      <Controller
        control={form.control}
        name="permission"
        render={({ field, fieldState }) => (
          <SelectField
            {...field}
            label={memberText.permission}
            options={options.map((value) => ({ value, label: permissionSentence(value) }))}
            error={fieldState.error?.message}
          />
        )}
      />
      <Controller
        control={form.control}
        name="endsOn"
        render={({ field, fieldState }) => (
          <TextField
            {...field}
            onChangeText={field.onChange}
            label={memberText.endsOn}
            hint={memberText.endsOnHint}
            trailing={endsOn !== null && endsOn !== field.value ? endsOn : undefined}
            error={fieldState.error?.message}
          />
        )}
      />
      <Controller control={form.control} name="reason" render={ReasonField} />
    </ActDialog>
  );
}
