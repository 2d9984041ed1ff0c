import { StyleSheet, View } from 'react-native';
import { Section } from '@/components/ui/card';
import { Dialog } from '@/components/ui/dialog';
import { Text } from '@/components/ui/text';
import { findingOf } from '@/components/charts/agreement-finding';
import { exerciseCautions, modelCautions, priceText } from '@/constants/texts/price';
import { space } from '@/constants/theme';
import { agreementOf, type Evidence } from './evidence';
import { RouteWarnings } from './routes-section';

/** What every model value rests on, said where the number stands. */
export function CautionsSection({ evidence }: { evidence: Evidence }) {
  return (
    <Section title={priceText.assumes}>
      <ModelCautions evidence={evidence} />
    </Section>
  );
}

function ModelCautions({ evidence }: { evidence: Evidence }) {
  const sentences = [...modelCautions, exerciseCautions[evidence.exercise]];
  return (
    <View role="list" style={styles.list}>
      {sentences.map((sentence) => (
        <View role="listitem" key={sentence}>
          <Text tone="muted">{sentence}</Text>
        </View>
      ))}
    </View>
  );
}

/** The caution mark of a price opens this: first what speaks against this number, then the model. */
export function CautionsDialog({ evidence, onClose }: { evidence: Evidence; onClose: () => void }) {
  const { verdict } = evidence;
  return (
    <Dialog open title={priceText.assumes} onClose={onClose}>
      {verdict !== null ? <Text>{findingOf(agreementOf(evidence, verdict))}</Text> : null}
      <RouteWarnings evidence={evidence} />
      <ModelCautions evidence={evidence} />
    </Dialog>
  );
}

const styles = StyleSheet.create({ list: { gap: space.xs } });
