import type { FormEventHandler, ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { uiText } from '@/constants/texts/ui';
import { color, radius, space } from '@/constants/theme';
import { Button } from './button';
import { Dialog } from './dialog';
import { Notice } from './notice';
import { Text } from './text';

export type ConfirmDialogProps = {
  title: string;
  act: string;
  /** What the other button says, where `Cancel` could be taken for the act. */
  otherwise?: string;
  danger?: boolean;
  /** What exactly will happen, a sentence each, under its heading and before its last word. */
  willHappen: { title: string; sentences: readonly string[]; foot?: string };
  /** Someone was quicker: what was read anew. */
  stale?: { title: string; body: string };
  failure: string | null;
  busy: boolean;
  onSubmit: FormEventHandler;
  onClose: () => void;
  children?: ReactNode;
};

/** A binding act: its fields, what exactly will happen, and one confirmation. */
export function ConfirmDialog(props: ConfirmDialogProps) {
  const { title, act, danger, willHappen, stale, failure, busy, onSubmit, onClose } = props;
  return (
    <Dialog open title={title} onClose={onClose}>
      <form className="form" noValidate onSubmit={onSubmit}>
        {stale ? <Notice tone="ochre" {...stale} /> : null}
        {props.children}
        <View role="status" style={styles.well}>
          <Text size="small" tone="muted" weight="medium">
            {willHappen.title}
          </Text>
          {willHappen.sentences.map((sentence) => (
            <Text key={sentence}>{sentence}</Text>
          ))}
          {willHappen.foot ? (
            <Text size="small" tone="muted">
              {willHappen.foot}
            </Text>
          ) : null}
        </View>
        {failure ? <Notice tone="brick" title={failure} /> : null}
        <View style={styles.actions}>
          <Button kind="quiet" label={props.otherwise ?? uiText.cancel} onPress={onClose} />
          <Button submit kind={danger ? 'danger' : 'primary'} label={act} busy={busy} />
        </View>
      </form>
    </Dialog>
  );
}

const styles = StyleSheet.create({
  actions: { flexDirection: 'row', flexWrap: 'wrap', justifyContent: 'flex-end', gap: space.sm },
  well: {
    gap: space.xs,
    padding: space.md,
    borderRadius: radius.medium,
    backgroundColor: color.sunk,
  },
});
