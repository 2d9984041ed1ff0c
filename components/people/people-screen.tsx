import { StyleSheet, View } from 'react-native';
import { Badge } from '@/components/ui/badge';
import { DataTable, type Column } from '@/components/ui/data-table';
import { Icon } from '@/components/ui/icon';
import { Link } from '@/components/ui/link';
import { Screen } from '@/components/ui/screen';
import { ErrorState, SkeletonRows } from '@/components/ui/states';
import { Text } from '@/components/ui/text';
import { peopleText } from '@/constants/texts/people';
import { shellText } from '@/constants/texts/shell';
import { color, space } from '@/constants/theme';
import { useDesk } from '@/hooks/use-desk';
import { usePeople } from '@/hooks/use-people';
import { useSession } from '@/hooks/use-session';
import { ApiError } from '@/shared/api-client';
import type { Member } from '@/shared/contracts/people';

/** The members of the desk, with role, state and what deviates from the role. */
export function PeopleScreen() {
  const desk = useDesk();
  const { data, error, refetch } = usePeople(desk.id);
  const mayManage = desk.permissions.includes('manage-people');
  return (
    <Screen
      title={peopleText.title}
      subtitle={mayManage ? peopleText.manages : peopleText.readOnly}
    >
      {data ? (
        <Members members={data} deskId={desk.id} />
      ) : error ? (
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

function Members({ members, deskId }: { members: Member[]; deskId: string }) {
  const { me } = useSession();
  const hrefOf = ({ user }: Member) => `/desks/${deskId}/people/${user.id}`;
  return (
    <DataTable
      caption={peopleText.caption}
      columns={columns(me?.user.id)}
      rows={members}
      rowId={({ user }) => user.id}
      rowHref={hrefOf}
      sticky
      card={(member) => (
        <Link href={hrefOf(member)} className="card-link">
          <View style={styles.card}>
            <View style={styles.words}>
              <PersonName member={member} own={member.user.id === me?.user.id} />
              <Text tone="muted">{shellText.roles[member.role]}</Text>
              <View style={styles.badges}>
                <StateBadge member={member} />
                <ChangeBadges member={member} />
              </View>
            </View>
            <Icon name="forward" size={20} color={color.muted} />
          </View>
        </Link>
      )}
    />
  );
}

const columns = (ownId: string | undefined): Column<Member>[] => [
  {
    id: 'name',
    header: peopleText.name,
    cell: (member) => <PersonName member={member} own={member.user.id === ownId} />,
  },
  { id: 'email', header: peopleText.email, cell: ({ user }) => user.email },
  { id: 'role', header: peopleText.role, cell: ({ role }) => shellText.roles[role] },
  { id: 'state', header: peopleText.state, cell: (member) => <StateBadge member={member} /> },
  {
    id: 'single',
    header: peopleText.single,
    cell: (member) =>
      member.changes.length === 0 ? (
        <Text tone="muted">{peopleText.none}</Text>
      ) : (
        <View style={styles.badges}>
          <ChangeBadges member={member} />
        </View>
      ),
  },
  { id: 'since', header: peopleText.since, align: 'end', cell: ({ memberSince }) => memberSince },
];

function PersonName({ member, own }: { member: Member; own: boolean }) {
  return (
    <View style={styles.name}>
      <Text weight="semibold">{member.user.name}</Text>
      {own ? <Badge tone="lake" label={peopleText.you} /> : null}
    </View>
  );
}

export function StateBadge({ member }: { member: Member }) {
  return member.suspendedAt === null ? (
    <Badge tone="moss" label={peopleText.active} />
  ) : (
    <Badge tone="brick" label={peopleText.suspended} />
  );
}

function ChangeBadges({ member }: { member: Member }) {
  const count = (effect: 'grant' | 'withdraw') =>
    member.changes.filter((change) => change.effect === effect).length;
  const granted = count('grant');
  const withdrawn = count('withdraw');
  return (
    <>
      {granted > 0 ? <Badge tone="lake" label={peopleText.granted(granted)} /> : null}
      {withdrawn > 0 ? <Badge tone="ochre" label={peopleText.withdrawn(withdrawn)} /> : null}
    </>
  );
}

const styles = StyleSheet.create({
  card: { flexDirection: 'row', alignItems: 'center', gap: space.md },
  words: { flex: 1, gap: 2, minWidth: 0 },
  name: { flexDirection: 'row', alignItems: 'center', gap: space.sm },
  badges: { flexDirection: 'row', flexWrap: 'wrap', gap: space.xs },
});
