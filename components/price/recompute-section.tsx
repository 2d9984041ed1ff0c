import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/button';
import { Section } from '@/components/ui/card';
import { DataTable, type Column } from '@/components/ui/data-table';
import { Notice } from '@/components/ui/notice';
import { Text } from '@/components/ui/text';
import { priceText, routeLabel } from '@/constants/texts/price';
import { recomputeText } from '@/constants/texts/recompute';
import { formatDifference, formatQuantity } from '@/shared/format/numbers';
import { useRecompute, type RecomputedRoute, type StoredPrice } from '@/hooks/use-recompute';

/** Anyone who reads a stored price can make its numbers again, and see whether they are the same. */
export function RecomputeSection({ price }: { price: StoredPrice }) {
  const { mutate, isPending, error, data } = useRecompute(price);
  return (
    <Section title={recomputeText.title}>
      <Text tone="muted">{recomputeText.body}</Text>
      {data ? <Outcome routes={data} /> : null}
      {error ? <Notice tone="brick" title={error.message} /> : null}
      <Button
        kind="secondary"
        label={isPending ? recomputeText.busy : recomputeText.act}
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
        title={same ? recomputeText.allSame(routes.length) : recomputeText.someDiffer}
      />
      <DataTable
        plain
        caption={recomputeText.title}
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
  return isSame(route)
    ? recomputeText.same
    : formatDifference(route.recomputed - route.recorded, 6);
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
    header: recomputeText.recomputed,
    align: 'end',
    cell: recomputedText,
  },
  {
    id: 'difference',
    header: recomputeText.difference,
    align: 'end',
    cell: differenceText,
  },
];

const styles = StyleSheet.create({
  line: { flexDirection: 'row', flexWrap: 'wrap', justifyContent: 'space-between' },
  digits: { flexBasis: '100%' },
});
