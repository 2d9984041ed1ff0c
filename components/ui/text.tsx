import { Children, type ReactNode } from 'react';
import { StyleSheet, Text as NativeText, type TextProps as NativeTextProps } from 'react-native';
import { color, font, fontSize, lineHeight, type FontSize } from '@/constants/theme';

export const tones = ['ink', 'muted', 'lake', 'moss', 'ochre', 'brick'] as const;
export type Tone = (typeof tones)[number];

/** A day, with its time of day: lines break at its hyphens and its space no more. */
const dayPattern = /(\d{4}-\d{2}-\d{2}(?: \d{2}:\d{2})?)/;

function wholeDays(children: ReactNode): ReactNode {
  if (Array.isArray(children)) return Children.map(children, wholeDays);
  if (typeof children !== 'string' || !dayPattern.test(children)) return children;
  return children.split(dayPattern).map((part, index) =>
    index % 2 === 1 ? (
      <span key={index} className="unbroken">
        {part}
      </span>
    ) : (
      part
    ),
  );
}

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
  children,
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
    >
      {wholeDays(children)}
    </NativeText>
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
