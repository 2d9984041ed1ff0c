import type { ReactNode } from 'react';
import { StyleSheet, Text as NativeText, type TextProps as NativeTextProps } from 'react-native';
import { color, font, fontSize, lineHeight, type FontSize } from '@/constants/theme';

export const tones = ['ink', 'muted', 'lake', 'moss', 'ochre', 'brick'] as const;
export type Tone = (typeof tones)[number];

export type TextProps = Omit<NativeTextProps, 'role'> & {
  size?: FontSize;
  tone?: Tone;
  weight?: 'regular' | 'medium' | 'semibold';
  /** Figures of one width, so that numbers below each other align. */
  tabular?: boolean;
  /** For identifiers and hashes. */
  mono?: boolean;
  role?: NativeTextProps['role'];
  children?: ReactNode;
};

const weights = { regular: '400', medium: '500', semibold: '600' } as const;

export function Text({
  size = 'body',
  tone = 'ink',
  weight = 'regular',
  tabular = false,
  mono = false,
  style,
  ...rest
}: TextProps) {
  return (
    <NativeText
      style={[
        styles.base,
        {
          color: color[tone],
          fontFamily: mono ? font.mono : font.text,
          fontSize: fontSize[size],
          lineHeight: lineHeight[size],
          fontWeight: weights[weight],
        },
        tabular && styles.tabular,
        style,
      ]}
      {...rest}
    />
  );
}

export type HeadingProps = TextProps & { level: 1 | 2 | 3 };

const headingSizes: Record<HeadingProps['level'], FontSize> = { 1: 'title', 2: 'lead', 3: 'body' };

/** A real heading element: react-native-web chooses the tag by role and level. */
export function Heading({ level, size = headingSizes[level], ...rest }: HeadingProps) {
  const levelProps = { 'aria-level': level };
  return <Text role="heading" size={size} weight="semibold" {...levelProps} {...rest} />;
}

const styles = StyleSheet.create({
  base: { overflowWrap: 'break-word' } as object,
  tabular: { fontVariant: ['tabular-nums'] },
});
