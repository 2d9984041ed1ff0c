import { usePathname } from 'expo-router';
import type { ReactNode } from 'react';
import { Section } from '@/components/ui/card';
import { Icon, Mark, type IconName } from '@/components/ui/icon';
import { Link } from '@/components/ui/link';
import { shellText } from '@/constants/texts/shell';
import type { DeskAccess } from '@/shared/contracts/sessions';
import type { DeskRole, Permission } from '@/shared/permissions';

type Item = { name: keyof typeof shellText.items; icon: IconName; permission: Permission | null };

const allItems: readonly Item[] = [
  { name: 'ticket', icon: 'ticket', permission: 'price' },
  { name: 'quotes', icon: 'quotes', permission: 'read-desk' },
  { name: 'books', icon: 'books', permission: 'read-desk' },
  { name: 'market-data', icon: 'market-data', permission: 'read-desk' },
  { name: 'policies', icon: 'policies', permission: 'read-desk' },
  { name: 'runs', icon: 'runs', permission: 'read-desk' },
  { name: 'studies', icon: 'studies', permission: 'read-desk' },
  { name: 'history', icon: 'history', permission: 'read-desk' },
  { name: 'chain', icon: 'chain', permission: 'export-history' },
  { name: 'people', icon: 'people', permission: 'read-desk' },
  { name: 'changes', icon: 'changes', permission: 'read-audit-log' },
  { name: 'more', icon: 'more', permission: null },
];

/** What this person may open on this desk, in the order of the day. */
const itemsFor = ({ permissions, suspended }: DeskAccess) =>
  allItems.filter(
    ({ permission }) => permission === null || (!suspended && permissions.includes(permission)),
  );

/** The section of a desk's address: `/desks/<id>/quotes/<quote>` is in `quotes`. */
export const sectionOf = (pathname: string): string => pathname.split('/')[3] ?? '';

/** A phone has room for five: what a role opens most, and the page that leads to the rest. */
const barLength = 5;

const barOf: Record<DeskRole, readonly Item['name'][]> = {
  analyst: ['ticket', 'quotes', 'books', 'market-data'],
  'desk-head': ['ticket', 'quotes', 'books', 'runs'],
  'risk-officer': ['books', 'market-data', 'runs', 'studies'],
  auditor: ['books', 'runs', 'history', 'chain'],
};

function splitItems(desk: DeskAccess) {
  const items = itemsFor(desk);
  if (items.length <= barLength) return { bar: items, overflow: [] };
  const isInBar = ({ name }: Item) => name === 'more' || barOf[desk.role].includes(name);
  return { bar: items.filter(isInBar), overflow: items.filter((item) => !isInBar(item)) };
}

const barItems = (desk: DeskAccess) => splitItems(desk).bar;

/** What the bar has no room for; the page behind its last item lists it. */
const overflowItems = (desk: DeskAccess) => splitItems(desk).overflow;

type ItemsProps = { desk: DeskAccess; items: readonly Item[]; className: string };

/** The item that a section is reached by: a trade by its book, what the bar lacks by its last item. */
function currentOf(items: readonly Item[], section: string): string {
  const name = section === 'trades' ? 'books' : section;
  return items.some((item) => item.name === name) ? name : 'more';
}

function Items({ desk, items, className }: ItemsProps) {
  const current = currentOf(items, sectionOf(usePathname()));
  return items.map(({ name, icon }) => (
    <Link
      key={name}
      href={`/desks/${desk.id}/${name}`}
      className={className}
      current={name === current}
    >
      <Icon name={icon} />
      <span>{shellText.items[name]}</span>
    </Link>
  ));
}

export function BottomBar({ desk }: { desk: DeskAccess }) {
  return (
    <nav className="bottom-bar" aria-label={shellText.navigation}>
      <Items desk={desk} items={barItems(desk)} className="bottom-item" />
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
      <Items desk={desk} items={itemsFor(desk)} className="rail-item" />
      <div className="rail-foot">{foot}</div>
    </nav>
  );
}

/** The pages of the desk that a phone's bar has no room for; nothing where it shows them all. */
export function Elsewhere({ desk }: { desk: DeskAccess }) {
  const items = overflowItems(desk);
  if (items.length === 0) return null;
  return (
    <nav aria-label={shellText.elsewhere}>
      <Section title={shellText.elsewhere}>
        <div className="elsewhere">
          <Items desk={desk} items={items} className="rail-item" />
        </div>
      </Section>
    </nav>
  );
}
