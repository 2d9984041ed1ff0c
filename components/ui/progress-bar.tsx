import type { CSSProperties } from 'react';
import { color } from '@/constants/theme';

const style: CSSProperties = { display: 'block', width: '100%', accentColor: color.lake };

/** How much of a known amount of work is done; the words stand beside it. */
export function ProgressBar({ done, total }: { done: number; total: number }) {
  return <progress style={style} max={Math.max(1, total)} value={done} aria-hidden />;
}
