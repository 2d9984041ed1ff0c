import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { PlainPage } from '@/components/shell/permitted';
import { PermissionDialog, ReasonDialog, RoleDialog } from '@/components/forms/lazy-forms';
import { BackLink } from '@/components/ui/back-link';
import { Notice } from '@/components/ui/notice';
import { Screen } from '@/components/ui/screen';
import { ErrorState, SkeletonRows } from '@/components/ui/states';
import { useWide } from '@/components/ui/use-wide';
import { memberText, peopleText } from '@/constants/texts/people';
import { space } from '@/constants/theme';
import { useDesk } from '@/hooks/use-desk';
import { usePeople } from '@/hooks/use-people';
import { useSession } from '@/hooks/use-session';
import { ApiError } from '@/shared/api-client';
import type { Member } from '@/shared/contracts/people';
import { rolesADeskHeadSets } from '@/shared/permissions';
import type { ReasonAct } from './act-dialogs';
import { MembershipSection, RoleSection, SingleChangesSection } from './member-sections';
import { StandingSection } from './standing-section';

/** The act whose dialog is open. */
export type OpenAct = { kind: 'set-role' } | { kind: 'grant' } | { kind: 'withdraw' } | ReasonAct;

export function MemberScreen({ userId }: { userId: string }) {
  const desk = useDesk();
  const { data, error, refetch } = usePeople(desk.id);
  if (data) {
    const member = data.find(({ user }) => user.id === userId);
    if (member) return <MemberPage member={member} />;
    return <PlainPage title={memberText.missing} body={memberText.missingBody} />;
  }
  return (
    <Screen title={peopleText.title}>
      {error ? (
        <ErrorState
          message={error.message}
          requestId={error instanceof ApiError ? error.requestId : null}
          onRetry={() => void refetch()}
        />
      ) : (
        <SkeletonRows />
      )}
    </Screen>
  );
}

/** Why nothing can be changed here, or null when it can. */
function useObstacle(member: Member): string | null {
  const { me } = useSession();
  const desk = useDesk();
  if (!desk.permissions.includes('manage-people')) return peopleText.readOnly;
  if (member.user.id === me?.user.id) return memberText.own;
  const settable = rolesADeskHeadSets.some((role) => role === member.role);
  return settable ? null : memberText.controlRole;
}

function MemberPage({ member }: { member: Member }) {
  const wide = useWide();
  const desk = useDesk();
  const obstacle = useObstacle(member);
  const [open, setOpen] = useState<OpenAct | null>(null);
  const [done, setDone] = useState<string | null>(null);
  const start = obstacle === null ? setOpen : null;
  const finish = (act: OpenAct) => {
    setOpen(null);
    setDone(memberText.done[act.kind](member.user.name));
  };
  return (
    <Screen
      title={member.user.name}
      overline={<BackLink href={`/desks/${desk.id}/people`} label={peopleText.title} />}
      subtitle={member.user.email}
    >
      {done ? <Notice tone="moss" title={done} /> : null}
      {obstacle ? <Notice tone="lake" title={obstacle} /> : null}
      <View style={wide ? styles.columns : styles.column}>
        <View style={wide ? styles.half : styles.column}>
          <RoleSection member={member} start={start} />
          <SingleChangesSection member={member} start={start} />
          <MembershipSection member={member} start={start} />
        </View>
        <View style={wide ? styles.half : styles.column}>
          <StandingSection member={member} />
        </View>
      </View>
      {open ? (
        <OpenDialog
          act={open}
          member={member}
          onClose={() => setOpen(null)}
          onDone={() => finish(open)}
        />
      ) : null}
    </Screen>
  );
}

type OpenDialogProps = { act: OpenAct; member: Member; onClose: () => void; onDone: () => void };

function OpenDialog({ act, ...rest }: OpenDialogProps) {
  switch (act.kind) {
    case 'set-role':
      return <RoleDialog {...rest} />;
    case 'grant':
    case 'withdraw':
      return <PermissionDialog {...rest} effect={act.kind} />;
    default:
      return <ReasonDialog {...rest} act={act} />;
  }
}

const styles = StyleSheet.create({
  columns: { flexDirection: 'row', alignItems: 'flex-start', gap: space.lg },
  column: { gap: space.lg, minWidth: 0 },
  half: { flexGrow: 1, flexShrink: 1, flexBasis: 0, gap: space.lg, minWidth: 0 },
});
