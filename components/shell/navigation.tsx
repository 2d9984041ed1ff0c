import { usePathname } from 'expo-router';
import type { ReactNode } from 'react';
import { Icon, Mark, type IconName } from '@/components/ui/icon';
import { Link } from '@/components/ui/link';
import { shellText } from '@/constants/texts/shell';
import type { DeskAccess } from '@/shared/contracts/sessions';
import type { Permission } from '@/shared/permissions';

type Item = { name: keyof typeof shellText.items; icon: IconName; permission: Permission | null };

const items: readonly Item[] = [
  { name: 'ticket', icon: 'ticket', permission: 'price' },
  { name: 'quotes', icon: 'quotes', permission: 'read-desk' },
  { name: 'people', icon: 'people', permission: 'read-desk' },
  { name: 'changes', icon: 'changes', permission: 'read-audit-log' },
  { name: 'more', icon: 'more', permission: null },
];

/** What this person may open on this desk, in the order of the day. */
const itemsFor = ({ permissions, suspended }: DeskAccess) =>
  items.filter(
    ({ permission }) => permission === null || (!suspended && permissions.includes(permission)),
  );

/** The section of a desk's address: `/desks/<id>/quotes/<quote>` is in `quotes`. */
export const sectionOf = (pathname: string): string => pathname.split('/')[3] ?? '';

function Items({ desk, className }: { desk: DeskAccess; className: string }) {
  const section = sectionOf(usePathname());
  return itemsFor(desk).map(({ name, icon }) => (
    <Link
      key={name}
      href={`/desks/${desk.id}/${name}`}
      className={className}
      current={section === name}
    >
      <Icon name={icon} />
      <span>{shellText.items[name]}</span>
    </Link>
  ));
}

export function BottomBar({ desk }: { desk: DeskAccess }) {
  return (
    <nav className="bottom-bar" aria-label={shellText.navigation}>
      <Items desk={desk} className="bottom-item" />
    </nav>
  );
}

export function Rail({ desk, foot }: { desk: DeskAccess; foot: ReactNode }) {
  return (
    <nav className="rail" aria-label={shellText.navigation}>
      <Link href="/" className="rail-brand">
        <Mark />
        <span>{shellText.product}</span>
      </Link>
      <Items desk={desk} className="rail-item" />
      <div className="rail-foot">{foot}</div>
    </nav>
  );
}
