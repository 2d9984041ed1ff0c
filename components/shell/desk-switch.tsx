import { usePathname } from 'expo-router';
import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { Badge } from '@/components/ui/badge';
import { Dialog } from '@/components/ui/dialog';
import { Icon } from '@/components/ui/icon';
import { Link } from '@/components/ui/link';
import { Text } from '@/components/ui/text';
import { shellText } from '@/constants/texts/shell';
import { space } from '@/constants/theme';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { sectionOf } from './navigation';

type DeskListProps = { desks: readonly DeskAccess[]; current: DeskAccess; onFollow?: () => void };

/** One's desks; another desk opens in the section that is open now. */
export function DeskList({ desks, current, onFollow }: DeskListProps) {
  const section = sectionOf(usePathname());
  return (
    <View style={styles.list}>
      {desks.map((desk) => (
        <Link
          key={desk.id}
          href={`/desks/${desk.id}/${section}`}
          className="choice-row"
          current={desk.id === current.id}
          onFollow={onFollow}
        >
          <View>
            <Text weight="semibold">{desk.name}</Text>
            <Text size="small" tone="muted">
              {shellText.roles[desk.role]}
            </Text>
          </View>
          {desk.suspended ? <Badge tone="brick" label={shellText.suspended} /> : null}
          {desk.id === current.id ? <Badge tone="lake" label={shellText.currentDesk} /> : null}
        </Link>
      ))}
    </View>
  );
}

/** The desk's name; with more than one desk it is a button that switches. */
export function DeskSwitch({ desks, current }: Omit<DeskListProps, 'onFollow'>) {
  const [open, setOpen] = useState(false);
  if (desks.length < 2) return <span className="desk-chip">{current.name}</span>;
  return (
    <>
      <button
        type="button"
        className="desk-chip"
        aria-label={shellText.switchDesk(current.name)}
        aria-haspopup="dialog"
        onClick={() => setOpen(true)}
      >
        {current.name}
        <Icon name="chevron" size={18} />
      </button>
      <Dialog title={shellText.chooseDesk} open={open} onClose={() => setOpen(false)}>
        <DeskList desks={desks} current={current} onFollow={() => setOpen(false)} />
      </Dialog>
    </>
  );
}

const styles = StyleSheet.create({ list: { gap: space.sm } });
