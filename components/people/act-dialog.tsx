import type { FormEventHandler, ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { Notice } from '@/components/ui/notice';
import { Text } from '@/components/ui/text';
import { memberText } from '@/constants/texts/people';
import { uiText } from '@/constants/texts/ui';
import { color, radius, space } from '@/constants/theme';
import type { Consequences } from './consequences';
import type { Confirmation } from './use-confirmation';

export type ActDialogProps = {
  title: string;
  act: string;
  danger?: boolean;
  consequences: Consequences;
  confirmation: Confirmation;
  onSubmit: FormEventHandler;
  onClose: () => void;
  children: ReactNode;
};

/** A binding act: its fields, what exactly will happen, and one confirmation. */
export function ActDialog(props: ActDialogProps) {
  const { title, act, danger, consequences, confirmation, onSubmit, onClose, children } = props;
  return (
    <Dialog open title={title} onClose={onClose}>
      <form className="form" noValidate onSubmit={onSubmit}>
        {confirmation.stale ? (
          <Notice tone="ochre" title={memberText.stale} body={memberText.staleBody} />
        ) : null}
        {children}
        <WhatWillHappen consequences={consequences} />
        {confirmation.failure ? <Notice tone="brick" title={confirmation.failure} /> : null}
        <View style={styles.actions}>
          <Button kind="quiet" label={uiText.cancel} onPress={onClose} />
          <Button
            submit
            kind={danger ? 'danger' : 'primary'}
            label={act}
            busy={confirmation.busy}
            disabled={consequences.blocked}
          />
        </View>
      </form>
    </Dialog>
  );
}

function WhatWillHappen({ consequences: { sentences, blocked } }: { consequences: Consequences }) {
  return (
    <View role="status" style={styles.well}>
      <Text size="small" tone="muted" weight="medium">
        {memberText.willHappen}
      </Text>
      {sentences.map((sentence) => (
        <Text key={sentence}>{sentence}</Text>
      ))}
      {blocked ? null : (
        <Text size="small" tone="muted">
          {memberText.recorded}
        </Text>
      )}
    </View>
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
