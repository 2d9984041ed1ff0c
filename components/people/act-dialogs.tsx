import { zodResolver } from '@hookform/resolvers/zod';
import { Controller, useForm, useWatch } from 'react-hook-form';
import type { z } from 'zod';
import { SelectField } from '@/components/ui/select-field';
import { TextAreaField, type TextAreaFieldProps } from '@/components/ui/text-field';
import { consequenceText, memberText } from '@/constants/texts/people';
import { shellText } from '@/constants/texts/shell';
import { useDesk } from '@/hooks/use-desk';
import { endpoints } from '@/shared/contracts';
import { roleChangeSchema, type Member } from '@/shared/contracts/people';
import { rolesADeskHeadSets } from '@/shared/permissions';
import { ActDialog } from './act-dialog';
import { consequencesOfEnd, consequencesOfRole, type Consequences } from './consequences';
import { useConfirmation } from './use-confirmation';

export type MemberDialogProps = { member: Member; onClose: () => void; onDone: () => void };

type ReasonFieldProps = {
  field: Pick<TextAreaFieldProps, 'value' | 'onBlur' | 'name' | 'ref'> & {
    onChange: (text: string) => void;
  };
  fieldState: { error?: { message?: string } };
};

/** The reason that every act asks for. */
export function ReasonField({ field: { onChange, ...field }, fieldState }: ReasonFieldProps) {
  return (
    <TextAreaField
      {...field}
      onChangeText={onChange}
      label={memberText.reason}
      hint={memberText.reasonHint}
      error={fieldState.error?.message}
      required
    />
  );
}

const roleFormSchema = roleChangeSchema.omit({ version: true });
type RoleForm = z.input<typeof roleFormSchema>;

const roleOptions = rolesADeskHeadSets.map((value) => ({ value, label: shellText.roles[value] }));

export function RoleDialog({ member, onClose, onDone }: MemberDialogProps) {
  const desk = useDesk();
  const confirmation = useConfirmation(desk.id, member, onDone);
  const other = rolesADeskHeadSets.find((role) => role !== member.role) ?? rolesADeskHeadSets[0];
  const form = useForm<RoleForm>({
    resolver: zodResolver(roleFormSchema),
    defaultValues: { role: other, reason: '' },
  });
  const role = useWatch({ control: form.control, name: 'role' });
  const submit = form.handleSubmit((values) =>
    confirmation.confirm(
      { kind: 'set-role', body: { ...values, version: member.version } },
      (path, message) => form.setError(path === 'role' ? 'role' : 'reason', { message }),
    ),
  );
  return (
    <ActDialog
      title={memberText.setRole}
      act={memberText.setRole}
      consequences={consequencesOfRole(member, role)}
      confirmation={confirmation}
      onSubmit={(event) => void submit(event)}
      onClose={onClose}
    >
      <Controller
        control={form.control}
        name="role"
        render={({ field, fieldState }) => (
          <SelectField
            {...field}
            label={memberText.newRole}
            options={roleOptions}
            error={fieldState.error?.message}
          />
        )}
      />
      <Controller control={form.control} name="reason" render={ReasonField} />
    </ActDialog>
  );
}

const reasonFormSchema = endpoints.suspendMember.body.omit({ version: true });
type ReasonForm = z.input<typeof reasonFormSchema>;

export type ReasonAct =
  { kind: 'suspend' | 'reinstate' } | { kind: 'end-change'; changeId: string };

const reasonActLabels = {
  suspend: memberText.suspend,
  reinstate: memberText.reinstate,
  'end-change': memberText.endChange,
} as const;

function consequencesOf(member: Member, act: ReasonAct): Consequences {
  if (act.kind === 'end-change') return consequencesOfEnd(member, act.changeId);
  return { sentences: [consequenceText[act.kind](member.user.name)], blocked: false };
}

/** Suspends, reinstates, or ends a single grant or withdrawal: acts that need only a reason. */
export function ReasonDialog({
  member,
  act,
  onClose,
  onDone,
}: MemberDialogProps & { act: ReasonAct }) {
  const desk = useDesk();
  const confirmation = useConfirmation(desk.id, member, onDone);
  const form = useForm<ReasonForm>({
    resolver: zodResolver(reasonFormSchema),
    defaultValues: { reason: '' },
  });
  const submit = form.handleSubmit(({ reason }) =>
    confirmation.confirm({ ...act, body: { reason, version: member.version } }, (_, message) =>
      form.setError('reason', { message }),
    ),
  );
  const label = reasonActLabels[act.kind];
  return (
    <ActDialog
      title={`${label}: ${member.user.name}`}
      act={label}
      danger={act.kind === 'suspend'}
      consequences={consequencesOf(member, act)}
      confirmation={confirmation}
      onSubmit={(event) => void submit(event)}
      onClose={onClose}
    >
      <Controller control={form.control} name="reason" render={ReasonField} />
    </ActDialog>
  );
}
