import { StyleSheet, View } from 'react-native';
import { ListFoot } from '@/components/tables/list-foot';
import { SelectField } from '@/components/ui/select-field';
import { ErrorState, SkeletonRows } from '@/components/ui/states';
import { Heading, Text } from '@/components/ui/text';
import { useWide } from '@/components/ui/use-wide';
import { exceptionText } from '@/constants/texts/runs';
import { space } from '@/constants/theme';
import {
  exceptionKinds,
  exceptionStates,
  type ExceptionalValuation,
  type Run,
} from '@/shared/contracts/runs';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { errorOf } from '@/hooks/error-of';
import {
  isActive,
  useRunException,
  useRunExceptions,
  type ExceptionFilter,
} from '@/hooks/use-runs';
import { ExceptionCard } from './exception-card';

export type ExceptionsSectionProps = {
  desk: DeskAccess;
  userId: string;
  run: Run;
  /** The exception whose figures are open. */
  openId: string | null;
  filter: ExceptionFilter;
  onOpen: (exceptionId: string | null) => void;
  onFilter: (filter: ExceptionFilter) => void;
  onRerun: () => void;
};

/** What somebody has to look at, before everything else. */
export function ExceptionsSection(props: ExceptionsSectionProps) {
  const { run } = props;
  if (run.exceptions === 0)
    return run.status === 'cancelled' ? null : (
      <Text tone="muted">
        {isActive(run.status) ? exceptionText.noneSoFar : exceptionText.none}
      </Text>
    );
  return (
    <View role="region" aria-label={exceptionText.title} style={styles.section}>
      <View style={styles.head}>
        <Heading level={2}>{exceptionText.title}</Heading>
        {run.exceptions > 1 ? <Filters {...props} /> : null}
      </View>
      <Cards {...props} />
    </View>
  );
}

const any = 'any';

function Filters({ filter, onFilter }: ExceptionsSectionProps) {
  return (
    <View style={styles.filters}>
      <View style={styles.field}>
        <SelectField
          label={exceptionText.show}
          value={filter.state ?? any}
          options={[
            { value: any, label: exceptionText.all },
            ...exceptionStates.map((value) => ({ value, label: exceptionText[value] })),
          ]}
          onChange={(state) => onFilter({ ...filter, state: state === any ? null : state })}
        />
      </View>
      <View style={styles.field}>
        <SelectField
          label={exceptionText.kind}
          value={filter.kind ?? any}
          options={[
            { value: any, label: exceptionText.anyKind },
            ...exceptionKinds.map((value) => ({ value, label: exceptionText.kinds[value] })),
          ]}
          onChange={(kind) => onFilter({ ...filter, kind: kind === any ? null : kind })}
        />
      </View>
    </View>
  );
}

/** The exception that a link leads to stands on top where the page in sight does not have it. */
function useLinkedException(
  { desk, run, openId }: ExceptionsSectionProps,
  rows: readonly ExceptionalValuation[] | undefined,
) {
  const inSight = rows?.some(({ exception }) => exception.id === openId) ?? true;
  const { data } = useRunException(desk.id, run.id, inSight ? null : openId);
  return inSight ? undefined : data;
}

function Cards(props: ExceptionsSectionProps) {
  const { desk, userId, run, openId, filter, onOpen, onRerun } = props;
  const exceptions = useRunExceptions(desk.id, run, filter);
  const { data: rows, error, isError } = exceptions;
  const wide = useWide();
  const linked = useLinkedException(props, rows);
  if (isError && !rows)
    return <ErrorState {...errorOf(error)} onRetry={() => void exceptions.refetch()} />;
  if (!rows) return <SkeletonRows rows={Math.min(3, run.exceptions)} height={170} />;
  const shown = linked ? [linked, ...rows] : rows;
  if (shown.length === 0) return <Text tone="muted">{exceptionText.nothing}</Text>;
  return (
    <>
      <View role="list" aria-label={exceptionText.caption} style={styles.cards}>
        {shown.map((valuation) => (
          <View
            role="listitem"
            key={valuation.exception.id}
            style={wide ? styles.half : styles.whole}
          >
            <ExceptionCard
              desk={desk}
              userId={userId}
              run={run}
              valuation={valuation}
              open={valuation.exception.id === openId}
              onOpen={(open) => onOpen(open ? valuation.exception.id : null)}
              onRerun={onRerun}
            />
          </View>
        ))}
      </View>
      <ListFoot pages={exceptions} />
    </>
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
  field: { flexGrow: 1, flexShrink: 1, flexBasis: 160, minWidth: 150 },
  cards: { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'flex-start', gap: space.lg },
  whole: { width: '100%' },
  half: { flexGrow: 1, flexShrink: 1, flexBasis: '45%', maxWidth: '49.4%', minWidth: 0 },
});
