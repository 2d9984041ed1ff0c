import { Icon } from './icon';
import { Link } from './link';

/** The way up, above the heading of a record. */
export function BackLink({ href, label }: { href: string; label: string }) {
  return (
    <Link href={href} className="back-link">
      <Icon name="back" size={16} />
      {label}
    </Link>
  );
}
