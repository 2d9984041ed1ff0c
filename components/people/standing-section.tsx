import { StyleSheet, View } from 'react-native';
import { Badge } from '@/components/ui/badge';
import { Section } from '@/components/ui/card';
import { Icon } from '@/components/ui/icon';
import { Text } from '@/components/ui/text';
import { memberText } from '@/constants/texts/people';
import { color, space } from '@/constants/theme';
import type { Member } from '@/shared/contracts/people';
import { permissionSentence } from '@/shared/permissions';
import { standingOf, type Standing } from './consequences';

/** What the person may do now, and what of it does not come from the role. */
export function StandingSection({ member }: { member: Member }) {
  return (
    <Section title={memberText.mayTitle}>
      {member.suspendedAt === null ? null : <Text tone="brick">{memberText.nothingNow}</Text>}
      <View role="list" style={styles.list}>
        {standingOf(member).map((standing) => (
          <View role="listitem" key={standing.permission} style={styles.row}>
            <Icon
              name={standing.held ? 'check' : 'close'}
              size={18}
              color={standing.held ? color.moss : color.ochre}
            />
            <Text tone={standing.held ? 'ink' : 'muted'} style={styles.sentence}>
              {permissionSentence(standing.permission)}
            </Text>
            <SourceBadge source={standing.source} />
          </View>
        ))}
      </View>
    </Section>
  );
}

function SourceBadge({ source }: Pick<Standing, 'source'>) {
  if (source === 'granted') return <Badge tone="lake" label={memberText.granted} />;
  if (source === 'withdrawn') return <Badge tone="ochre" label={memberText.withdrawn} />;
  return null;
}

const styles = StyleSheet.create({
  list: { gap: space.sm },
  row: { flexDirection: 'row', alignItems: 'flex-start', gap: space.sm },
  sentence: { flex: 1 },
});
