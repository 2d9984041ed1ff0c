import { StyleSheet, View } from 'react-native';
import { color, radius, space } from '@/constants/theme';
import { Text, type Tone } from './text';

export type BadgeProps = { label: string; tone?: Exclude<Tone, 'ink'> };

const softOf: Record<Exclude<Tone, 'ink'>, string> = {
  muted: color.sunk,
  lake: color.lakeSoft,
  moss: color.mossSoft,
  ochre: color.ochreSoft,
  brick: color.brickSoft,
};

export function Badge({ label, tone = 'muted' }: BadgeProps) {
  return (
    <View style={[styles.badge, { backgroundColor: softOf[tone] }]}>
      <Text size="small" weight="medium" tone={tone}>
        {label}
      </Text>
    </View>
  );
}

const styles = StyleSheet.create({
  badge: {
    alignSelf: 'flex-start',
    paddingHorizontal: space.sm,
    paddingVertical: 1,
    borderRadius: radius.small,
  },
});
