import type { ReactNode } from 'react';

/** The acts of a screen: at thumb height above the bottom bar of a phone, in place when wide. */
export function ActionBar({ children }: { children: ReactNode }) {
  return <div className="action-bar">{children}</div>;
}
