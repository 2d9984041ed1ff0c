import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { TermsForm } from '@/components/ticket/terms-form';
import { BackLink } from '@/components/ui/back-link';
import { Button } from '@/components/ui/button';
import { Section } from '@/components/ui/card';
import { Link } from '@/components/ui/link';
import { Notice } from '@/components/ui/notice';
import { Screen } from '@/components/ui/screen';
import { SelectField } from '@/components/ui/select-field';
import { ErrorState, SkeletonRows } from '@/components/ui/states';
import { Text } from '@/components/ui/text';
import { routeLabel } from '@/constants/texts/price';
import { newStudyText, studiesText } from '@/constants/texts/studies';
import { space } from '@/constants/theme';
import { methodNames, type MethodName, type PricedExercise } from '@/pricing/contract';
import { studyRows, type StudyDraft } from '@/shared/contracts/studies';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { optionTerms } from '@/shared/format/terms';
import { ApiError } from '@/shared/api-client';
import { errorOf } from '@/hooks/error-of';
import { storeKey } from '@/hooks/local-store';
import { useKeptFields } from '@/hooks/use-kept-fields';
import { useQuote } from '@/hooks/use-quotes';
import { useStartStudy } from '@/hooks/use-studies';
import { useTrade } from '@/hooks/use-trades';
import { useTicket } from '@/hooks/use-ticket';

export type NewStudyScreenProps = {
  desk: DeskAccess;
  userId: string;
  of: NewStudyOf;
  onStarted: (studyId: string) => void;
};

/** What the address names; terms of one's own are those of the ticket. */
export type NewStudyOf =
  | { kind: 'quote'; quoteId: string }
  | { kind: 'trade'; tradeId: string; snapshotId: string | null }
  | { kind: 'free' };

type Source = StudyDraft['source'];

export function NewStudyScreen({ desk, userId, of, onStarted }: NewStudyScreenProps) {
  return (
    <Screen
      title={newStudyText.title}
      measure={860}
      overline={<BackLink href={`/desks/${desk.id}/studies`} label={studiesText.back} />}
    >
      {of.kind === 'free' ? (
        <OfFreeTerms desk={desk} userId={userId} onStarted={onStarted} />
      ) : null}
      {of.kind === 'quote' ? (
        <OfQuote desk={desk} userId={userId} quoteId={of.quoteId} onStarted={onStarted} />
      ) : null}
      {of.kind === 'trade' ? (
        <OfTrade desk={desk} userId={userId} source={of} onStarted={onStarted} />
      ) : null}
    </Screen>
  );
}

type Start = Pick<NewStudyScreenProps, 'desk' | 'userId' | 'onStarted'>;

function OfQuote({ desk, userId, quoteId, onStarted }: Start & { quoteId: string }) {
  const { data: quote, error, refetch } = useQuote(desk.id, quoteId);
  if (error) return <ErrorState {...errorOf(error)} onRetry={() => void refetch()} />;
  if (!quote) return <SkeletonRows rows={4} height={60} />;
  return (
    <>
      <Section title={newStudyText.termsTitle}>
        <Link href={`/desks/${desk.id}/quotes/${quote.id}`}>
          {newStudyText.ofQuote(quote.number)}
        </Link>
        <Text>{`${quote.underlying.name} ${optionTerms(quote, quote.underlying.priceDecimals)}`}</Text>
      </Section>
      <Ladders
        desk={desk}
        keptAs={storeKey(`new-study.${quoteId}`, userId, desk.id)}
        source={{ kind: 'quote', quoteId }}
        exercise={quote.exercise}
        onStarted={onStarted}
      />
    </>
  );
}

type TradeSource = Extract<Source, { kind: 'trade' }>;

function OfTrade({ desk, userId, source, onStarted }: Start & { source: TradeSource }) {
  const { data: trade, error, refetch } = useTrade(desk.id, source.tradeId);
  if (error) return <ErrorState {...errorOf(error)} onRetry={() => void refetch()} />;
  if (!trade) return <SkeletonRows rows={4} height={60} />;
  return (
    <>
      <Section title={newStudyText.termsTitle}>
        <Link href={`/desks/${desk.id}/trades/${trade.id}`}>
          {newStudyText.ofTrade(trade.number)}
        </Link>
        <Text>{`${trade.underlying.name} ${optionTerms(trade, trade.underlying.priceDecimals)}`}</Text>
        <Text size="small" tone="muted">
          {newStudyText.tradeNote}
        </Text>
      </Section>
      <Ladders
        desk={desk}
        keptAs={storeKey(`new-study.${source.tradeId}`, userId, desk.id)}
        source={source}
        exercise={trade.exercise}
        onStarted={onStarted}
      />
    </>
  );
}

const nothingTaken = () => undefined;

function OfFreeTerms({ desk, userId, onStarted }: Start) {
  const ticket = useTicket(userId, desk, null, nothingTaken);
  const { underlying, underlyings, reading } = ticket;
  if (underlyings.isError)
    return (
      <ErrorState {...errorOf(underlyings.error)} onRetry={() => void underlyings.refetch()} />
    );
  if (!underlying) return <SkeletonRows rows={6} height={60} />;
  return (
    <>
      <Section title={newStudyText.termsTitle}>
        <Text size="small" tone="muted">
          {newStudyText.freeNote}
        </Text>
        <TermsForm unitOnly ticket={ticket} underlying={underlying} />
      </Section>
      <Ladders
        desk={desk}
        keptAs={storeKey('new-study', userId, desk.id)}
        source={reading.priced ? freeSource(reading.priced.terms) : null}
        exercise={ticket.draft.exercise}
        onStarted={onStarted}
      />
    </>
  );
}

type PricedTerms = NonNullable<ReturnType<typeof useTicket>['reading']['priced']>['terms'];

/** The terms of a ticket without its position. */
function freeSource(terms: PricedTerms): Source {
  const { underlyingId, kind, exercise, strike, expiryDate, market, pricedAt } = terms;
  return {
    kind: 'free',
    terms: { underlyingId, kind, exercise, strike, expiryDate, market, pricedAt },
  };
}

/** Those whose error falls with a fixed order. */
const refinable = methodNames.filter(
  (name) => name !== 'closed-form' && name !== 'spectral-boundary',
);
const first: MethodName = 'heat-crank-nicolson';
const rowChoices = Array.from({ length: studyRows.max - studyRows.min + 1 }, (_, i) =>
  String(studyRows.min + i),
);

/** American walks and grids take longer: one row fewer is as telling. */
const usualRows: Record<PricedExercise, string> = { european: '6', american: '5' };

type LaddersProps = Omit<Start, 'userId'> & {
  /** Where the chosen routes and rows are kept in this browser. */
  keptAs: string;
  source: Source | null;
  exercise: PricedExercise;
};

/** The chosen routes and rows, until the study is started. */
function useChoice(keptAs: string, exercise: PricedExercise) {
  const { values, change, forget } = useKeptFields<{ routes: string; rows: string }>(keptAs, {
    routes: first,
    rows: '',
  });
  const names = values.routes.split(' ');
  const chosen = refinable.filter((name) => names.includes(name));
  const toggle = (name: MethodName) => {
    const next = refinable.filter((one) => chosen.includes(one) !== (one === name));
    change({ routes: next.join(' ') });
  };
  const length = rowChoices.includes(values.rows) ? values.rows : usualRows[exercise];
  return { chosen, toggle, length, setLength: (rows: string) => change({ rows }), forget };
}

function Ladders({ desk, keptAs, source, exercise, onStarted }: LaddersProps) {
  const { chosen, toggle, length, setLength, forget } = useChoice(keptAs, exercise);
  const [idempotencyKey, setKey] = useState(() => crypto.randomUUID());
  const start = useStartStudy(desk.id);
  const submit = () => {
    if (source === null || chosen.length === 0) return;
    const ladders = chosen.map((name) => ({ name, rows: Number(length) }));
    start.mutate(
      { idempotencyKey, body: { source, ladders } },
      {
        onSuccess: ({ id }) => {
          forget();
          onStarted(id);
        },
        // The server has answered: what is sent next is another request.
        onError: (error) => {
          if (error instanceof ApiError && !error.retryable) setKey(crypto.randomUUID());
        },
      },
    );
  };
  return (
    <Section title={newStudyText.methodsTitle}>
      <View role="group" aria-label={newStudyText.methodsTitle} style={styles.methods}>
        {refinable.map((name) => (
          <label key={name} className="pill">
            <input
              className="visually-hidden"
              type="checkbox"
              checked={chosen.includes(name)}
              onChange={() => toggle(name)}
            />
            {routeLabel(name)}
          </label>
        ))}
      </View>
      <Text size="small" tone="muted">
        {newStudyText.methodsNote}
      </Text>
      <View style={styles.rows}>
        <SelectField
          label={newStudyText.rows}
          hint={newStudyText.rowsHint}
          value={length}
          options={rowChoices.map((value) => ({ value, label: value }))}
          onChange={setLength}
        />
      </View>
      {chosen.length === 0 ? <Text tone="brick">{newStudyText.chooseMethod}</Text> : null}
      {start.isError ? <Refusal error={start.error} /> : null}
      <Button
        label={start.isPending ? newStudyText.starting : newStudyText.act}
        busy={start.isPending}
        disabled={source === null || chosen.length === 0}
        onPress={submit}
      />
    </Section>
  );
}

function Refusal({ error }: { error: Error }) {
  const sentences = error instanceof ApiError ? error.issues.map(({ message }) => message) : [];
  return <Notice tone="brick" title={error.message} body={sentences.join(' ')} />;
}

const styles = StyleSheet.create({
  methods: { flexDirection: 'row', flexWrap: 'wrap', columnGap: space.sm, rowGap: space.lg },
  rows: { maxWidth: 320 },
});
