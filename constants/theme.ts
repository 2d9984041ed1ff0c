/**
 * The one token file: colours of both schemes, spacing, type, radii. Components write
 * `color.ink`, which is a reference to a CSS custom property, so that a change of scheme repaints
 * the page without rendering anything again. The properties are set through the CSSOM, which the
 * strict content security policy allows where an inline style would be refused.
 */

export const schemes = ['light', 'dark'] as const;
export type Scheme = (typeof schemes)[number];

const light = {
  ground: '#F4F7F6',
  surface: '#FFFFFF',
  sunk: '#E9EFED',
  line: '#CBD6D3',
  /** Border of a field: 3:1 against its surroundings, so that its place can be seen. */
  edge: '#7C8986',
  ink: '#1B2430',
  muted: '#59626E',
  lake: '#0F5C73',
  'lake-deep': '#0B4859',
  'lake-soft': '#DCEBEF',
  'on-lake': '#FFFFFF',
  moss: '#2E6B45',
  'moss-soft': '#E2EFE6',
  ochre: '#855600',
  'ochre-soft': '#F6ECD8',
  brick: '#A8321F',
  'brick-deep': '#8A2718',
  'brick-soft': '#F8E5E1',
  'on-brick': '#FFFFFF',
  /** Level lines behind empty states and the sign-in page. */
  contour: '#A9C6CD',
  veil: 'rgba(27, 36, 48, 0.45)',
  shadow: 'rgba(27, 36, 48, 0.10)',
};

export type ColorToken = keyof typeof light;

const dark: Record<ColorToken, string> = {
  ground: '#11181B',
  surface: '#1B2328',
  sunk: '#151C20',
  line: '#344047',
  edge: '#6E7C84',
  ink: '#EDF1F0',
  muted: '#A3AEB6',
  lake: '#7CC4DB',
  'lake-deep': '#A3D7E7',
  'lake-soft': '#1D3943',
  'on-lake': '#0C1A20',
  moss: '#86CB9C',
  'moss-soft': '#1C3326',
  ochre: '#E2B25C',
  'ochre-soft': '#362B16',
  brick: '#F2978A',
  'brick-deep': '#F6B3A9',
  'brick-soft': '#3D221E',
  'on-brick': '#2A0D08',
  contour: '#2C4650',
  veil: 'rgba(4, 8, 10, 0.65)',
  shadow: 'rgba(0, 0, 0, 0.35)',
};

export const palettes: Record<Scheme, Record<ColorToken, string>> = { light, dark };

/** Value maps and scenario grids only; the same in both schemes. */
export const heatRamp = ['#173F5F', '#2F7F86', '#9CC5A1', '#F2E3B3', '#E39A4F', '#B23A2A'] as const;

const camel = (token: string) =>
  token.replace(/-(\w)/g, (_, letter: string) => letter.toUpperCase());

type Camel<T extends string> = T extends `${infer A}-${infer B}` ? `${A}${Capitalize<B>}` : T;

const tokens = Object.keys(light) as ColorToken[];

/** `color.lakeSoft` is `var(--lake-soft)`: for styles and for svg alike. */
export const color = Object.fromEntries(
  tokens.map((token) => [camel(token), `var(--${token})`]),
) as { [Token in ColorToken as Camel<Token>]: string };

export const space = { xs: 4, sm: 8, md: 12, lg: 16, xl: 24, xxl: 32 } as const;

export const fontSize = { small: 13, body: 15, lead: 17, title: 22, figure: 30 } as const;
export type FontSize = keyof typeof fontSize;

export const lineHeight = { small: 18, body: 22, lead: 24, title: 28, figure: 36 } as const;

export const radius = { small: 6, medium: 10, large: 14, pill: 999 } as const;

export const font = {
  text: "'Public Sans', system-ui, sans-serif",
  mono: "'IBM Plex Mono', ui-monospace, monospace",
} as const;

export const breakpoint = { wide: 1024 } as const;

export const touchTarget = 44;

/** Sets every colour of a scheme on the document, and tells the browser's own controls. */
export function applyTheme(scheme: Scheme): void {
  const { style } = document.documentElement;
  for (const token of tokens) style.setProperty(`--${token}`, palettes[scheme][token]);
  style.setProperty('color-scheme', scheme);
}
