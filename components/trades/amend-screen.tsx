import { zodResolver } from '@hookform/resolvers/zod';
import { useRouter, type Href } from 'expo-router';
import { FormProvider, useForm } from 'react-hook-form';
import { ActionBar } from '@/components/ui/action-bar';
import { BackLink } from '@/components/ui/back-link';
import { Button } from '@/components/ui/button';
import { Section } from '@/components/ui/card';
import { Notice } from '@/components/ui/notice';
import { Screen } from '@/components/ui/screen';
import { ErrorState, SkeletonRows } from '@/components/ui/states';
import { statusWord, tradeFormText, tradeText } from '@/constants/texts/trades';
import type { DeskAccess } from '@/shared/contracts/sessions';
import type { Trade } from '@/shared/contracts/trades';
import { moveTarget, isLive } from '@/shared/trade-moves';
import { errorOf } from '@/hooks/error-of';
import { readKeptForm } from '@/hooks/kept-form';
import { storeKey } from '@/hooks/local-store';
import { useAmendTrade, useReloadTrade, useTrade } from '@/hooks/use-trades';
import { amendmentDefaults, amendmentForm, keptInstant } from './deal-form';
import { DealFields, FieldRow, FormArea, FormChoice, FormText } from './form-fields';
import { WillHappen } from './propose-screen';
import { tradeTerms } from './trade-summary';
import { useKeptSubmit } from './use-kept-submit';

export type AmendScreenProps = { desk: DeskAccess; userId: string; tradeId: string };

/** A new version of a trade, which waits for approval as the first one did. */
export function AmendScreen({ desk, userId, tradeId }: AmendScreenProps) {
  const { data: trade, error, refetch } = useTrade(desk.id, tradeId);
  const href = `/desks/${desk.id}/trades/${tradeId}`;
  return (
    <Screen
      title={trade ? tradeFormText.amendTitle(trade.number) : tradeText.title}
      measure={720}
      overline={<BackLink href={href} label={tradeFormText.backToTrade} />}
      subtitle={trade ? tradeTerms(trade) : undefined}
    >
      {trade ? (
        moveTarget('amend', trade.status) === null ? (
          <Notice tone="lake" title={statusWord[trade.status]} />
        ) : (
          <AmendmentForm desk={desk} userId={userId} trade={trade} href={href} />
        )
      ) : error ? (
        <ErrorState {...errorOf(error)} onRetry={() => void refetch()} />
      ) : (
        <SkeletonRows rows={6} height={60} />
      )}
    </Screen>
  );
}

type FormProps = { desk: DeskAccess; userId: string; trade: Trade; href: string };

function useAmendment({ desk, userId, trade, href }: FormProps) {
  const router = useRouter();
  const { mutateAsync, isPending } = useAmendTrade(desk.id, trade.id);
  const reload = useReloadTrade(desk.id, trade.id);
  const keptAs = storeKey(`trade-amendment.${trade.id}`, userId, desk.id);
  const [latest] = trade.versions;
  const form = useForm({
    resolver: zodResolver(amendmentForm(desk)),
    defaultValues: readKeptForm(keptAs, amendmentDefaults(latest, desk)),
  });
  const { submit, failure } = useKeptSubmit(form, {
    keptAs,
    send: mutateAsync,
    onSent: () => router.replace(href as Href),
    onStale: reload,
  });
  const onSubmit = form.handleSubmit((read) =>
    submit({ ...read, tradedAt: keptInstant(read, latest, desk), version: trade.version }),
  );
  return { form, onSubmit, failure, busy: isPending };
}

function AmendmentForm(props: FormProps) {
  const { desk, trade } = props;
  const { form, onSubmit, failure, busy } = useAmendment(props);
  const stays = isLive(trade.status) ? [tradeFormText.liveStays] : [];
  return (
    <FormProvider {...form}>
      <form className="form" noValidate onSubmit={(event) => void onSubmit(event)}>
        <Section title={tradeFormText.termsTitle}>
          <TermFields unit={trade.underlying.unit} />
        </Section>
        <Section title={tradeFormText.dealTitle}>
          <DealFields zone={desk.timeZone} />
        </Section>
        <FormArea
          name="reason"
          label={tradeFormText.reason}
          hint={tradeFormText.reasonHint}
          required
        />
        <WillHappen sentences={[tradeFormText.willAmend, ...stays]} />
        {failure ? <Notice tone="brick" title={tradeFormText.refused} body={failure} /> : null}
        <ActionBar>
          <Button grow submit label={tradeFormText.amend} busy={busy} />
        </ActionBar>
      </form>
    </FormProvider>
  );
}

const optionsOf = (values: readonly (keyof typeof tradeText.choices)[]) =>
  values.map((value) => ({ value, label: tradeText.choices[value] }));

function TermFields({ unit }: { unit: string }) {
  const { fields } = tradeText;
  return (
    <>
      <FieldRow>
        <FormChoice
          name="direction"
          label={fields.direction}
          options={optionsOf(['buy', 'sell'])}
        />
        <FormChoice name="kind" label={fields.kind} options={optionsOf(['call', 'put'])} />
        <FormChoice
          name="exercise"
          label={fields.exercise}
          options={optionsOf(['european', 'american'])}
        />
      </FieldRow>
      <FieldRow>
        <FormText
          name="quantity"
          label={fields.quantity}
          inputMode="decimal"
          unit={tradeText.lots}
        />
        <FormText name="contractSize" label={fields.contractSize} inputMode="decimal" unit={unit} />
      </FieldRow>
      <FieldRow>
        <FormText name="strike" label={fields.strike} inputMode="decimal" />
        <FormText name="expiryDate" label={fields.expiryDate} hint={tradeFormText.expiryHint} />
      </FieldRow>
    </>
  );
}
