import type { ReactNode } from 'react';
import { Text } from 'react-native-svg';
import { color, font, fontSize } from '@/constants/theme';

export type ChartLabelProps = {
  x: number;
  y: number;
  anchor: 'start' | 'middle' | 'end';
  children: ReactNode;
};

/** A word or a number on an axis. */
export function ChartLabel({ x, y, anchor, children }: ChartLabelProps) {
  return (
    <Text
      x={x}
      y={y}
      textAnchor={anchor}
      fill={color.muted}
      fontFamily={font.text}
      fontSize={fontSize.small}
    >
      {children}
    </Text>
  );
}
