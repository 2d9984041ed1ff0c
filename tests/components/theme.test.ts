import { applyTheme, color, palettes, schemes, type ColorToken } from '@/constants/theme';

/** Relative luminance and contrast ratio as WCAG 2.2 defines them (w3.org/TR/WCAG22). */
function luminance(hex: string): number {
  const channels = [1, 3, 5].map((at) => parseInt(hex.slice(at, at + 2), 16) / 255);
  const [red, green, blue] = channels.map((c) =>
    c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4,
  );
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue;
}

function contrast(one: string, other: string): number {
  const [dim, bright] = [luminance(one), luminance(other)].sort((a, b) => a - b);
  return (bright + 0.05) / (dim + 0.05);
}

const grounds: ColorToken[] = ['ground', 'surface', 'sunk'];
const inks: ColorToken[] = ['ink', 'muted', 'lake', 'moss', 'ochre', 'brick'];

/** Every pair in which text stands on a ground somewhere. */
const textPairs: [ColorToken, ColorToken][] = [
  ...grounds.flatMap((ground) => inks.map((ink): [ColorToken, ColorToken] => [ink, ground])),
  ...(['lake-soft', 'moss-soft', 'ochre-soft', 'brick-soft'] as const).flatMap(
    (ground): [ColorToken, ColorToken][] => [
      ['ink', ground],
      ['muted', ground],
      ['lake', ground],
    ],
  ),
  ['moss', 'moss-soft'],
  ['ochre', 'ochre-soft'],
  ['brick', 'brick-soft'],
  ['on-lake', 'lake'],
  ['on-lake', 'lake-deep'],
  ['on-brick', 'brick'],
  ['on-brick', 'brick-deep'],
];

test('the contrast computed is that of WCAG: black on white is 21', () => {
  expect(contrast('#000000', '#FFFFFF')).toBeCloseTo(21, 10);
  // #767676 on white is the familiar edge of AA: 4.54 (webaim.org/articles/contrast).
  expect(contrast('#767676', '#FFFFFF')).toBeCloseTo(4.54, 2);
});

describe.each(schemes)('%s', (scheme) => {
  test.each(textPairs)('text in %s on %s has at least 4.5:1', (ink, ground) => {
    const palette = palettes[scheme];
    expect(contrast(palette[ink], palette[ground])).toBeGreaterThanOrEqual(4.5);
  });

  test.each(['surface', 'ground', 'sunk'] as const)('a field’s edge has 3:1 on %s', (ground) => {
    const palette = palettes[scheme];
    expect(contrast(palette.edge, palette[ground])).toBeGreaterThanOrEqual(3);
  });

  test('is set on the document, where the tokens refer to it', () => {
    applyTheme(scheme);
    const { style } = document.documentElement;
    expect(color.lakeSoft).toBe('var(--lake-soft)');
    expect(style.getPropertyValue('--lake-soft')).toBe(palettes[scheme]['lake-soft']);
    expect(style.getPropertyValue('color-scheme')).toBe(scheme);
  });
});
