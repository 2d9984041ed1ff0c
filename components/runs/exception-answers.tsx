import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { Link } from '@/components/ui/link';
import { Text } from '@/components/ui/text';
import { LinkButton } from '@/components/ui/text-field';
import { exceptionText } from '@/constants/texts/runs';
import { color, radius, space } from '@/constants/theme';
import type { ExceptionAnswer } from '@/shared/contracts/runs';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { formatInstant } from '@/shared/format/dates';
import { formatQuantity } from '@/shared/format/numbers';
import type { ExceptionCardProps } from './exception-card';
import { OverrideDialog } from './override-dialog';
import { isOpenForAnswers, valueText } from './run-words';
import { StudyAnswerDialog } from './study-answer-dialog';

type AnswersProps = Pick<ExceptionCardProps, 'desk' | 'userId' | 'run' | 'valuation' | 'onRerun'>;

/** The answer that was given, or the three ways to give one. */
export function ExceptionAnswers(props: AnswersProps) {
  const { desk, run, valuation } = props;
  const { answer } = valuation.exception;
  if (answer)
    return (
      <View style={styles.answer}>
        <Given answer={answer} desk={desk} model={valueText(valuation)} />
      </View>
    );
  return isOpenForAnswers(run) ? <Ways {...props} /> : null;
}

function Given({
  answer,
  desk,
  model,
}: {
  answer: ExceptionAnswer;
  desk: DeskAccess;
  model: string | null;
}) {
  const record =
    answer.kind === 'study'
      ? { href: `/desks/${desk.id}/studies/${answer.study.id}`, number: answer.study.number }
      : answer.kind === 'rerun'
        ? { href: `/desks/${desk.id}/runs/${answer.run.id}`, number: answer.run.number }
        : null;
  return (
    <>
      <Text weight="semibold">
        {exceptionText.answers[answer.kind]}
        {record ? (
          <>
            {' '}
            <Link href={record.href}>{record.number}</Link>
          </>
        ) : null}
      </Text>
      {answer.kind === 'override' ? (
        <Text tabular>
          {answer.value === null
            ? exceptionText.kept
            : exceptionText.overridden(
                formatQuantity(answer.value),
                model ?? exceptionText.noValue,
              )}
        </Text>
      ) : null}
      {answer.kind === 'rerun' ? null : <Text>{answer.reason}</Text>}
      <Text size="small" tone="muted" tabular>
        {exceptionText.by(answer.by.name, formatInstant(answer.at, desk.timeZone))}
      </Text>
    </>
  );
}

/** Why this person may write no note; null where they may. */
function noteRefusal({ run, userId, valuation }: AnswersProps): string | null {
  if (run.startedBy.id === userId) return exceptionText.ownRun;
  return valuation.exception.makerIds.includes(userId) ? exceptionText.ownTrade : null;
}

function Ways(props: AnswersProps) {
  const { desk, userId, run, valuation, onRerun } = props;
  const [open, setOpen] = useState<'study' | 'override' | null>(null);
  const answered = { desk, userId, run, valuation, onClose: () => setOpen(null) };
  const mayStudy = desk.permissions.includes('run-studies');
  const mayRun = desk.permissions.includes('start-runs');
  const refusal = mayRun ? noteRefusal(props) : null;
  const study = `/desks/${desk.id}/studies/new?trade=${valuation.trade.id}&snapshot=${run.snapshot.id}`;
  if (!mayStudy && !mayRun)
    return (
      <Text size="small" tone="muted">
        {exceptionText.mayNot}
      </Text>
    );
  return (
    <View style={styles.ways}>
      <View role="group" aria-label={exceptionText.answerTitle} style={styles.acts}>
        {mayStudy ? (
          <>
            <Text size="small">
              <Link href={study}>{exceptionText.startStudy}</Link>
            </Text>
            <LinkButton label={exceptionText.study} onPress={() => setOpen('study')} />
          </>
        ) : null}
        {mayRun && refusal === null ? (
          <LinkButton label={exceptionText.override} onPress={() => setOpen('override')} />
        ) : null}
        {mayRun ? <LinkButton label={exceptionText.rerun} onPress={onRerun} /> : null}
      </View>
      {refusal ? (
        <Text size="small" tone="muted">
          {refusal}
        </Text>
      ) : null}
      {open === 'override' ? <OverrideDialog {...answered} /> : null}
      {open === 'study' ? <StudyAnswerDialog {...answered} /> : null}
    </View>
  );
}

const styles = StyleSheet.create({
  ways: { gap: space.sm },
  acts: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    alignItems: 'baseline',
    columnGap: space.xl,
    rowGap: space.md,
  },
  answer: {
    gap: 2,
    padding: space.md,
    borderRadius: radius.medium,
    backgroundColor: color.sunk,
  },
});
