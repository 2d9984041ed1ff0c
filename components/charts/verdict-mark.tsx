import { StyleSheet, View } from 'react-native';
import type { Verdict } from '@/pricing/contract';
import { color, space } from '@/constants/theme';
import { agreementText } from '@/constants/texts/agreement';
import { Text, type Tone } from '@/components/ui/text';

export const verdictTone: Record<Verdict, Tone> = {
  agree: 'moss',
  wide: 'ochre',
  disagree: 'brick',
  'one-route': 'muted',
};

/** Level, bowed, crossing or single lines: each verdict has its own shape beside its colour. */
const lines: Record<Verdict, string[]> = {
  agree: ['M5.6 6.2h6.8', 'M5.6 9h6.8', 'M5.6 11.8h6.8'],
  wide: ['M5.2 7.6C7.6 5 10.4 5 12.8 7.6', 'M5.2 10.400C7.6 13 10.4 13 12.8 10.4'],
  disagree: ['M5.4 12.2 12.6 5.8', 'M5.4 5.8 12.6 12.2'],
  'one-route': ['M5.6 9h6.8'],
};

export function VerdictShape({ verdict, size = 18 }: { verdict: Verdict; size?: number }) {
  const ink = color[verdictTone[verdict]];
  return (
    <svg width={size} height={size} viewBox="0 0 18 18" fill="none" aria-hidden>
      <circle
        cx={9}
        cy={9}
        r={7.9}
        stroke={ink}
        strokeWidth={1.5}
        strokeDasharray={verdict === 'one-route' ? '3 2.2' : undefined}
      />
      {lines[verdict].map((d) => (
        <path key={d} d={d} stroke={ink} strokeWidth={1.5} strokeLinecap="round" />
      ))}
    </svg>
  );
}

/** The verdict as shape, word and colour together. `long` spells it as a sentence's beginning. */
export function VerdictMark({ verdict, long = false }: { verdict: Verdict; long?: boolean }) {
  return (
    <View style={styles.row}>
      <VerdictShape verdict={verdict} size={long ? 18 : 16} />
      <Text size={long ? 'body' : 'small'} weight="semibold" tone={verdictTone[verdict]}>
        {long ? agreementText.verdictTitle[verdict] : agreementText.verdictWord[verdict]}
      </Text>
    </View>
  );
}

const styles = StyleSheet.create({
  row: { flexDirection: 'row', alignItems: 'center', gap: space.xs + 2 },
});
