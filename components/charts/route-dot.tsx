import { color } from '@/constants/theme';

type Shape = 'circle' | 'diamond' | 'square' | 'triangle' | 'ring';
export type RouteLook = { shape: Shape; ink: string; dash?: string };

/** A route keeps its shape and its line everywhere, so that no colour has to be read. */
const looks: Record<string, RouteLook> = {
  'heat-crank-nicolson': { shape: 'circle', ink: color.lake },
  'lattice-crr': { shape: 'diamond', ink: color.ochre },
  'lattice-symmetric': { shape: 'triangle', ink: color.ochre, dash: '3 2' },
  'closed-form': { shape: 'square', ink: color.ink },
};

export const routeLook = (name: string): RouteLook =>
  looks[name] ?? { shape: 'ring', ink: color.muted };

export function RouteDot({ name, x, y, r }: { name: string; x: number; y: number; r: number }) {
  const { shape, ink } = routeLook(name);
  const paths: Record<Exclude<Shape, 'circle' | 'ring'>, string> = {
    diamond: `M${x} ${y - 1.3 * r}L${x + 1.3 * r} ${y}L${x} ${y + 1.3 * r}L${x - 1.3 * r} ${y}z`,
    square: `M${x - 0.9 * r} ${y - 0.9 * r}h${1.8 * r}v${1.8 * r}h${-1.8 * r}z`,
    triangle: `M${x} ${y - 1.2 * r}L${x + 1.2 * r} ${y + r}H${x - 1.2 * r}z`,
  };
  if (shape === 'circle') return <circle cx={x} cy={y} r={r} fill={ink} />;
  if (shape === 'ring')
    return <circle cx={x} cy={y} r={r} fill={color.surface} stroke={ink} strokeWidth={1.5} />;
  return <path d={paths[shape]} fill={ink} />;
}

/** Towards a value that lies beyond the end of the axis. */
export function BeyondArrow({
  name,
  x,
  y,
  r,
  side,
}: {
  name: string;
  x: number;
  y: number;
  r: number;
  side: 'left' | 'right';
}) {
  const sign = side === 'left' ? -1 : 1;
  const back = x - sign * 1.8 * r;
  const { ink } = routeLook(name);
  return (
    <path
      d={`M${back - sign * 2 * r} ${y}H${x}M${back} ${y - 1.1 * r}L${x} ${y}L${back} ${y + 1.1 * r}`}
      stroke={ink}
      strokeWidth={1.6}
      strokeLinecap="round"
      strokeLinejoin="round"
      fill="none"
    />
  );
}
