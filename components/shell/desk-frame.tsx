import { usePathname } from 'expo-router';
import { useEffect, type ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { ScreenCorner } from '@/components/ui/screen';
import { useWide } from '@/components/ui/use-wide';
import { shellText } from '@/constants/texts/shell';
import { rememberDesk } from '@/hooks/use-desk';
import type { DeskAccess, Me } from '@/shared/contracts/sessions';
import { DeskSwitch } from './desk-switch';
import { BottomBar, Rail, sectionOf } from './navigation';
import { PlainPage } from './permitted';
import { usePageStart } from './use-page-start';

export type DeskFrameProps = { me: Me; desk: DeskAccess; children: ReactNode };

/** What stands around every screen of a desk: the rail or the bottom bar, and the desk's name. */
export function DeskFrame({ me, desk, children }: DeskFrameProps) {
  const wide = useWide();
  const section = sectionOf(usePathname());
  useEffect(() => rememberDesk(desk.id), [desk.id]);
  usePageStart();
  const deskSwitch = <DeskSwitch desks={me.desks} current={desk} />;
  // Someone who is suspended can still see who they are and sign out.
  const content =
    desk.suspended && section !== 'more' ? (
      <PlainPage title={shellText.suspendedTitle} body={shellText.suspendedBody} />
    ) : (
      children
    );
  return (
    <View style={wide ? styles.wide : styles.narrow}>
      {wide ? <Rail desk={desk} foot={deskSwitch} /> : null}
      <View style={styles.content}>
        <ScreenCorner value={wide ? null : deskSwitch}>{content}</ScreenCorner>
      </View>
      {wide ? null : <BottomBar desk={desk} />}
    </View>
  );
}

const styles = StyleSheet.create({
  wide: { flexDirection: 'row', flexGrow: 1, alignItems: 'stretch' },
  narrow: { flexGrow: 1 },
  content: { flexGrow: 1, flexShrink: 1, flexBasis: 'auto', minWidth: 0 },
});
