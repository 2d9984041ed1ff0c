import type { ReactNode } from 'react';
import { StyleSheet, View, type DimensionValue } from 'react-native';
import { uiText } from '@/constants/texts/ui';
import { space } from '@/constants/theme';
import { Button } from './button';
import { LevelLines } from './level-lines';
import { Notice } from './notice';
import { Heading, Text } from './text';

export type EmptyStateProps = { title?: string; body?: string; action?: ReactNode };

/** Nothing here yet, and the one act that fills it. */
export function EmptyState({ title, body, action }: EmptyStateProps) {
  return (
    <View style={styles.empty}>
      <LevelLines />
      {title ? <Heading level={2}>{title}</Heading> : null}
      {body ? (
        <Text tone="muted" style={styles.centred}>
          {body}
        </Text>
      ) : null}
      {action ? <View style={styles.action}>{action}</View> : null}
    </View>
  );
}

export type ErrorStateProps = { message: string; requestId?: string | null; onRetry?: () => void };

/** A list or a page that could not be read. */
export function ErrorState({ message, requestId, onRetry }: ErrorStateProps) {
  return (
    <Notice
      tone="brick"
      title={message}
      body={
        requestId ? (
          <Text size="small" tone="muted" mono>
            {uiText.requestId(requestId)}
          </Text>
        ) : undefined
      }
      action={
        onRetry ? <Button kind="secondary" label={uiText.tryAgain} onPress={onRetry} /> : undefined
      }
    />
  );
}

export function Skeleton({
  width = '100%',
  height = 18,
}: {
  width?: DimensionValue;
  height?: number;
}) {
  return <div className="skeleton" style={{ width: String(width), height }} />;
}

/** Rows that breathe while a list is read; announced once. */
export function SkeletonRows({ rows = 6, height = 44 }: { rows?: number; height?: number }) {
  return (
    <View role="status" aria-label={uiText.loading} style={styles.rows}>
      {Array.from({ length: rows }, (_, index) => (
        <Skeleton key={index} height={height} />
      ))}
    </View>
  );
}

const styles = StyleSheet.create({
  empty: {
    alignItems: 'center',
    gap: space.sm,
    paddingVertical: space.xxl,
    paddingHorizontal: space.lg,
  },
  centred: { textAlign: 'center', maxWidth: 420 },
  action: { marginTop: space.sm },
  rows: { gap: space.sm },
});
