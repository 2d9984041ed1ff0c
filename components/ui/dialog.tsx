import { useEffect, useId, useRef, type ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { uiText } from '@/constants/texts/ui';
import { color, space } from '@/constants/theme';
import { Icon } from './icon';
import { Heading } from './text';

export type DialogProps = {
  title: string;
  open: boolean;
  /** Escape, a tap beside the dialog, or its close button. */
  onClose: () => void;
  children: ReactNode;
  /** Buttons at the bottom, the main one last. */
  actions?: ReactNode;
  size?: 'normal' | 'wide';
};

/**
 * The browser's own modal dialog: it traps focus and makes the page behind inert; when it closes,
 * focus goes back to where it was, or to the page where its act has taken that away.
 */
export function Dialog({ title, open, onClose, children, actions, size = 'normal' }: DialogProps) {
  const element = useRef<HTMLDialogElement>(null);
  const titleId = useId();
  useEffect(() => {
    if (!open) return;
    const dialog = element.current;
    const opener = document.activeElement;
    dialog?.showModal();
    // Where there is something to fill in, one starts there and not at the close button.
    dialog?.querySelector<HTMLElement>('.field-input')?.focus();
    return () => {
      dialog?.close();
      if (opener instanceof HTMLElement && opener.isConnected) opener.focus();
      else document.getElementById('content')?.focus({ preventScroll: true });
    };
  }, [open]);
  if (!open) return null;
  return (
    <dialog
      ref={element}
      className="dialog"
      data-size={size}
      aria-labelledby={titleId}
      onCancel={(event) => {
        event.preventDefault();
        onClose();
      }}
      onClick={(event) => {
        if (event.target === element.current) onClose();
      }}
    >
      <View style={styles.body}>
        <View style={styles.head}>
          <Heading level={2} id={titleId}>
            {title}
          </Heading>
          <button type="button" className="icon-button" aria-label={uiText.close} onClick={onClose}>
            <Icon name="close" size={20} color={color.muted} />
          </button>
        </View>
        {children}
        {actions ? <View style={styles.actions}>{actions}</View> : null}
      </View>
    </dialog>
  );
}

const styles = StyleSheet.create({
  body: { gap: space.lg, padding: space.xl, paddingTop: space.lg },
  head: {
    flexDirection: 'row',
    alignItems: 'center',
    justifyContent: 'space-between',
    gap: space.md,
  },
  actions: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    justifyContent: 'flex-end',
    gap: space.sm,
  },
});
