import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { ActionBar } from '@/components/ui/action-bar';
import { Badge } from '@/components/ui/badge';
import { BackLink } from '@/components/ui/back-link';
import { Button } from '@/components/ui/button';
import { Link } from '@/components/ui/link';
import { LiveRegion } from '@/components/ui/live-region';
import { Notice } from '@/components/ui/notice';
import { Screen } from '@/components/ui/screen';
import { ErrorState, SkeletonRows } from '@/components/ui/states';
import { Text } from '@/components/ui/text';
import { useWide } from '@/components/ui/use-wide';
import { modelCautions } from '@/constants/texts/price';
import { runsText, runText, signOffText } from '@/constants/texts/runs';
import { space } from '@/constants/theme';
import type { Run } from '@/shared/contracts/runs';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { formatInstant } from '@/shared/format/dates';
import { errorOf } from '@/hooks/error-of';
import { isActive, useRun, type ExceptionFilter, type ValueFilter } from '@/hooks/use-runs';
import { ExceptionsSection } from './exceptions-section';
import { RunFacts, RunTotals } from './run-facts';
import { RunProgress } from './run-progress';
import { bookCodes, countsOf, headingOf, runsAgain, statusTone } from './run-words';
import { RerunDialog, SignOffDialog } from './run-dialogs';
import { signOffStanding } from './sign-off';
import { ValuesSection } from './values-section';

/** What of a run is in sight. */
export type RunView = {
  /** The exception that is open. */
  exceptionId: string | null;
  exceptions: ExceptionFilter;
  values: ValueFilter;
};

export type RunScreenProps = {
  desk: DeskAccess;
  userId: string;
  runId: string;
  view: RunView;
  onView: (view: RunView) => void;
  onRerun: (runId: string) => void;
};

export function RunScreen(props: RunScreenProps) {
  const { desk, runId } = props;
  const { data: run, error, refetch, dataUpdatedAt } = useRun(desk.id, runId);
  if (run) return <RunPage {...props} run={run} readAtMs={dataUpdatedAt} />;
  return (
    <Screen
      title={runsText.title}
      overline={<BackLink href={`/desks/${desk.id}/runs`} label={runsText.back} />}
    >
      {error ? (
        <ErrorState {...errorOf(error)} onRetry={() => void refetch()} />
      ) : (
        <SkeletonRows rows={6} height={60} />
      )}
    </Screen>
  );
}

type RunPageProps = RunScreenProps & { run: Run; readAtMs: number };

function RunPage(props: RunPageProps) {
  const { desk, userId, run, view, onView, readAtMs } = props;
  const wide = useWide();
  const [open, setOpen] = useState<'rerun' | 'sign-off' | null>(null);
  const close = () => setOpen(null);
  const { maySignOff, hindrances } = signOffStanding(run, desk, userId);
  const acts = <Acts desk={desk} run={run} maySignOff={maySignOff} start={setOpen} />;
  const heading = headingOf(run);
  return (
    <Screen
      title={heading}
      measure={1400}
      overline={<BackLink href={`/desks/${desk.id}/runs`} label={runsText.back} />}
      subtitle={<HeadLine run={run} desk={desk} />}
      actions={wide ? acts : undefined}
    >
      {isActive(run.status) ? null : <LiveRegion text={heading} />}
      <Standing run={run} desk={desk} hindrances={hindrances} />
      <RunProgress run={run} desk={desk} readAtMs={readAtMs} />
      <ExceptionsSection
        desk={desk}
        userId={userId}
        run={run}
        openId={view.exceptionId}
        filter={view.exceptions}
        onOpen={(exceptionId) => onView({ ...view, exceptionId })}
        onFilter={(exceptions) => onView({ ...view, exceptions })}
        onRerun={() => setOpen('rerun')}
      />
      <ValuesSection
        desk={desk}
        userId={userId}
        run={run}
        filter={view.values}
        onFilter={(values) => onView({ ...view, values })}
      />
      <View style={styles.pair}>
        <RunTotals run={run} desk={desk} />
        <RunFacts run={run} desk={desk} />
      </View>
      <Text size="small" tone="muted">
        {modelCautions.join(' ')}
      </Text>
      {wide ? null : acts}
      {open === 'rerun' ? (
        <RerunDialog desk={desk} run={run} onClose={close} onStarted={props.onRerun} />
      ) : null}
      {open === 'sign-off' ? (
        <SignOffDialog desk={desk} userId={userId} run={run} onClose={close} />
      ) : null}
    </Screen>
  );
}

/** Which run it is, what it stands on, and what it found, in two quiet lines. */
function HeadLine({ run, desk }: { run: Run; desk: DeskAccess }) {
  const { snapshot, policy, startedBy, startedAt, rerunOf } = run;
  return (
    <View style={styles.head}>
      <View style={styles.line}>
        <Text weight="semibold">{runsText.run(run.number)}</Text>
        <Badge label={runsText.statuses[run.status]} tone={statusTone[run.status]} />
        <Text tone="muted">{bookCodes(run)}</Text>
        <Link href={`/desks/${desk.id}/market-data/${snapshot.id}`}>
          {runText.closeOf(snapshot.date)}
        </Link>
        <Link href={`/desks/${desk.id}/policies`}>{runText.policy(policy.number)}</Link>
        {rerunOf ? (
          <Link href={`/desks/${desk.id}/runs/${rerunOf.id}`}>
            {runText.repeats(rerunOf.number)}
          </Link>
        ) : null}
        <Text tone="muted" tabular>
          {runText.startedBy(startedBy.name, formatInstant(startedAt, desk.timeZone))}
        </Text>
      </View>
      <View style={styles.counts}>
        {countsOf(run.counts).map((name) => (
          <Badge
            key={name}
            label={runsText.counted(name, run.counts[name])}
            tone={
              name === 'agree' ? 'moss' : name === 'wide' || name === 'oneRoute' ? 'ochre' : 'brick'
            }
          />
        ))}
      </View>
    </View>
  );
}

type ActsProps = {
  desk: DeskAccess;
  run: Run;
  maySignOff: boolean;
  start: (act: 'rerun' | 'sign-off') => void;
};

/** In the head of a wide window, at thumb height on a phone. */
function Acts({ desk, run, maySignOff, start }: ActsProps) {
  const wide = useWide();
  const mayRerun = desk.permissions.includes('start-runs') && runsAgain(run);
  if (!mayRerun && !maySignOff) return null;
  const buttons = (
    <>
      {mayRerun ? (
        <Button
          grow={!wide}
          kind="secondary"
          label={runText.rerun}
          onPress={() => start('rerun')}
        />
      ) : null}
      {maySignOff ? (
        <Button grow={!wide} label={signOffText.act} onPress={() => start('sign-off')} />
      ) : null}
    </>
  );
  return wide ? buttons : <ActionBar>{buttons}</ActionBar>;
}

type StandingProps = { run: Run; desk: DeskAccess; hindrances: readonly string[] };

/** How the run ended, or what stands between it and its sign-off. */
function Standing({ run, desk, hindrances }: StandingProps) {
  const { signOff, cancellation } = run;
  if (signOff)
    return (
      <Notice
        tone="moss"
        title={signOffText.decided(signOff.by.name, formatInstant(signOff.at, desk.timeZone))}
        body={signOff.comment}
      />
    );
  if (cancellation) {
    const at = formatInstant(cancellation.at, desk.timeZone);
    return (
      <Notice
        tone="ochre"
        title={runText.cancelledBy(cancellation.by.name, at)}
        body={run.done > 0 ? runText.cancelledBody : undefined}
      />
    );
  }
  if (hindrances.length === 0) return null;
  const [first, ...others] = hindrances;
  return <Notice tone="lake" title={first} body={others.join(' ') || undefined} />;
}

const styles = StyleSheet.create({
  head: { gap: space.sm },
  line: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    alignItems: 'baseline',
    columnGap: space.md,
    rowGap: space.xs,
  },
  counts: { flexDirection: 'row', flexWrap: 'wrap', gap: space.xs },
  pair: { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'flex-start', gap: space.lg },
});
