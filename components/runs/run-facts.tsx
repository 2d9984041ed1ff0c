import { StyleSheet, View } from 'react-native';
import { Section } from '@/components/ui/card';
import { DataTable, type Column } from '@/components/ui/data-table';
import { FactList, type Fact } from '@/components/ui/fact-list';
import { Link } from '@/components/ui/link';
import { Text } from '@/components/ui/text';
import { runsText, runText } from '@/constants/texts/runs';
import { space } from '@/constants/theme';
import type { Run, RunTotal } from '@/shared/contracts/runs';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { formatInstant } from '@/shared/format/dates';
import { formatAmount } from '@/shared/format/money';

type FactsProps = { run: Run; desk: DeskAccess };

/** Everything that the values rest on, and who did what. */
export function RunFacts({ run, desk }: FactsProps) {
  const at = (instant: string) => formatInstant(instant, desk.timeZone);
  const { snapshot, policy, books, startedBy, startedAt, finishedAt } = run;
  const facts: Fact[] = [
    { name: runText.close, value: snapshot.date },
    { name: runText.valuedAt, value: `${at(run.valuedAt)} ${desk.timeZone}` },
    { name: runText.policyName, value: String(policy.number) },
    { name: runText.books, value: books.map(({ code, name }) => `${code} ${name}`).join(', ') },
    { name: runText.tradesName, value: runText.tradesOf(run.total, run.leftOut) },
    { name: runText.started, value: runsText.by(startedBy.name, at(startedAt)) },
    ...(finishedAt === null ? [] : [{ name: runText.finished, value: at(finishedAt) }]),
    { name: runText.engine, value: run.engine, mono: true },
    { name: runText.identifier, value: run.id, mono: true },
  ];
  return (
    <View style={styles.half}>
      <Section title={runText.factsTitle}>
        <FactList facts={facts} />
        <View style={styles.links}>
          <Link href={`/desks/${desk.id}/history?run=${encodeURIComponent(run.number)}`}>
            {runText.history}
          </Link>
          {run.reruns.map(({ id, number, status }) => (
            <Link key={id} href={`/desks/${desk.id}/runs/${id}`}>
              {runText.rerunIs(number, runsText.statuses[status])}
            </Link>
          ))}
        </View>
      </Section>
    </View>
  );
}

/** What the books are worth, by currency, beside the close before. */
export function RunTotals({ run, desk }: FactsProps) {
  const { totals, before } = run;
  if (totals.length === 0) return null;
  return (
    <View style={styles.half}>
      <Section title={runText.totalsTitle}>
        <DataTable
          plain
          caption={runText.totalsTitle}
          columns={totalColumns(before?.date ?? null)}
          rows={totals}
          rowId={({ currency }) => currency}
        />
        {before ? (
          <Link href={`/desks/${desk.id}/runs/${before.id}`}>
            {runText.comparedWith(before.number)}
          </Link>
        ) : (
          <Text size="small" tone="muted">
            {runText.firstRun}
          </Text>
        )}
        {totals.length > 1 ? (
          <Text size="small" tone="muted">
            {runText.totalsNote}
          </Text>
        ) : null}
      </Section>
    </View>
  );
}

const totalColumns = (dateBefore: string | null): Column<RunTotal>[] => {
  const amountOf = (amount: string | null, currency: string) =>
    amount === null ? '–' : formatAmount(amount, currency, 'always');
  const current: Column<RunTotal>[] = [
    { id: 'currency', header: runText.currency, cell: ({ currency }) => currency },
    {
      id: 'total',
      header: runText.total,
      align: 'end',
      cell: ({ total, currency }) => amountOf(total, currency),
    },
  ];
  if (dateBefore === null) return current;
  return [
    ...current,
    {
      id: 'before',
      header: runText.before(dateBefore),
      align: 'end',
      cell: ({ before, currency }) => amountOf(before, currency),
    },
    {
      id: 'change',
      header: runText.change,
      align: 'end',
      cell: ({ change, currency }) => amountOf(change, currency),
    },
  ];
};

const styles = StyleSheet.create({
  half: { flexGrow: 1, flexShrink: 1, flexBasis: 330, minWidth: 0 },
  links: { flexDirection: 'row', flexWrap: 'wrap', columnGap: space.lg, rowGap: space.xs },
});
