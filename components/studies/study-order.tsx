import { View } from 'react-native';
import { Text } from '@/components/ui/text';
import { routeLabel } from '@/constants/texts/price';
import { studiesText } from '@/constants/texts/studies';
import type { StudySummary } from '@/shared/contracts/studies';

const tones = {
  'as-expected': 'ink',
  higher: 'ochre',
  'not-determined': 'muted',
  lower: 'brick',
} as const;

/** What a study found, a method a line; of one that is still computing, how far it is. */
export function StudyOrders({ study }: { study: StudySummary }) {
  if (study.orders.length === 0)
    return (
      <Text size="small" tone="muted" tabular>
        {studiesText.progress(study.done, study.total)}
      </Text>
    );
  return (
    <View>
      {study.orders.flatMap(({ name, fits }) =>
        fits.map(({ series, order, standardError, verdict }) => (
          <Text key={`${name} ${series}`} size="small" tone={tones[verdict]} tabular>
            {studiesText.found(routeLabel(name), series, order, standardError, verdict)}
          </Text>
        )),
      )}
    </View>
  );
}
