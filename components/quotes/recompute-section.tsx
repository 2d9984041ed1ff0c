import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/button';
import { Section } from '@/components/ui/card';
import { DataTable, type Column } from '@/components/ui/data-table';
import { Notice } from '@/components/ui/notice';
import { Text } from '@/components/ui/text';
import { priceText, routeLabel } from '@/constants/texts/price';
import { quotesText } from '@/constants/texts/quotes';
import type { Quote } from '@/shared/contracts/quotes';
import { formatDifference, formatQuantity } from '@/shared/format/numbers';
import { useRecompute, type RecomputedRoute } from '@/hooks/use-recompute';

/** Anyone who reads a quote can make its numbers again, and see whether they are the same. */
export function RecomputeSection({ quote }: { quote: Quote }) {
  const { mutate, isPending, error, data } = useRecompute(quote);
  return (
    <Section title={quotesText.recomputeTitle}>
      <Text tone="muted">{quotesText.recomputeBody}</Text>
      {data ? <Outcome routes={data} /> : null}
      {error ? <Notice tone="brick" title={error.message} /> : null}
      <Button
        kind="secondary"
        label={isPending ? quotesText.recomputing : quotesText.recompute}
        busy={isPending}
        onPress={() => mutate()}
      />
    </Section>
  );
}

const isSame = ({ recorded, recomputed }: RecomputedRoute) => Object.is(recorded, recomputed);

function Outcome({ routes }: { routes: readonly RecomputedRoute[] }) {
  const same = routes.every(isSame);
  return (
    <>
      <Notice
        tone={same ? 'moss' : 'brick'}
        title={same ? quotesText.allSame(routes.length) : quotesText.someDiffer}
      />
      <DataTable
        plain
        caption={quotesText.recomputeTitle}
        columns={columns}
        rows={routes}
        rowId={({ name }) => name}
        card={(route) => <OutcomeLine route={route} />}
      />
    </>
  );
}

/** All the digits that tell two doubles apart. */
const fullDigits = (value: number) => formatQuantity(value, 0, 20);

const recomputedText = ({ recomputed }: RecomputedRoute) =>
  recomputed === null ? priceText.failed : fullDigits(recomputed);

function differenceText(route: RecomputedRoute): string {
  if (route.recomputed === null) return '';
  return isSame(route) ? quotesText.same : formatDifference(route.recomputed - route.recorded, 6);
}

/** A route on a phone, where all its digits do not fit into a row. */
function OutcomeLine({ route }: { route: RecomputedRoute }) {
  return (
    <View style={styles.line}>
      <Text>{routeLabel(route.name)}</Text>
      <Text tone="muted">{differenceText(route)}</Text>
      <Text tabular style={styles.digits}>
        {recomputedText(route)}
      </Text>
    </View>
  );
}

const columns: Column<RecomputedRoute>[] = [
  { id: 'route', header: priceText.route, cell: ({ name }) => routeLabel(name) },
  {
    id: 'recomputed',
    header: quotesText.recomputed,
    align: 'end',
    cell: recomputedText,
  },
  {
    id: 'difference',
    header: quotesText.difference,
    align: 'end',
    cell: differenceText,
  },
];

const styles = StyleSheet.create({
  line: { flexDirection: 'row', flexWrap: 'wrap', justifyContent: 'space-between' },
  digits: { flexBasis: '100%' },
});
