import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/button';
import { Section } from '@/components/ui/card';
import { Notice } from '@/components/ui/notice';
import { Text } from '@/components/ui/text';
import { TextAreaField } from '@/components/ui/text-field';
import { studiesText } from '@/constants/texts/studies';
import { space } from '@/constants/theme';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { studyDecisionSchema, type Study } from '@/shared/contracts/studies';
import { formatInstant } from '@/shared/format/dates';
import { errorOf } from '@/hooks/error-of';
import { storeKey } from '@/hooks/local-store';
import { useKeptFields } from '@/hooks/use-kept-fields';
import { useStudyAct } from '@/hooks/use-studies';

export type StudyDecisionProps = { desk: DeskAccess; study: Study; userId: string };

/** Signs off or sends back, or says who did and who may. */
export function StudyDecision({ desk, study, userId }: StudyDecisionProps) {
  const { decision, status } = study;
  if (decision && (status === 'signed-off' || status === 'sent-back'))
    return (
      <Section title={studiesText.decisionTitle}>
        <Text weight="semibold">
          {studiesText.decided[status](decision.by.name, formatInstant(decision.at, desk.timeZone))}
        </Text>
        <Text>{decision.comment}</Text>
      </Section>
    );
  if (status !== 'finished') return null;
  const mayDecide = desk.permissions.includes('sign-off-studies');
  const own = study.startedBy.id === userId;
  return (
    <Section title={studiesText.decisionTitle}>
      {mayDecide && !own ? (
        <DecisionForm desk={desk} study={study} userId={userId} />
      ) : (
        <Text tone="muted">{mayDecide ? studiesText.ownStudy : studiesText.waitsForOfficer}</Text>
      )}
    </Section>
  );
}

function DecisionForm({ desk, study, userId }: StudyDecisionProps) {
  const keptAs = storeKey(`study.${study.id}`, userId, desk.id);
  const { values, change, forget } = useKeptFields(keptAs, { comment: '' });
  const [error, setError] = useState<string>();
  const act = useStudyAct(desk.id, study.id);
  const decide = (kind: 'sign-off' | 'send-back') => {
    const read = studyDecisionSchema.safeParse({ version: study.version, ...values });
    setError(read.error?.issues.at(0)?.message);
    if (read.success) act.mutate({ kind, ...read.data }, { onSuccess: forget });
  };
  const under = act.isPending ? act.variables?.kind : null;
  return (
    <View style={styles.form}>
      <TextAreaField
        label={studiesText.comment}
        hint={studiesText.commentHint}
        value={values.comment}
        error={error}
        maxLength={500}
        required
        onChangeText={(comment) => change({ comment })}
      />
      <Text size="small" tone="muted">
        {studiesText.decisionNote}
      </Text>
      {act.isError ? <Notice tone="brick" title={errorOf(act.error).message} /> : null}
      <View style={styles.acts}>
        <Button
          kind="secondary"
          label={studiesText.sendBack}
          busy={under === 'send-back'}
          disabled={act.isPending && under !== 'send-back'}
          onPress={() => decide('send-back')}
        />
        <Button
          label={studiesText.signOff}
          busy={under === 'sign-off'}
          disabled={act.isPending && under !== 'sign-off'}
          onPress={() => decide('sign-off')}
        />
      </View>
    </View>
  );
}

const styles = StyleSheet.create({
  form: { gap: space.md },
  acts: { flexDirection: 'row', flexWrap: 'wrap', gap: space.sm, justifyContent: 'flex-end' },
});
