import { useId, type ReactNode } from 'react';
import { StyleSheet, View, type StyleProp, type ViewStyle } from 'react-native';
import { color, radius, space } from '@/constants/theme';
import { Heading } from './text';

export function Card({ children, style }: { children: ReactNode; style?: StyleProp<ViewStyle> }) {
  return <View style={[styles.card, style]}>{children}</View>;
}

export type SectionProps = {
  title: string;
  /** At the right of the heading, such as a link-button `show as table`. */
  action?: ReactNode;
  children: ReactNode;
  style?: StyleProp<ViewStyle>;
};

/** A card with a heading, announced as a region of that name. */
export function Section({ title, action, children, style }: SectionProps) {
  const id = useId();
  return (
    <View role="region" aria-labelledby={id} style={[styles.card, styles.section, style]}>
      <View style={styles.head}>
        <Heading level={2} id={id}>
          {title}
        </Heading>
        {action}
      </View>
      {children}
    </View>
  );
}

const styles = StyleSheet.create({
  card: {
    padding: space.lg,
    borderWidth: 1,
    borderColor: color.line,
    borderRadius: radius.large,
    backgroundColor: color.surface,
  },
  section: { gap: space.md },
  head: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    alignItems: 'baseline',
    justifyContent: 'space-between',
    columnGap: space.md,
    rowGap: space.xs,
  },
});
