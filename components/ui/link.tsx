import { useRouter, type Href } from 'expo-router';
import type { MouseEvent, ReactNode, Ref } from 'react';

export type LinkProps = {
  /** An address inside the product, such as `/desks/…/quotes`. */
  href: string;
  children: ReactNode;
  className?: string;
  label?: string;
  /** The page that is open now. */
  current?: boolean;
  /** Puts the address in the place of the present one, for filters. */
  replace?: boolean;
  onFollow?: () => void;
  ref?: Ref<HTMLAnchorElement>;
};

const opensElsewhere = (event: MouseEvent) =>
  event.button !== 0 || event.metaKey || event.ctrlKey || event.shiftKey || event.altKey;

/** A plain anchor, so that copying, opening in a new tab and the class names of the sheet work. */
export function Link({
  href,
  children,
  className,
  label,
  current,
  replace,
  onFollow,
  ref,
}: LinkProps) {
  const router = useRouter();
  const follow = (event: MouseEvent) => {
    if (event.defaultPrevented || opensElsewhere(event)) return;
    event.preventDefault();
    onFollow?.();
    if (replace) router.replace(href as Href);
    else router.push(href as Href);
  };
  return (
    <a
      ref={ref}
      href={href}
      className={className ?? 'link'}
      aria-label={label}
      aria-current={current ? 'page' : undefined}
      onClick={follow}
    >
      {children}
    </a>
  );
}
