import type { Tone } from './text';

export type BadgeProps = { label: string; tone?: Exclude<Tone, 'ink'> };

/** A short state; the word carries it, the colour only helps to find it. */
export function Badge({ label, tone = 'muted' }: BadgeProps) {
  return <span className={`badge badge-${tone}`}>{label}</span>;
}
