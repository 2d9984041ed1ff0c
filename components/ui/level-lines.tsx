import { color } from '@/constants/theme';

/** A small patch of the value map: level lines that rise to the right, and one point on them. */
export function LevelLines({ width = 160 }: { width?: number }) {
  const height = width * 0.5;
  const line = (k: number) => {
    const low = 92 - 7 * k;
    const bend = 60 + 8 * k;
    return `M0 ${low} C ${bend} ${low - 4}, ${bend + 14} ${low - 62 + 5 * k}, 200 ${22 - 9 * k}`;
  };
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
      <circle cx={99} cy={46} r={5} fill={color.surface} stroke={color.lake} strokeWidth={2} />
    </svg>
  );
}
