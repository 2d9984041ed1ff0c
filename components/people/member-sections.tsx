import { StyleSheet, View } from 'react-native';
import { Badge } from '@/components/ui/badge';
import { Button } from '@/components/ui/button';
import { Section } from '@/components/ui/card';
import { Link } from '@/components/ui/link';
import { Text } from '@/components/ui/text';
import { LinkButton } from '@/components/ui/text-field';
import { memberText } from '@/constants/texts/people';
import { shellText } from '@/constants/texts/shell';
import { color, space } from '@/constants/theme';
import { useDesk } from '@/hooks/use-desk';
import type { Member } from '@/shared/contracts/people';
import { formatInstant } from '@/shared/format/dates';
import { permissionSentence } from '@/shared/permissions';
import type { OpenAct } from './member-screen';
import { StateBadge } from './people-screen';
import { changeable } from './changeable';

/** `start` is null for those who may not change this member: then no act is offered. */
type SectionProps = { member: Member; start: ((act: OpenAct) => void) | null };

export function RoleSection({ member, start }: SectionProps) {
  return (
    <Section
      title={memberText.roleTitle}
      action={
        start ? (
          <LinkButton label={memberText.setRole} onPress={() => start({ kind: 'set-role' })} />
        ) : null
      }
    >
      <View>
        <Text size="lead" weight="semibold">
          {shellText.roles[member.role]}
        </Text>
        <Text tone="muted">{memberText.since(member.memberSince)}</Text>
      </View>
    </Section>
  );
}

type Change = Member['changes'][number];

export function SingleChangesSection({ member, start }: SectionProps) {
  return (
    <Section title={memberText.changesTitle}>
      {member.changes.length === 0 ? <Text tone="muted">{memberText.noChanges}</Text> : null}
      {member.changes.map((change) => (
        <ChangeItem key={change.id} change={change} start={start} />
      ))}
      {start ? (
        <View style={styles.acts}>
          {(['grant', 'withdraw'] as const).map((kind) => (
            <Button
              key={kind}
              kind="secondary"
              icon={kind === 'grant' ? 'plus' : 'minus'}
              label={memberText[kind]}
              disabled={changeable(member, kind).length === 0}
              onPress={() => start({ kind })}
            />
          ))}
        </View>
      ) : null}
    </Section>
  );
}

function ChangeItem({ change, start }: { change: Change; start: SectionProps['start'] }) {
  const { timeZone } = useDesk();
  const { id, effect, endsOn, madeBy, madeAt, reason } = change;
  return (
    <View style={styles.change}>
      <View style={styles.changeHead}>
        <Badge
          tone={effect === 'grant' ? 'lake' : 'ochre'}
          label={effect === 'grant' ? memberText.granted : memberText.withdrawn}
        />
        <Text size="small" tone="muted" tabular style={styles.until}>
          {endsOn === null ? memberText.withoutEnd : memberText.until(endsOn)}
        </Text>
        {start ? (
          <LinkButton
            label={memberText.endChange}
            onPress={() => start({ kind: 'end-change', changeId: id })}
          />
        ) : null}
      </View>
      <Text weight="medium">{permissionSentence(change.permission)}</Text>
      <Text>{reason}</Text>
      <Text size="small" tone="muted" tabular>
        {memberText.madeBy(madeBy.name, formatInstant(madeAt, timeZone))}
      </Text>
    </View>
  );
}

export function MembershipSection({ member, start }: SectionProps) {
  const desk = useDesk();
  const { suspendedAt, suspensionReason } = member;
  const kind = suspendedAt === null ? 'suspend' : 'reinstate';
  const body =
    suspendedAt === null
      ? memberText.activeBody
      : memberText.suspendedBody(formatInstant(suspendedAt, desk.timeZone), suspensionReason ?? '');
  return (
    <Section title={memberText.stateTitle} action={<StateBadge member={member} />}>
      <Text>{body}</Text>
      <View style={styles.acts}>
        {start ? (
          <Button kind="secondary" label={memberText[kind]} onPress={() => start({ kind })} />
        ) : null}
      </View>
      {desk.permissions.includes('read-audit-log') ? (
        <Link href={`/desks/${desk.id}/changes?person=${member.user.id}`}>
          {memberText.history}
        </Link>
      ) : null}
    </Section>
  );
}

const styles = StyleSheet.create({
  acts: { flexDirection: 'row', flexWrap: 'wrap', gap: space.sm },
  change: {
    gap: 2,
    paddingLeft: space.md,
    borderLeftWidth: 2,
    borderLeftColor: color.line,
  },
  changeHead: { flexDirection: 'row', alignItems: 'center', gap: space.sm },
  until: { flex: 1 },
});
