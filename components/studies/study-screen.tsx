import { StyleSheet, View } from 'react-native';
import { BackLink } from '@/components/ui/back-link';
import { Button } from '@/components/ui/button';
import { Card } from '@/components/ui/card';
import { Link } from '@/components/ui/link';
import { LiveRegion } from '@/components/ui/live-region';
import { Notice } from '@/components/ui/notice';
import { Screen } from '@/components/ui/screen';
import { ErrorState, SkeletonRows } from '@/components/ui/states';
import { Text } from '@/components/ui/text';
import { routeInSentence } from '@/constants/texts/price';
import { studiesText } from '@/constants/texts/studies';
import { color, radius, space } from '@/constants/theme';
import type { DeskAccess } from '@/shared/contracts/sessions';
import type { Study } from '@/shared/contracts/studies';
import { optionTerms } from '@/shared/format/terms';
import { errorOf } from '@/hooks/error-of';
import { isComputing, useStudy, useStudyAct, useStudyFile } from '@/hooks/use-studies';
import { StudyDecision } from './study-decision';
import { referenceErrorText, referenceText } from './study-figures';
import { StudyRouteSection } from './study-route-section';

export type StudyScreenProps = { desk: DeskAccess; studyId: string; userId: string };

export function StudyScreen({ desk, studyId, userId }: StudyScreenProps) {
  const { data: study, error, refetch } = useStudy(desk.id, studyId);
  if (study) return <StudyPage desk={desk} study={study} userId={userId} />;
  return (
    <Screen
      title={studiesText.title}
      overline={<BackLink href={`/desks/${desk.id}/studies`} label={studiesText.back} />}
    >
      {error ? (
        <ErrorState {...errorOf(error)} onRetry={() => void refetch()} />
      ) : (
        <SkeletonRows rows={6} height={60} />
      )}
    </Screen>
  );
}

function StudyPage({ desk, study, userId }: { desk: DeskAccess; study: Study; userId: string }) {
  const { underlying, quote, trade, routes } = study;
  const terms = `${underlying.name} ${optionTerms(study, underlying.priceDecimals)}`;
  const shares = routes.some(({ name }) => name === study.reference.method.name);
  return (
    <Screen
      title={studiesText.question(routes.map(({ name }) => routeInSentence(name)))}
      measure={1240}
      overline={<BackLink href={`/desks/${desk.id}/studies`} label={studiesText.back} />}
      subtitle={`${study.number} · ${studiesText.of(study.source, quote?.number ?? trade?.number ?? null)} · ${terms}`}
      actions={<Acts desk={desk} study={study} />}
    >
      {quote ? (
        <Link href={`/desks/${desk.id}/quotes/${quote.id}`}>{studiesText.quote(quote.number)}</Link>
      ) : null}
      {trade ? (
        <Link href={`/desks/${desk.id}/trades/${trade.id}`}>{studiesText.trade(trade.number)}</Link>
      ) : null}
      <Card style={styles.head}>
        <Text weight="semibold" style={styles.state}>
          {studiesText.statuses[study.status]}
        </Text>
        <Text tone="muted" tabular>
          {studiesText.against(referenceText(study), referenceErrorText(study))}
        </Text>
        {shares ? (
          <Text size="small" tone="muted">
            {studiesText.sameMachinery}
          </Text>
        ) : null}
      </Card>
      <Progress desk={desk} study={study} />
      {routes
        .filter(({ rows }) => rows.length > 0)
        .map((route) => (
          <StudyRouteSection key={route.name} study={study} route={route} />
        ))}
      <StudyDecision desk={desk} study={study} userId={userId} />
      <Text size="small" tone="muted">
        {studiesText.caution}
      </Text>
    </Screen>
  );
}

function Acts({ desk, study }: { desk: DeskAccess; study: Study }) {
  const file = useStudyFile(desk.id, study.id);
  if (study.done === 0) return null;
  return (
    <Button
      kind="secondary"
      label={studiesText.download}
      busy={file.isPending}
      onPress={() => file.mutate()}
    />
  );
}

/** How far the rows are, and the way to stop them. */
function Progress({ desk, study }: { desk: DeskAccess; study: Study }) {
  const act = useStudyAct(desk.id, study.id);
  const { status, done, total } = study;
  if (!isComputing(status)) return <LiveRegion text={studiesText.statuses[status]} />;
  return (
    <Card style={styles.progress}>
      <View
        role="progressbar"
        aria-label={studiesText.progress(done, total)}
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
            {studiesText.progress(done, total)}
          </Text>
          <Text size="small" tone="muted">
            {studiesText.progressNote}
          </Text>
        </View>
        {desk.permissions.includes('run-studies') ? (
          <Button
            kind="secondary"
            label={studiesText.stop}
            busy={act.isPending}
            onPress={() => act.mutate({ kind: 'cancel' })}
          />
        ) : null}
      </View>
      {act.isError ? <Notice tone="brick" title={errorOf(act.error).message} /> : null}
    </Card>
  );
}

const styles = StyleSheet.create({
  head: { flexDirection: 'row', flexWrap: 'wrap', columnGap: space.lg, rowGap: space.xs },
  state: { marginRight: 'auto' },
  progress: { gap: space.md },
  track: { height: 6, borderRadius: radius.pill, backgroundColor: color.sunk, overflow: 'hidden' },
  fill: { height: '100%', backgroundColor: color.lake },
  line: { flexDirection: 'row', alignItems: 'center', gap: space.md },
  words: { flex: 1, minWidth: 0 },
});
