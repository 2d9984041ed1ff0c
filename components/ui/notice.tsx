import type { ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { color, radius, space } from '@/constants/theme';
import { Icon, type IconName } from './icon';
import { Text } from './text';

export type NoticeTone = 'lake' | 'moss' | 'ochre' | 'brick';

export type NoticeProps = {
  tone: NoticeTone;
  title: string;
  body?: ReactNode;
  action?: ReactNode;
};

const looks: Record<NoticeTone, { icon: IconName; ground: string }> = {
  lake: { icon: 'document', ground: color.lakeSoft },
  moss: { icon: 'check', ground: color.mossSoft },
  ochre: { icon: 'caution', ground: color.ochreSoft },
  brick: { icon: 'caution', ground: color.brickSoft },
};

/** What just happened or should be known; a failure interrupts, the rest is read in turn. */
export function Notice({ tone, title, body, action }: NoticeProps) {
  const { icon, ground } = looks[tone];
  return (
    <View
      role={tone === 'brick' ? 'alert' : 'status'}
      style={[styles.notice, { backgroundColor: ground }]}
    >
      <Icon name={icon} size={20} color={color[tone]} />
      <View style={styles.words}>
        <Text weight="semibold">{title}</Text>
        {typeof body === 'string' ? <Text>{body}</Text> : body}
        {action ? <View style={styles.action}>{action}</View> : null}
      </View>
    </View>
  );
}

const styles = StyleSheet.create({
  notice: {
    flexDirection: 'row',
    gap: space.md,
    paddingVertical: space.md,
    paddingHorizontal: space.lg,
    borderRadius: radius.medium,
  },
  words: { flex: 1, gap: space.xs, minWidth: 0 },
  action: { alignItems: 'flex-start', marginTop: space.xs },
});
