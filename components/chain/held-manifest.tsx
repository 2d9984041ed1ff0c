import { useRef, useState, type ChangeEvent } from 'react';
import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { LinkButton } from '@/components/ui/text-field';
import { Text } from '@/components/ui/text';
import { chainText } from '@/constants/texts/history';
import { space } from '@/constants/theme';
import type { HeldPlace } from '@/shared/contracts/chain';
import { manifestSchema } from '@/shared/contracts/exports';

/** The signed place in a manifest; null when the text is none, or was made of an empty chain. */
function placeIn(text: string): HeldPlace | null {
  try {
    const { headPosition, headHash } = manifestSchema.parse(JSON.parse(text)).chain;
    return headPosition === null || headHash === null
      ? null
      : { position: headPosition, hash: headHash };
  } catch {
    // Whatever is wrong with the file, the person is told to choose another one.
    return null;
  }
}

export type HeldManifestProps = {
  held: HeldPlace | null;
  onHeld: (held: HeldPlace | null) => void;
};

/** Lets the chain be compared with what someone kept where nobody else could change it. */
export function HeldManifest({ held, onHeld }: HeldManifestProps) {
  const input = useRef<HTMLInputElement>(null);
  const [unreadable, setUnreadable] = useState(false);
  const choose = async ({ target }: ChangeEvent<HTMLInputElement>) => {
    const file = target.files?.[0];
    if (!file) return;
    const place = placeIn(await file.text());
    setUnreadable(place === null);
    onHeld(place);
    target.value = '';
  };
  return (
    <View style={styles.box}>
      <Text weight="medium">{chainText.held}</Text>
      <Text size="small" tone="muted">
        {chainText.heldBody}
      </Text>
      <input
        ref={input}
        className="visually-hidden"
        type="file"
        accept=".json,application/json"
        aria-label={chainText.held}
        tabIndex={-1}
        onChange={(event) => void choose(event)}
      />
      <View style={styles.start}>
        <Button
          kind="secondary"
          label={chainText.chooseManifest}
          onPress={() => input.current?.click()}
        />
      </View>
      {held ? (
        <View style={styles.line}>
          <Text tabular>{chainText.heldChosen(held.position)}</Text>
          <LinkButton label={chainText.heldForget} onPress={() => onHeld(null)} />
        </View>
      ) : null}
      {unreadable ? <Notice tone="brick" title={chainText.heldUnreadable} /> : null}
    </View>
  );
}

const styles = StyleSheet.create({
  box: { gap: space.xs },
  start: { alignItems: 'flex-start', paddingTop: space.xs },
  line: { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'baseline', gap: space.sm },
});
