import { color } from '@/constants/theme';

/** A small patch of the value map: level lines that rise to the right, and one point on them. */
export function LevelLines({ width = 160 }: { width?: number }) {
  const height = width * 0.5;
  const line = (k: number) =>
    `M0 ${90 - 6 * k} C 70 ${90 - 6 * k}, 100 ${60 - 7 * k}, 200 ${46 - 8 * k}`;
  return (
    <svg width={width} height={height} viewBox="0 0 200 100" fill="none" aria-hidden>
      {[0, 1, 2, 3, 4, 5].map((k) => (
        <path
          key={k}
          d={line(k)}
          stroke={k === 2 ? color.lake : color.contour}
          strokeWidth={k === 2 ? 2 : 1.5}
          strokeLinecap="round"
        />
      ))}
      <circle cx={89} cy={60} r={5} fill={color.surface} stroke={color.lake} strokeWidth={2} />
    </svg>
  );
}
