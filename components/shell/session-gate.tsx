import { useCallback, useEffect, useState, type ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { Mark } from '@/components/ui/icon';
import { ErrorState } from '@/components/ui/states';
import { shellText } from '@/constants/texts/shell';
import { space } from '@/constants/theme';
import { restoreSession } from '@/hooks/api';
import { useSession } from '@/hooks/use-session';
import { ApiError } from '@/shared/api-client';

/** Waits until it is known who is signed in; a server that does not answer can be asked again. */
export function SessionGate({ children }: { children: ReactNode }) {
  const { status } = useSession();
  const [failure, setFailure] = useState<ApiError | null>(null);
  const restore = useCallback(() => {
    restoreSession().catch((error: unknown) => {
      if (!(error instanceof ApiError)) throw error;
      setFailure(error);
    });
  }, []);
  useEffect(restore, [restore]);
  const retry = () => {
    setFailure(null);
    restore();
  };
  if (status !== 'unknown') return children;
  return (
    <View role="main" aria-busy={failure === null} style={styles.page}>
      <View role="img" aria-label={shellText.opening}>
        <Mark size={56} />
      </View>
      {failure ? (
        <ErrorState message={failure.message} requestId={failure.requestId} onRetry={retry} />
      ) : null}
    </View>
  );
}

const styles = StyleSheet.create({
  page: {
    flexGrow: 1,
    alignItems: 'center',
    justifyContent: 'center',
    gap: space.xl,
    padding: space.lg,
  },
});
