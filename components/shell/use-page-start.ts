import { usePathname } from 'expo-router';
import { useEffect, useRef } from 'react';

/** A page that is newly opened starts at its top; going back, the browser finds the old place. */
export function usePageStart(): void {
  const pathname = usePathname();
  const wentBack = useRef(false);
  useEffect(() => {
    const onPopState = () => {
      wentBack.current = true;
    };
    window.addEventListener('popstate', onPopState);
    return () => window.removeEventListener('popstate', onPopState);
  }, []);
  useEffect(() => {
    if (!wentBack.current) window.scrollTo(0, 0);
    wentBack.current = false;
  }, [pathname]);
}
