import { StyleSheet, View } from 'react-native';
import { Text } from '@/components/ui/text';
import { color, space } from '@/constants/theme';

export type Fact = { name: string; value: string; mono?: boolean };

/** Names at the left, values at the right, one fact a line. */
export function FactList({ facts }: { facts: readonly Fact[] }) {
  return (
    <View role="list">
      {facts.map(({ name, value, mono = false }, index) => (
        <View role="listitem" key={name} style={[styles.fact, index > 0 && styles.ruled]}>
          <Text size="small" tone="muted" style={styles.name}>
            {name}
          </Text>
          <Text tabular mono={mono} size={mono ? 'small' : 'body'} style={styles.value}>
            {value}
          </Text>
        </View>
      ))}
    </View>
  );
}

const styles = StyleSheet.create({
  fact: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    alignItems: 'baseline',
    columnGap: space.md,
    paddingVertical: 6,
  },
  ruled: { borderTopWidth: 1, borderTopColor: color.line },
  name: { flexBasis: 116, flexGrow: 0 },
  // A hash breaks anywhere rather than widen the page.
  value: { flexGrow: 1, flexShrink: 1, flexBasis: 160, minWidth: 0 },
});
