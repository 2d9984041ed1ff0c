import { useSyncExternalStore } from 'react';
import { breakpoint } from '@/constants/theme';

const query = `(min-width: ${breakpoint.wide}px)`;

const subscribe = (onChange: () => void) => {
  const list = window.matchMedia(query);
  list.addEventListener('change', onChange);
  return () => list.removeEventListener('change', onChange);
};

/** Whether the window is wide enough for the rail and for things side by side. */
export const useWide = (): boolean =>
  useSyncExternalStore(subscribe, () => window.matchMedia(query).matches);
