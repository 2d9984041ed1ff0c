import { StyleSheet, View } from 'react-native';
import { policyFacts } from '@/components/policies/policy-words';
import { BackLink } from '@/components/ui/back-link';
import { Button } from '@/components/ui/button';
import { Section } from '@/components/ui/card';
import { FactList } from '@/components/ui/fact-list';
import { Link } from '@/components/ui/link';
import { Notice } from '@/components/ui/notice';
import { Screen } from '@/components/ui/screen';
import { SelectField } from '@/components/ui/select-field';
import { EmptyState, ErrorState, SkeletonRows } from '@/components/ui/states';
import { Text } from '@/components/ui/text';
import { LinkButton } from '@/components/ui/text-field';
import { newRunText, runsText } from '@/constants/texts/runs';
import { radius, color, space } from '@/constants/theme';
import type { Book } from '@/shared/contracts/books';
import type { SnapshotSummary } from '@/shared/contracts/market-data';
import type { Policy } from '@/shared/contracts/policies';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { errorOf } from '@/hooks/error-of';
import { useBooks } from '@/hooks/use-books';
import { useSnapshots } from '@/hooks/use-market-data';
import { usePolicies } from '@/hooks/use-policies';
import { useRunChoice, useRunStart } from './use-new-run';

export type NewRunScreenProps = {
  desk: DeskAccess;
  userId: string;
  onStarted: (runId: string) => void;
};

export function NewRunScreen({ desk, userId, onStarted }: NewRunScreenProps) {
  const books = useBooks(desk.id);
  const closes = useSnapshots(desk.id, 'approved');
  const policies = usePolicies(desk.id);
  const error = books.error ?? closes.error ?? policies.error;
  const retry = () => Promise.all([books.refetch(), closes.refetch(), policies.refetch()]);
  return (
    <Screen
      title={newRunText.title}
      measure={860}
      overline={<BackLink href={`/desks/${desk.id}/runs`} label={runsText.back} />}
    >
      {books.data && closes.data && policies.data ? (
        <RunForm
          desk={desk}
          userId={userId}
          books={books.data}
          closes={closes.data}
          onEarlier={closes.hasNextPage ? () => void closes.fetchNextPage() : undefined}
          policy={policies.data.find(({ status }) => status === 'approved') ?? null}
          onStarted={onStarted}
        />
      ) : error ? (
        <ErrorState {...errorOf(error)} onRetry={() => void retry()} />
      ) : (
        <SkeletonRows rows={5} height={72} />
      )}
    </Screen>
  );
}

type RunFormProps = NewRunScreenProps & {
  books: readonly Book[];
  closes: readonly SnapshotSummary[];
  /** Reads closes of earlier days; undefined where all are there. */
  onEarlier: (() => void) | undefined;
  policy: Policy | null;
};

function RunForm(props: RunFormProps) {
  const { desk, books, closes, onEarlier, policy, onStarted } = props;
  const { chosen, choose, close, chooseClose, forget } = useRunChoice(props);
  const start = useRunStart(desk.id, (runId) => {
    forget();
    onStarted(runId);
  });
  if (books.length === 0)
    return (
      <EmptyState
        title={newRunText.noBooksTitle}
        body={newRunText.noBooksBody}
        action={<Button label={newRunText.openBooks} href={`/desks/${desk.id}/books`} />}
      />
    );
  const picked = books.filter(({ id }) => chosen.includes(id));
  const trades = picked.reduce((sum, { live }) => sum + live, 0);
  const bookIds = picked.map(({ id }) => id);
  return (
    <>
      <BooksSection
        books={books}
        chosen={chosen}
        onChosen={choose}
        error={start.issueAt('bookIds')}
      />
      <CloseSection
        desk={desk}
        closes={closes}
        close={close}
        onClose={chooseClose}
        onEarlier={onEarlier}
        error={start.issueAt('snapshotId')}
      />
      <PolicySection desk={desk} policy={policy} />
      <Section title={newRunText.willTitle}>
        <WillHappen books={picked.length} trades={trades} date={close?.date ?? null} />
        {start.failure ? <Notice tone="brick" title={start.failure} /> : null}
        <View style={styles.act}>
          <Button
            grow
            label={start.busy ? newRunText.starting : newRunText.act}
            busy={start.busy}
            disabled={!close || !policy || trades === 0}
            onPress={() => {
              if (close) start.send({ bookIds, snapshotId: close.id });
            }}
          />
        </View>
      </Section>
    </>
  );
}

type BooksSectionProps = {
  books: readonly Book[];
  chosen: readonly string[];
  onChosen: (ids: readonly string[]) => void;
  error: string | undefined;
};

function BooksSection({ books, chosen, onChosen, error }: BooksSectionProps) {
  const toggle = (id: string) =>
    onChosen(chosen.includes(id) ? chosen.filter((other) => other !== id) : [...chosen, id]);
  return (
    <Section
      title={newRunText.booksTitle}
      action={
        books.length > 1 && chosen.length < books.length ? (
          <LinkButton
            label={newRunText.allBooks}
            onPress={() => onChosen(books.map(({ id }) => id))}
          />
        ) : undefined
      }
    >
      <View role="group" aria-label={newRunText.booksTitle} style={styles.books}>
        {books.map(({ id, code, name, live }) => (
          <label key={id} className="check">
            <input type="checkbox" checked={chosen.includes(id)} onChange={() => toggle(id)} />
            <View style={styles.book}>
              <Text weight="medium">{code}</Text>
              <Text size="small" tone="muted">
                {name}
              </Text>
            </View>
            <Text tabular tone="muted" style={styles.end}>
              {newRunText.live(live)}
            </Text>
          </label>
        ))}
      </View>
      {error ? <Notice tone="brick" title={error} /> : null}
    </Section>
  );
}

type CloseSectionProps = Pick<RunFormProps, 'desk' | 'closes' | 'onEarlier'> & {
  close: SnapshotSummary | undefined;
  onClose: (id: string) => void;
  error: string | undefined;
};

function CloseSection({ desk, closes, onEarlier, close, onClose, error }: CloseSectionProps) {
  return (
    <Section
      title={newRunText.closeTitle}
      action={
        onEarlier ? <LinkButton label={newRunText.earlierCloses} onPress={onEarlier} /> : undefined
      }
    >
      {close ? (
        <View style={styles.close}>
          <SelectField
            label={newRunText.close}
            hint={newRunText.closeHint}
            error={error}
            value={close.id}
            options={closes.map(({ id, date }, index) => ({
              value: id,
              label: index === 0 ? newRunText.latest(date) : date,
            }))}
            onChange={onClose}
          />
        </View>
      ) : (
        <Notice
          tone="ochre"
          title={newRunText.noCloseTitle}
          body={newRunText.noCloseBody}
          action={<Link href={`/desks/${desk.id}/market-data`}>{newRunText.openCloses}</Link>}
        />
      )}
    </Section>
  );
}

function PolicySection({ desk, policy }: { desk: DeskAccess; policy: Policy | null }) {
  const link = <Link href={`/desks/${desk.id}/policies`}>{newRunText.openPolicy}</Link>;
  if (!policy)
    return (
      <Section title={newRunText.policyTitle}>
        <Notice
          tone="ochre"
          title={newRunText.noPolicyTitle}
          body={newRunText.noPolicyBody}
          action={link}
        />
      </Section>
    );
  return (
    <Section title={newRunText.policyTitle} action={link}>
      <Text weight="medium">{newRunText.policyInForce(policy.number)}</Text>
      <FactList facts={policyFacts(policy)} />
    </Section>
  );
}

type WillHappenProps = { books: number; trades: number; date: string | null };

function WillHappen({ books, trades, date }: WillHappenProps) {
  if (books === 0) return <Text tone="muted">{newRunText.waitsForChoice}</Text>;
  if (trades === 0) return <Text>{newRunText.nothingLive}</Text>;
  if (date === null) return null;
  return (
    <View role="status" style={styles.well}>
      <Text>{newRunText.will(trades, books, date)}</Text>
      <Text size="small" tone="muted">
        {newRunText.background}
      </Text>
    </View>
  );
}

const styles = StyleSheet.create({
  books: { gap: space.xs },
  book: { flexShrink: 1, minWidth: 0 },
  end: { marginLeft: 'auto' },
  close: { maxWidth: 360 },
  act: { flexDirection: 'row', maxWidth: 360 },
  well: {
    gap: space.xs,
    padding: space.md,
    borderRadius: radius.medium,
    backgroundColor: color.sunk,
  },
});
