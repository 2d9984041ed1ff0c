import { lazy, Suspense } from 'react';
import { StyleSheet, View } from 'react-native';
import { ListFoot } from '@/components/tables/list-foot';
import { ColumnChoice } from '@/components/trades/column-choice';
import { Button } from '@/components/ui/button';
import { SelectField } from '@/components/ui/select-field';
import { ErrorState, SkeletonRows } from '@/components/ui/states';
import { Heading, Text } from '@/components/ui/text';
import { useWide } from '@/components/ui/use-wide';
import { agreementText } from '@/constants/texts/agreement';
import { valuesText } from '@/constants/texts/runs';
import { space } from '@/constants/theme';
import { verdicts } from '@/pricing/contract';
import type { Run, RunValuation } from '@/shared/contracts/runs';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { errorOf } from '@/hooks/error-of';
import { useHiddenColumns } from '@/hooks/use-hidden-columns';
import { isActive, useRunValuations, type ValueFilter } from '@/hooks/use-runs';
import { ValueCard } from './value-card';

/** Loaded only where there is room for it: a phone shows cards. */
const ValueTable = lazy(async () => ({
  default: (await import('@/components/tables/wide-tables')).ValueTable,
}));

export type ValuesSectionProps = {
  desk: DeskAccess;
  userId: string;
  run: Run;
  filter: ValueFilter;
  onFilter: (filter: ValueFilter) => void;
};

const optionalColumns = Object.entries(valuesText.columns);

/** The whole table, below what needs somebody. */
export function ValuesSection(props: ValuesSectionProps) {
  const { desk, userId, run } = props;
  const wide = useWide();
  const columns = useHiddenColumns('run-values', userId, desk.id);
  const title = isActive(run.status) ? valuesText.soFar : valuesText.title;
  return (
    <View role="region" aria-label={title} style={styles.section}>
      <View style={styles.head}>
        <Heading level={2}>{title}</Heading>
        <Filters {...props} />
      </View>
      <Values {...props} hidden={columns.hidden} />
      {wide && run.done > 0 ? (
        <View style={styles.foot}>
          <ColumnChoice columns={optionalColumns} {...columns} />
        </View>
      ) : null}
    </View>
  );
}

const any = 'any';

function Filters({ run, filter, onFilter }: ValuesSectionProps) {
  return (
    <View style={styles.filters}>
      <View style={styles.field}>
        <SelectField
          label={valuesText.verdict}
          value={filter.verdict ?? any}
          options={[
            { value: any, label: valuesText.anyVerdict },
            ...verdicts.map((value) => ({ value, label: agreementText.verdictWord[value] })),
          ]}
          onChange={(verdict) => onFilter({ ...filter, verdict: verdict === any ? null : verdict })}
        />
      </View>
      {run.books.length > 1 ? (
        <View style={styles.field}>
          <SelectField
            label={valuesText.book}
            value={filter.bookId ?? any}
            options={[
              { value: any, label: valuesText.anyBook },
              ...run.books.map(({ id, code }) => ({ value: id, label: code })),
            ]}
            onChange={(id) => onFilter({ ...filter, bookId: id === any ? null : id })}
          />
        </View>
      ) : null}
    </View>
  );
}

const noFilter: ValueFilter = { verdict: null, bookId: null };

function Values(props: ValuesSectionProps & { hidden: readonly string[] }) {
  const { desk, run, filter, onFilter, hidden } = props;
  const values = useRunValuations(desk.id, run, filter);
  const { data: rows, error, isError } = values;
  if (isError && !rows)
    return <ErrorState {...errorOf(error)} onRetry={() => void values.refetch()} />;
  const filtered = filter.verdict !== null || filter.bookId !== null;
  if (!rows || (rows.length === 0 && run.done > 0 && !filtered && !isError))
    return <SkeletonRows rows={8} height={56} />;
  if (rows.length === 0)
    return !filtered ? (
      <Text tone="muted">{isActive(run.status) ? valuesText.emptySoFar : valuesText.empty}</Text>
    ) : (
      <View style={styles.nothing}>
        <Text tone="muted">{valuesText.nothing}</Text>
        <Button kind="quiet" label={valuesText.clear} onPress={() => onFilter(noFilter)} />
      </View>
    );
  return (
    <>
      <Rows rows={rows} desk={desk} hidden={hidden} />
      <ListFoot pages={values} end={valuesText.loadedAll(rows.length)} />
    </>
  );
}

type RowsProps = { rows: RunValuation[]; desk: DeskAccess; hidden: readonly string[] };

function Rows({ rows, desk, hidden }: RowsProps) {
  const wide = useWide();
  if (wide)
    return (
      <Suspense fallback={<SkeletonRows rows={8} height={56} />}>
        <ValueTable deskId={desk.id} valuations={rows} hidden={hidden} />
      </Suspense>
    );
  return (
    <View role="list" aria-label={valuesText.caption} style={styles.cards}>
      {rows.map((valuation) => (
        <View role="listitem" key={valuation.position}>
          <ValueCard valuation={valuation} deskId={desk.id} />
        </View>
      ))}
    </View>
  );
}

const styles = StyleSheet.create({
  section: { gap: space.md },
  head: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    alignItems: 'center',
    justifyContent: 'space-between',
    gap: space.md,
  },
  filters: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    gap: space.sm,
    flexGrow: 1,
    flexShrink: 1,
    maxWidth: 400,
  },
  field: { flexGrow: 1, flexShrink: 1, flexBasis: 140, minWidth: 140 },
  cards: { gap: space.sm },
  foot: { alignItems: 'flex-end' },
  nothing: { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'center', gap: space.sm },
});
