import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/button';
import { Section } from '@/components/ui/card';
import { Icon } from '@/components/ui/icon';
import { Notice } from '@/components/ui/notice';
import { Screen } from '@/components/ui/screen';
import { ChoiceField } from '@/components/ui/select-field';
import { Text } from '@/components/ui/text';
import { useWide } from '@/components/ui/use-wide';
import { cautionTexts, conventionTexts, moreText, shellText } from '@/constants/texts/shell';
import { color, space } from '@/constants/theme';
import { useDesk } from '@/hooks/use-desk';
import { useSession } from '@/hooks/use-session';
import { themeChoices, useTheme } from '@/hooks/use-theme';
import { ApiError } from '@/shared/api-client';
import { apiBase } from '@/shared/endpoint';
import { permissionSentence } from '@/shared/permissions';
import { DeskList } from './desk-switch';
import { Elsewhere } from './navigation';

/** The account, the look, and what the figures mean. */
export function MoreScreen() {
  const wide = useWide();
  const desk = useDesk();
  return (
    <Screen title={moreText.title}>
      <View style={wide ? styles.columns : styles.column}>
        <View style={wide ? styles.half : styles.column}>
          {wide ? null : <Elsewhere desk={desk} />}
          <Account />
          <Desks />
          <Look />
          <Programs />
        </View>
        <View style={wide ? styles.half : styles.column}>
          <OwnPermissions />
          <Conventions />
          <Cautions />
        </View>
      </View>
    </Screen>
  );
}

function Account() {
  const { me, signOut } = useSession();
  const desk = useDesk();
  const [failed, setFailed] = useState(false);
  const leave = () =>
    signOut().catch((error: unknown) => {
      if (!(error instanceof ApiError)) throw error;
      setFailed(true);
    });
  return (
    <Section title={moreText.you}>
      <View>
        <Text size="lead" weight="semibold">
          {me?.user.name}
        </Text>
        <Text tone="muted">{me?.user.email}</Text>
        <Text tone="muted">{moreText.role(shellText.roles[desk.role], desk.name)}</Text>
      </View>
      {failed ? <Notice tone="brick" title={moreText.signOutFailed} /> : null}
      <View style={styles.start}>
        <Button
          kind="secondary"
          icon="sign-out"
          label={moreText.signOut}
          onPress={() => void leave()}
        />
      </View>
    </Section>
  );
}

function Desks() {
  const { me } = useSession();
  const desk = useDesk();
  return (
    <Section title={moreText.desks}>
      <DeskList desks={me?.desks ?? []} current={desk} />
    </Section>
  );
}

function Look() {
  const { choice, chooseTheme } = useTheme();
  return (
    <Section title={moreText.look}>
      <ChoiceField
        label={moreText.scheme}
        value={choice}
        options={themeChoices.map((value) => ({ value, label: moreText.schemes[value] }))}
        onChange={chooseTheme}
      />
    </Section>
  );
}

function Programs() {
  return (
    <Section title={moreText.api}>
      <Text>{moreText.apiBody}</Text>
      <a className="link" href={`${apiBase}/docs`}>
        {moreText.apiLink}
      </a>
    </Section>
  );
}

function OwnPermissions() {
  const { permissions } = useDesk();
  return (
    <Section title={moreText.mayTitle}>
      <View role="list" style={styles.list}>
        {permissions.map((permission) => (
          <View role="listitem" key={permission} style={styles.point}>
            <Icon name="check" size={18} color={color.moss} />
            <Text style={styles.words}>{permissionSentence(permission)}</Text>
          </View>
        ))}
      </View>
    </Section>
  );
}

function Conventions() {
  return (
    <Section title={moreText.conventions}>
      <dl className="terms">
        {conventionTexts.map(({ term, meaning }) => (
          <div key={term}>
            <dt>{term}</dt>
            <dd>{meaning}</dd>
          </div>
        ))}
      </dl>
    </Section>
  );
}

function Cautions() {
  return (
    <Section title={moreText.cautions}>
      <View role="list" style={styles.list}>
        {cautionTexts.map((caution) => (
          <View role="listitem" key={caution} style={styles.point}>
            <Icon name="caution" size={18} color={color.ochre} />
            <Text style={styles.words}>{caution}</Text>
          </View>
        ))}
      </View>
    </Section>
  );
}

const styles = StyleSheet.create({
  columns: { flexDirection: 'row', alignItems: 'flex-start', gap: space.lg },
  column: { gap: space.lg, minWidth: 0 },
  half: { flexGrow: 1, flexShrink: 1, flexBasis: 0, gap: space.lg, minWidth: 0 },
  start: { alignItems: 'flex-start' },
  list: { gap: space.sm },
  point: { flexDirection: 'row', alignItems: 'flex-start', gap: space.sm },
  words: { flex: 1 },
});
