import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/button';
import { Card, Section } from '@/components/ui/card';
import { DataTable, type Column } from '@/components/ui/data-table';
import { FactList } from '@/components/ui/fact-list';
import { Screen } from '@/components/ui/screen';
import { EmptyState, ErrorState, SkeletonRows } from '@/components/ui/states';
import { Text } from '@/components/ui/text';
import { policiesText } from '@/constants/texts/policies';
import { space } from '@/constants/theme';
import type { Policy } from '@/shared/contracts/policies';
import type { DeskAccess } from '@/shared/contracts/sessions';
import type { Underlying } from '@/shared/contracts/underlyings';
import { formatInstant } from '@/shared/format/dates';
import { errorOf } from '@/hooks/error-of';
import { usePolicies } from '@/hooks/use-policies';
import { useUnderlyings } from '@/hooks/use-underlyings';
import { ApprovePolicyDialog } from './approve-policy-dialog';
import { beside, moneyText, policyFacts, unitText } from './policy-words';

export type PoliciesScreenProps = { desk: DeskAccess; userId: string };

export function PoliciesScreen({ desk, userId }: PoliciesScreenProps) {
  const policies = usePolicies(desk.id);
  const underlyings = useUnderlyings(desk.id);
  const error = policies.error ?? underlyings.error;
  const mayWrite = desk.permissions.includes('author-policy');
  const hasDraft = policies.data?.some(({ status }) => status === 'draft') ?? true;
  return (
    <Screen
      title={policiesText.title}
      subtitle={policiesText.subtitle}
      measure={1000}
      actions={mayWrite && !hasDraft ? <WriteButton desk={desk} /> : undefined}
    >
      {policies.data && underlyings.data ? (
        <Policies
          desk={desk}
          userId={userId}
          policies={policies.data}
          underlyings={underlyings.data}
        />
      ) : error ? (
        <ErrorState
          {...errorOf(error)}
          onRetry={() => void Promise.all([policies.refetch(), underlyings.refetch()])}
        />
      ) : (
        <SkeletonRows rows={5} height={72} />
      )}
    </Screen>
  );
}

function WriteButton({ desk }: { desk: DeskAccess }) {
  return <Button label={policiesText.write} href={`/desks/${desk.id}/policies/draft`} />;
}

type PoliciesProps = PoliciesScreenProps & {
  policies: readonly Policy[];
  underlyings: readonly Underlying[];
};

function Policies({ desk, userId, policies, underlyings }: PoliciesProps) {
  const active = policies.find(({ status }) => status === 'approved') ?? null;
  const draft = policies.find(({ status }) => status === 'draft') ?? null;
  const earlier = policies.filter(({ status }) => status === 'superseded');
  return (
    <>
      {draft ? (
        <DraftSection
          desk={desk}
          userId={userId}
          draft={draft}
          active={active}
          underlyings={underlyings}
        />
      ) : null}
      {active ? (
        <Section title={policiesText.inForce(active.number)}>
          <Signed desk={desk} policy={active} />
          <Terms policy={active} before={null} underlyings={underlyings} />
        </Section>
      ) : (
        <Card>
          <EmptyState title={policiesText.noneTitle} body={policiesText.noneBody} />
        </Card>
      )}
      {earlier.length > 0 ? <History desk={desk} policies={earlier} /> : null}
    </>
  );
}

type DraftProps = PoliciesScreenProps & {
  draft: Policy;
  active: Policy | null;
  underlyings: readonly Underlying[];
};

/** What waits, each figure beside what is in force where it would change. */
function DraftSection({ desk, userId, draft, active, underlyings }: DraftProps) {
  const [approving, setApproving] = useState(false);
  const mayWrite = desk.permissions.includes('author-policy');
  const own = draft.makerIds.includes(userId);
  return (
    <Section title={policiesText.draft(draft.number)}>
      <Signed desk={desk} policy={draft} />
      <Terms policy={draft} before={active} underlyings={underlyings} />
      <Text tone="muted">{mayWrite && own ? policiesText.ownDraft : policiesText.draftWaits}</Text>
      {mayWrite ? (
        <View style={styles.acts}>
          <Button
            kind="secondary"
            label={policiesText.change}
            href={`/desks/${desk.id}/policies/draft`}
          />
          {own ? null : <Button label={policiesText.approve} onPress={() => setApproving(true)} />}
        </View>
      ) : null}
      {approving ? (
        <ApprovePolicyDialog
          desk={desk}
          draft={draft}
          active={active}
          onClose={() => setApproving(false)}
        />
      ) : null}
    </Section>
  );
}

function Signed({ desk, policy }: { desk: DeskAccess; policy: Policy }) {
  const at = (instant: string) => formatInstant(instant, desk.timeZone);
  const { author, authoredAt, approvedBy, approvedAt } = policy;
  return (
    <View>
      <Text tone="muted" tabular>
        {policiesText.authored(author.name, at(authoredAt))}
      </Text>
      {approvedBy && approvedAt ? (
        <Text tone="muted" tabular>
          {policiesText.approved(approvedBy.name, at(approvedAt))}
        </Text>
      ) : null}
    </View>
  );
}

type TermsProps = {
  policy: Policy;
  /** What is in force, to show what changes. */
  before: Policy | null;
  underlyings: readonly Underlying[];
};

function Terms({ policy, before, underlyings }: TermsProps) {
  const factsBefore = before && policyFacts(before);
  const facts = policyFacts(policy).map(({ name, value }, index) => ({
    name,
    // Every policy has a reason of its own.
    value:
      name === policiesText.facts.reason
        ? value
        : beside(value, factsBefore ? factsBefore[index].value : null),
  }));
  const columns: readonly Column<Underlying>[] = [
    {
      id: 'underlying',
      header: policiesText.toleranceColumns.underlying,
      nowrap: true,
      cell: ({ symbol }) => symbol,
    },
    {
      id: 'unit',
      header: policiesText.toleranceColumns.unit,
      align: 'end',
      cell: (row) => beside(unitText(policy, row), before && unitText(before, row)),
    },
    {
      id: 'money',
      header: policiesText.toleranceColumns.money,
      align: 'end',
      cell: (row) => beside(moneyText(policy, row), before && moneyText(before, row)),
    },
  ];
  return (
    <>
      <FactList facts={facts} />
      <DataTable
        plain
        caption={policiesText.tolerancesCaption}
        columns={columns}
        rows={underlyings}
        rowId={({ id }) => id}
      />
      <Text size="small" tone="muted">
        {policiesText.toleranceNote}
      </Text>
    </>
  );
}

function History({ desk, policies }: { desk: DeskAccess; policies: readonly Policy[] }) {
  const columns: readonly Column<Policy>[] = [
    {
      id: 'number',
      header: policiesText.columns.number,
      nowrap: true,
      cell: ({ number }) => policiesText.policy(number),
    },
    {
      id: 'approved',
      header: policiesText.columns.approved,
      nowrap: true,
      cell: ({ approvedAt }) => (approvedAt ? formatInstant(approvedAt, desk.timeZone) : ''),
    },
    {
      id: 'by',
      header: policiesText.columns.by,
      cell: ({ approvedBy }) => approvedBy?.name ?? '',
    },
    { id: 'reason', header: policiesText.columns.reason, cell: ({ reason }) => reason },
  ];
  return (
    <Section title={policiesText.historyTitle}>
      <DataTable
        plain
        caption={policiesText.historyCaption}
        columns={columns}
        rows={policies}
        rowId={({ id }) => id}
        card={(policy) => (
          <View>
            <Text weight="semibold">{policiesText.policy(policy.number)}</Text>
            <Signed desk={desk} policy={policy} />
            <Text>{policy.reason}</Text>
          </View>
        )}
      />
    </Section>
  );
}

const styles = StyleSheet.create({
  acts: { flexDirection: 'row', flexWrap: 'wrap', gap: space.sm },
});
