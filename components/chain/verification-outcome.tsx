import { View } from 'react-native';
import { Notice } from '@/components/ui/notice';
import { ProgressBar } from '@/components/ui/progress-bar';
import { Text } from '@/components/ui/text';
import { breakSentences, chainText } from '@/constants/texts/history';
import type { Verification } from '@/shared/contracts/chain';
import { formatInstant } from '@/shared/format/dates';

type OutcomeProps = { verification: Verification; timeZone: string };

/** How far a verification is, or what it found: the first thing wrong, with its place. */
export function VerificationOutcome({ verification, timeZone }: OutcomeProps) {
  const { status, checked, total, firstBreak, startedBy, finishedAt } = verification;
  if (status !== 'finished')
    return (
      <View role="status">
        <ProgressBar done={checked} total={total} />
        <Text tabular>
          {status === 'queued' ? chainText.queued : chainText.progress(checked, total)}
        </Text>
      </View>
    );
  const when =
    finishedAt === null
      ? ''
      : chainText.lastVerified(formatInstant(finishedAt, timeZone), startedBy.name);
  if (firstBreak)
    return (
      <Notice
        tone="brick"
        title={chainText.broken(firstBreak.position)}
        body={
          <>
            <Text>{breakSentences[firstBreak.kind]}</Text>
            <Text>{chainText.brokenBody(checked)}</Text>
            <Text size="small" tone="muted">
              {when}
            </Text>
          </>
        }
      />
    );
  return <Whole verification={verification} when={when} />;
}

function Whole({ verification, when }: { verification: Verification; when: string }) {
  const { total, anchors, held } = verification;
  return (
    <Notice
      tone="moss"
      title={chainText.whole(total)}
      body={
        <>
          <Text>{chainText.wholeBody(anchors)}</Text>
          {held ? <Text>{chainText.heldFits(held.position)}</Text> : null}
          <Text size="small" tone="muted">
            {when}
          </Text>
        </>
      }
    />
  );
}
