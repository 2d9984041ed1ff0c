import { zodResolver } from '@hookform/resolvers/zod';
import { useRouter, type Href } from 'expo-router';
import { FormProvider, useForm, useWatch } from 'react-hook-form';
import { StyleSheet, View } from 'react-native';
import { AgreementStrip } from '@/components/charts/agreement-strip';
import { positionWords } from '@/components/price/answer-card';
import { summaryAgreement, summaryTerms } from '@/components/quotes/quote-summary';
import { ActionBar } from '@/components/ui/action-bar';
import { BackLink } from '@/components/ui/back-link';
import { Button } from '@/components/ui/button';
import { Section } from '@/components/ui/card';
import { Notice } from '@/components/ui/notice';
import { Screen } from '@/components/ui/screen';
import { ErrorState, SkeletonRows } from '@/components/ui/states';
import { Text } from '@/components/ui/text';
import { booksText } from '@/constants/texts/books';
import { tradeActText, tradeFormText, tradeText } from '@/constants/texts/trades';
import { color, radius, space } from '@/constants/theme';
import type { Book } from '@/shared/contracts/books';
import type { Quote } from '@/shared/contracts/quotes';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { formatInstant } from '@/shared/format/dates';
import { formatMoney } from '@/shared/format/money';
import { errorOf } from '@/hooks/error-of';
import { readKeptForm } from '@/hooks/kept-form';
import { storeKey } from '@/hooks/local-store';
import { useBooks } from '@/hooks/use-books';
import { useQuote } from '@/hooks/use-quotes';
import { useProposeTrade } from '@/hooks/use-trades';
import { proposalDefaults, proposalForm } from './deal-form';
import { DealFields, FormChoice } from './form-fields';
import { useKeptSubmit } from './use-kept-submit';

export type ProposeScreenProps = { desk: DeskAccess; userId: string; quoteId: string };

/** A trade on the terms of a quote: what was agreed besides them, and the book it goes on. */
export function ProposeScreen({ desk, userId, quoteId }: ProposeScreenProps) {
  const quote = useQuote(desk.id, quoteId);
  const books = useBooks(desk.id);
  const error = quote.error ?? books.error;
  const retry = () => void Promise.all([quote.refetch(), books.refetch()]);
  return (
    <Screen
      title={tradeFormText.proposeTitle}
      measure={720}
      overline={
        <BackLink href={`/desks/${desk.id}/quotes/${quoteId}`} label={tradeFormText.back} />
      }
      subtitle={quote.data ? tradeFormText.fromQuote(quote.data.number) : undefined}
    >
      {quote.data && books.data ? (
        <ProposalForm desk={desk} userId={userId} quote={quote.data} books={books.data} />
      ) : error ? (
        <ErrorState {...errorOf(error)} onRetry={retry} />
      ) : (
        <SkeletonRows rows={6} height={60} />
      )}
    </Screen>
  );
}

type FormProps = {
  desk: DeskAccess;
  userId: string;
  quote: Quote;
  books: readonly Book[];
};

function useProposal({ desk, userId, quote, books }: FormProps) {
  const router = useRouter();
  const { mutateAsync, isPending } = useProposeTrade(desk.id);
  const keptAs = storeKey(`trade-proposal.${quote.id}`, userId, desk.id);
  const onlyBook = books.length === 1 ? books[0].id : '';
  const form = useForm({
    resolver: zodResolver(proposalForm(desk)),
    defaultValues: readKeptForm(keptAs, proposalDefaults(quote, desk, onlyBook)),
  });
  const { submit, failure } = useKeptSubmit(form, {
    keptAs,
    send: mutateAsync,
    onSent: ({ id }) => router.replace(`/desks/${desk.id}/trades/${id}` as Href),
  });
  const onSubmit = form.handleSubmit((deal) => submit({ ...deal, quoteId: quote.id }));
  return { form, onSubmit, failure, busy: isPending };
}

function ProposalForm(props: FormProps) {
  const { desk, quote, books } = props;
  const { form, onSubmit, failure, busy } = useProposal(props);
  const bookId = useWatch({ control: form.control, name: 'bookId' });
  const chosen = books.find(({ id }) => id === bookId);
  const total = formatMoney(quote.total, quote.underlying.currency, 'always');
  if (books.length === 0) return <Notice tone="ochre" title={tradeFormText.noBooks} />;
  return (
    <FormProvider {...form}>
      <form className="form" noValidate onSubmit={(event) => void onSubmit(event)}>
        <QuotedTerms quote={quote} desk={desk} />
        <Section title={tradeFormText.dealTitle}>
          <FormChoice
            name="bookId"
            label={tradeFormText.book}
            options={[
              ...(chosen ? [] : [{ value: '', label: tradeFormText.chooseBook }]),
              ...books.map(({ id, code, name }) => ({
                value: id,
                label: booksText.bookTitle(code, name),
              })),
            ]}
          />
          <DealFields zone={desk.timeZone} serverValue={tradeFormText.serverValue(total)} />
        </Section>
        <WillHappen sentences={[tradeFormText.willPropose(chosen?.code ?? '')]} />
        {failure ? <Notice tone="brick" title={tradeFormText.refused} body={failure} /> : null}
        <Text size="small" tone="muted">
          {tradeFormText.kept}
        </Text>
        <ActionBar>
          <Button grow submit label={tradeFormText.propose} busy={busy} />
        </ActionBar>
      </form>
    </FormProvider>
  );
}

/** What exactly the one press does. */
export function WillHappen({ sentences }: { sentences: readonly string[] }) {
  return (
    <View style={styles.well}>
      <Text size="small" tone="muted" weight="medium">
        {tradeActText.willHappen}
      </Text>
      {sentences.map((sentence) => (
        <Text key={sentence}>{sentence}</Text>
      ))}
    </View>
  );
}

function QuotedTerms({ quote, desk }: { quote: Quote; desk: DeskAccess }) {
  return (
    <Section title={tradeFormText.quotedTitle}>
      <View style={styles.terms}>
        <Text weight="semibold">{summaryTerms(quote)}</Text>
        <Text>{positionWords(quote, quote.underlying.unit)}</Text>
        <Text tone="muted" tabular>
          {`${tradeText.expiry}: ${tradeText.atZone(formatInstant(quote.expiryAt, desk.timeZone), desk.timeZone)}`}
        </Text>
      </View>
      <AgreementStrip {...summaryAgreement(quote)} size="row" />
    </Section>
  );
}

const styles = StyleSheet.create({
  terms: { gap: 2 },
  well: {
    gap: space.xs,
    padding: space.md,
    borderRadius: radius.medium,
    backgroundColor: color.sunk,
  },
});
