import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/button';
import { Section } from '@/components/ui/card';
import { FactList } from '@/components/ui/fact-list';
import { Screen } from '@/components/ui/screen';
import { ErrorState, SkeletonRows } from '@/components/ui/states';
import { Text } from '@/components/ui/text';
import { chainText } from '@/constants/texts/history';
import { space } from '@/constants/theme';
import type { Chain, HeldPlace } from '@/shared/contracts/chain';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { formatInstant } from '@/shared/format/dates';
import { errorOf } from '@/hooks/error-of';
import { saveText } from '@/hooks/save-file';
import { useChains, useVerify } from '@/hooks/use-chains';
import { AnchorsTable } from './anchors-table';
import { ExportsSection } from './exports-section';
import { HeldManifest } from './held-manifest';
import { VerificationOutcome } from './verification-outcome';

/** The chains of a desk: how long they are, whether they are whole, and what proves it. */
export function ChainScreen({ desk }: { desk: DeskAccess }) {
  const { data, error, refetch } = useChains(desk.id);
  return (
    <Screen title={chainText.title} subtitle={chainText.subtitle} measure={1240}>
      {error ? <ErrorState {...errorOf(error)} onRetry={() => void refetch()} /> : null}
      {data ? (
        <>
          <View style={styles.pair}>
            {data.chains.map((chain) => (
              <View key={chain.kind} style={styles.half}>
                <ChainSection chain={chain} desk={desk} />
              </View>
            ))}
          </View>
          <ExportsSection desk={desk} />
          <PublicKey {...data.publicKey} />
        </>
      ) : error ? null : (
        <SkeletonRows rows={4} height={96} />
      )}
    </Screen>
  );
}

function ChainSection({ chain, desk }: { chain: Chain; desk: DeskAccess }) {
  const verify = useVerify(desk.id);
  const [held, setHeld] = useState<HeldPlace | null>(null);
  const [newest] = chain.verifications;
  const busy = verify.isPending || (newest !== undefined && newest.status !== 'finished');
  return (
    <Section
      title={chainText.kinds[chain.kind]}
      action={
        <Text tone="muted" tabular>
          {chainText.entries(chain.position)}
        </Text>
      }
    >
      {chain.at === null ? (
        <Text tone="muted">{chainText.empty}</Text>
      ) : (
        <FactList
          facts={[
            { name: chainText.newest, value: formatInstant(chain.at, desk.timeZone) },
            { name: chainText.head, value: chain.hash, mono: true },
          ]}
        />
      )}
      {newest ? <VerificationOutcome verification={newest} timeZone={desk.timeZone} /> : null}
      {chain.kind === 'valuations' ? <HeldManifest held={held} onHeld={setHeld} /> : null}
      <View style={styles.start}>
        <Button
          label={busy ? chainText.verifying : chainText.verify}
          busy={busy}
          onPress={() => verify.mutate({ chain: chain.kind, held })}
        />
      </View>
      {verify.error ? <ErrorState {...errorOf(verify.error)} /> : null}
      <AnchorsTable anchors={chain.anchors} timeZone={desk.timeZone} />
    </Section>
  );
}

function PublicKey({ keyId, pem }: { keyId: string; pem: string }) {
  return (
    <Section title={chainText.keyTitle}>
      <Text tone="muted">{chainText.keyBody}</Text>
      <FactList facts={[{ name: chainText.keyId, value: keyId, mono: true }]} />
      <View style={styles.start}>
        <Button
          kind="secondary"
          label={chainText.saveKey}
          onPress={() => saveText(`driftless-${keyId}.pem`, pem, 'application/x-pem-file')}
        />
      </View>
    </Section>
  );
}

const styles = StyleSheet.create({
  pair: { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'flex-start', gap: space.lg },
  half: { flexGrow: 1, flexShrink: 1, flexBasis: 380, minWidth: 0 },
  start: { alignItems: 'flex-start' },
});
