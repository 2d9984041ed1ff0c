import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/button';
import { Card } from '@/components/ui/card';
import { Text } from '@/components/ui/text';
import { runText } from '@/constants/texts/runs';
import { color, radius, space } from '@/constants/theme';
import type { Run } from '@/shared/contracts/runs';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { isActive, useTimeLeft } from '@/hooks/use-runs';
import { CancelDialog } from './run-dialogs';

type RunProgressProps = { run: Run; desk: DeskAccess; readAtMs: number };

/** How far a run is, how long the rest takes, and the way to stop it. */
export function RunProgress(props: RunProgressProps) {
  return isActive(props.run.status) ? <Working {...props} /> : null;
}

function Working({ run, desk, readAtMs }: RunProgressProps) {
  const [cancelling, setCancelling] = useState(false);
  const leftMs = useTimeLeft(run, readAtMs);
  const { done, total, status } = run;
  const words = runText.valued(done, total);
  return (
    <Card style={styles.card}>
      <View
        role="progressbar"
        aria-label={words}
        aria-valuemin={0}
        aria-valuemax={total}
        aria-valuenow={done}
        style={styles.track}
      >
        <View style={[styles.fill, { width: `${(100 * done) / total}%` }]} />
      </View>
      <View style={styles.line}>
        <View style={styles.words}>
          <Text weight="medium" tabular>
            {status === 'queued' ? runText.waits : words}
            {leftMs === null ? '' : ` · ${runText.timeLeft(timeWords(leftMs))}`}
          </Text>
          <Text size="small" tone="muted">
            {runText.background}
          </Text>
        </View>
        {desk.permissions.includes('start-runs') ? (
          <Button kind="secondary" label={runText.cancel} onPress={() => setCancelling(true)} />
        ) : null}
      </View>
      {cancelling ? (
        <CancelDialog desk={desk} run={run} onClose={() => setCancelling(false)} />
      ) : null}
    </Card>
  );
}

function timeWords(ms: number): string {
  const seconds = Math.max(1, Math.ceil(ms / 1000));
  return seconds < 100 ? runText.seconds(seconds) : runText.minutes(Math.ceil(seconds / 60));
}

const styles = StyleSheet.create({
  card: { gap: space.md },
  track: { height: 6, borderRadius: radius.pill, backgroundColor: color.sunk, overflow: 'hidden' },
  fill: { height: '100%', backgroundColor: color.lake },
  line: { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'center', gap: space.md },
  words: { flexGrow: 1, flexShrink: 1, flexBasis: 220, minWidth: 0 },
});
