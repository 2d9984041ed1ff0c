import { usePathname } from 'expo-router';
import { useEffect, type ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { ScreenCorner } from '@/components/ui/screen';
import { useWide } from '@/components/ui/use-wide';
import { shellText } from '@/constants/texts/shell';
import { space } from '@/constants/theme';
import { dismissLost } from '@/hooks/api';
import { rememberDesk } from '@/hooks/use-desk';
import { useSession } from '@/hooks/use-session';
import type { DeskAccess, Me } from '@/shared/contracts/sessions';
import { permissionSentence } from '@/shared/permissions';
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
        <LostPermissions />
        <ScreenCorner value={wide ? null : deskSwitch}>{content}</ScreenCorner>
      </View>
      {wide ? null : <BottomBar desk={desk} />}
    </View>
  );
}

/** Stays in sight until it is read: the part of the screen that was used has just gone. */
function LostPermissions() {
  const { lost } = useSession();
  if (lost.length === 0) return null;
  return (
    <View style={styles.lost}>
      <Notice
        tone="brick"
        title={shellText.lostTitle}
        body={shellText.lost(lost.map(permissionSentence))}
        action={<Button kind="secondary" label={shellText.lostRead} onPress={dismissLost} />}
      />
    </View>
  );
}

const styles = StyleSheet.create({
  wide: { flexDirection: 'row', flexGrow: 1, alignItems: 'stretch' },
  narrow: { flexGrow: 1 },
  lost: { position: 'sticky', top: 0, zIndex: 2, padding: space.sm },
  content: { flexGrow: 1, flexShrink: 1, flexBasis: 'auto', minWidth: 0 },
});
