import { color as colors } from '@/constants/theme';

/** Own line icons on a grid of 24, drawn with one pen; dots are separate circles. */
const drawings = {
  today: { paths: ['M4 9h15', 'M4 15h9'] },
  ticket: { paths: ['M4 18c8.5 0 7.5-12 16-12'] },
  quotes: { paths: ['M5 6.500h14', 'M5 12h14', 'M5 17.500h8'], dots: [[18, 17.5]] },
  books: { paths: ['M5 4.500h14v15H5z', 'M5 9.500h14', 'M5 14.500h14'] },
  people: {
    paths: [
      'M3.5 19c.8-3.6 2.9-5.2 5.5-5.200s4.7 1.6 5.5 5.2',
      'M15.5 14.200c2.5 0 4.3 1.5 5 4.8',
      'M12 8.200a3 3 0 1 1-6 0 3 3 0 0 1 6 0z',
      'M15 5.500a2.7 2.7 0 1 1 0 5.4',
    ],
  },
  'market-data': {
    paths: ['M4 6.500h16v11H4z', 'M4 10.200h16', 'M4 13.800h16', 'M10 6.500v11'],
  },
  policies: {
    paths: ['M6 4.500h9l3 3v12H6z', 'M9 11h6', 'M9 14h6', 'M9 8h3'],
  },
  changes: { paths: ['M12 7.500V12l3 2', 'M4.5 12a7.5 7.5 0 1 0 2.6-5.7', 'M4.5 4v3.500H8'] },
  runs: {
    paths: ['M4.5 6.500h11', 'M4.5 12h11', 'M4.5 17.500h6', 'M14 17l2 2 4-4.500'],
    dots: [
      [19, 6.5],
      [19, 12],
    ],
  },
  studies: {
    paths: ['M4.5 4.5v15h15', 'M8 8l9 7.500'],
    dots: [
      [8, 8],
      [12.5, 11.8],
      [17, 15.5],
    ],
  },
  history: { paths: ['M4 5v14.500h16', 'M7 15.500l4-5 3.500 3 5-6.500'] },
  chain: {
    paths: [
      'M10.5 13.500a3.5 3.5 0 0 1 0-5l2.500-2.500a3.5 3.5 0 0 1 5 5l-1.200 1.200',
      'M13.5 10.500a3.5 3.5 0 0 1 0 5l-2.500 2.500a3.5 3.5 0 0 1-5-5l1.200-1.200',
    ],
  },
  more: {
    paths: [],
    dots: [
      [5.5, 12],
      [12, 12],
      [18.5, 12],
    ],
  },
  'sign-out': { paths: ['M13 4.500H6v15h7', 'M10.5 12H20', 'M16.5 8.5 20 12l-3.5 3.5'] },
  chevron: { paths: ['M6.5 9.5 12 15l5.5-5.5'] },
  forward: { paths: ['M9.5 6.5 15 12l-5.5 5.5'] },
  back: { paths: ['M14.5 6.5 9 12l5.5 5.5'] },
  close: { paths: ['M6.5 6.500l11 11', 'M17.5 6.500l-11 11'] },
  check: { paths: ['M5.5 12.500l4.5 4.5 8.5-10'] },
  plus: { paths: ['M12 5.500v13', 'M5.5 12h13'] },
  minus: { paths: ['M5.5 12h13'] },
  caution: { paths: ['M12 4.5 20.5 19h-17z', 'M12 10v4.2'], dots: [[12, 16.7]] },
  search: {
    paths: ['M16.2 10.600a5.6 5.6 0 1 1-11.2 0 5.6 5.6 0 0 1 11.2 0z', 'M14.8 14.8 19.5 19.5'],
  },
  lock: { paths: ['M6 11h12v8.500H6z', 'M8.5 11V8a3.5 3.5 0 0 1 7 0v3'] },
  document: { paths: ['M6.5 4.500h7.500l3.5 3.500v11.500h-11z', 'M9.5 12h5', 'M9.5 15.500h5'] },
} satisfies Record<string, { paths: string[]; dots?: number[][] }>;

export type IconName = keyof typeof drawings;

export type IconProps = { name: IconName; size?: number; color?: string };

/** Decorative: the word beside it, or the label of its button, carries the meaning. */
export function Icon({ name, size = 24, color = 'currentcolor' }: IconProps) {
  const drawing: { paths: string[]; dots?: number[][] } = drawings[name];
  return (
    <svg width={size} height={size} viewBox="0 0 24 24" fill="none" aria-hidden>
      {drawing.paths.map((d) => (
        <path
          key={d}
          d={d}
          stroke={color}
          strokeWidth={1.8}
          strokeLinecap="round"
          strokeLinejoin="round"
        />
      ))}
      {drawing.dots?.map(([x, y]) => (
        <circle key={`${x} ${y}`} cx={x} cy={y} r={1.3} fill={color} />
      ))}
    </svg>
  );
}

/** The mark: three level lines and the one point that is being priced. */
export function Mark({ size = 28, color = colors.lake }: { size?: number; color?: string }) {
  const lines = [
    'M2 12.6c5 .2 6-2 8.4-5.2C12.6 4.5 14.4 3.2 19 3',
    'M2 17c6.2.2 7.4-2.8 10-6.2C14.4 7.7 16.4 6.6 22 6.4',
    'M2 21.4c7.6.2 8.8-3.6 11.6-7.2 2.2-2.8 4-3.8 8.4-4',
  ];
  return (
    <svg width={size} height={size} viewBox="0 0 24 24" fill="none" aria-hidden>
      {lines.map((d) => (
        <path key={d} d={d} stroke={color} strokeWidth={1.7} strokeLinecap="round" />
      ))}
      <circle cx={11.2} cy={9.1} r={2.9} fill={color} stroke={colors.surface} strokeWidth={1.3} />
    </svg>
  );
}
