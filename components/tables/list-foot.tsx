import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/button';
import { ErrorState } from '@/components/ui/states';
import { Text } from '@/components/ui/text';
import { uiText } from '@/constants/texts/ui';
import { errorOf } from '@/hooks/error-of';

export type ListFootProps = {
  /** The query whose pages the list shows. */
  pages: {
    error: Error | null;
    hasNextPage: boolean;
    isFetchingNextPage: boolean;
    fetchNextPage: () => Promise<unknown>;
    refetch: () => Promise<unknown>;
  };
  more?: string;
  /** Said where everything is shown. */
  end?: string;
};

/** The end of a list that the server pages: what failed, the way to the next page, or the end. */
export function ListFoot({ pages, more = uiText.showMore, end }: ListFootProps) {
  const { error, hasNextPage, isFetchingNextPage, fetchNextPage, refetch } = pages;
  return (
    <>
      {error ? <ErrorState {...errorOf(error)} onRetry={() => void refetch()} /> : null}
      <View style={styles.foot}>
        {hasNextPage ? (
          <Button
            kind="secondary"
            label={more}
            busy={isFetchingNextPage}
            onPress={() => void fetchNextPage()}
          />
        ) : null}
        {!hasNextPage && end !== undefined ? (
          <Text size="small" tone="muted">
            {end}
          </Text>
        ) : null}
      </View>
    </>
  );
}

const styles = StyleSheet.create({ foot: { alignItems: 'center' } });
