import { useEffect, useState } from 'react';
import { FormProvider, useController, useForm, useWatch, type Resolver } from 'react-hook-form';
import { StyleSheet, View } from 'react-native';
import { ActionBar } from '@/components/ui/action-bar';
import { BackLink } from '@/components/ui/back-link';
import { Button } from '@/components/ui/button';
import { Section } from '@/components/ui/card';
import { Notice } from '@/components/ui/notice';
import { Screen } from '@/components/ui/screen';
import { ChoiceField, SelectField } from '@/components/ui/select-field';
import { ErrorState, SkeletonRows } from '@/components/ui/states';
import { Text } from '@/components/ui/text';
import { TextAreaField, TextField } from '@/components/ui/text-field';
import { policiesText, policyFormText } from '@/constants/texts/policies';
import { routeLabel } from '@/constants/texts/price';
import { space } from '@/constants/theme';
import { ApiError } from '@/shared/api-client';
import { policyMethods, type Policy } from '@/shared/contracts/policies';
import type { DeskAccess } from '@/shared/contracts/sessions';
import type { Underlying } from '@/shared/contracts/underlyings';
import { errorOf } from '@/hooks/error-of';
import { forgetForm, keepForm, keyForContent, readKeptForm } from '@/hooks/kept-form';
import { storeKey } from '@/hooks/local-store';
import { usePolicies, useSendPolicy } from '@/hooks/use-policies';
import { useUnderlyings } from '@/hooks/use-underlyings';
import {
  currenciesOf,
  fieldOfPath,
  moneyName,
  policyDefaults,
  readPolicy,
  sizeNames,
  unitName,
  type PolicyValues,
} from './policy-form';

export type PolicyFormScreenProps = { desk: DeskAccess; userId: string; onSaved: () => void };

export function PolicyFormScreen({ desk, userId, onSaved }: PolicyFormScreenProps) {
  const policies = usePolicies(desk.id);
  const underlyings = useUnderlyings(desk.id);
  const error = policies.error ?? underlyings.error;
  const find = (status: Policy['status']) => policies.data?.find((one) => one.status === status);
  const draft = find('draft') ?? null;
  return (
    <Screen
      title={draft ? policyFormText.changeTitle(draft.number) : policyFormText.newTitle}
      measure={820}
      overline={<BackLink href={`/desks/${desk.id}/policies`} label={policiesText.back} />}
    >
      {policies.data && underlyings.data ? (
        <PolicyForm
          key={draft?.id ?? 'new'}
          desk={desk}
          userId={userId}
          draft={draft}
          active={find('approved') ?? null}
          underlyings={underlyings.data}
          onSaved={onSaved}
        />
      ) : error ? (
        <ErrorState
          {...errorOf(error)}
          onRetry={() => void Promise.all([policies.refetch(), underlyings.refetch()])}
        />
      ) : (
        <SkeletonRows rows={6} height={60} />
      )}
    </Screen>
  );
}

type FormProps = PolicyFormScreenProps & {
  draft: Policy | null;
  active: Policy | null;
  underlyings: readonly Underlying[];
};

const resolverFor =
  (underlyings: readonly Underlying[]): Resolver<PolicyValues> =>
  (values) => {
    const read = readPolicy(values, underlyings);
    if (read.ok) return { values, errors: {} };
    const named = Object.entries(read.errors).map(([name, message]) => [
      name,
      { type: 'custom', message },
    ]);
    return { values: {}, errors: Object.fromEntries(named) };
  };

/** The form is kept while it is typed, and sent once. */
function usePolicyForm({ desk, userId, draft, active, underlyings, onSaved }: FormProps) {
  const keptAs = storeKey(`policy.${draft?.id ?? 'new'}`, userId, desk.id);
  const form = useForm<PolicyValues>({
    resolver: resolverFor(underlyings),
    defaultValues: readKeptForm(keptAs, policyDefaults(draft ?? active, underlyings)),
  });
  const { subscribe } = form;
  useEffect(
    () =>
      subscribe({
        formState: { values: true },
        callback: ({ values }) => keepForm(keptAs, values),
      }),
    [subscribe, keptAs],
  );
  const { mutateAsync, isPending } = useSendPolicy(desk.id, draft);
  const [failure, setFailure] = useState<string | null>(null);

  function complain({ code, issues, message }: ApiError) {
    if (code === 'stale-version') return setFailure(policyFormText.stale);
    const others = issues.filter((issue) => {
      const field = fieldOfPath(issue.path);
      if (field !== null)
        form.setError(
          field,
          { type: 'server', message: issue.message },
          { shouldFocus: issue === issues[0] },
        );
      return field === null;
    });
    setFailure(others.at(0)?.message ?? message);
  }

  const onSubmit = form.handleSubmit(async (values) => {
    setFailure(null);
    const read = readPolicy(values, underlyings);
    if (!read.ok) return;
    try {
      const idempotencyKey = keyForContent(keptAs, read.draft);
      await mutateAsync({ body: read.draft, idempotencyKey });
      forgetForm(keptAs);
      onSaved();
    } catch (error) {
      if (!(error instanceof ApiError)) throw error;
      complain(error);
    }
  });
  return { form, failure, busy: isPending, onSubmit };
}

function PolicyForm(props: FormProps) {
  const { underlyings } = props;
  const { form, failure, busy, onSubmit } = usePolicyForm(props);
  return (
    <FormProvider {...form}>
      <form className="form" noValidate onSubmit={(event) => void onSubmit(event)}>
        <Section title={policyFormText.routesTitle}>
          <View style={styles.row}>
            <RouteField name="primaryEuropean" methods={policyMethods.european} />
            <RouteField name="checkEuropean" methods={policyMethods.european} />
          </View>
          <View style={styles.row}>
            <RouteField name="primaryAmerican" methods={policyMethods.american} />
            <RouteField name="checkAmerican" methods={policyMethods.american} />
          </View>
        </Section>
        <RefinementSection />
        <ToleranceSections underlyings={underlyings} />
        <ReasonField />
        {failure ? <Notice tone="brick" title={policyFormText.refused} body={failure} /> : null}
        <Text size="small" tone="muted">
          {`${policyFormText.makerNote} ${policyFormText.kept}`}
        </Text>
        <ActionBar>
          <Button grow submit label={policyFormText.save} busy={busy} />
        </ActionBar>
      </form>
    </FormProvider>
  );
}

type RouteName = 'primaryEuropean' | 'checkEuropean' | 'primaryAmerican' | 'checkAmerican';

function RouteField({
  name,
  methods,
}: {
  name: RouteName;
  methods: (typeof policyMethods)['european' | 'american'];
}) {
  const { field, fieldState } = useController<PolicyValues>({ name });
  return (
    <View style={styles.cell}>
      <SelectField
        {...field}
        label={policyFormText[name]}
        options={methods.map((value) => ({ value, label: routeLabel(value) }))}
        error={fieldState.error?.message}
      />
    </View>
  );
}

function RefinementSection() {
  const { field } = useController<PolicyValues>({ name: 'by' });
  const by = useWatch<PolicyValues>({ name: 'by' });
  return (
    <Section title={policyFormText.refinementTitle}>
      <ChoiceField
        label={policyFormText.by}
        value={field.value === 'sizes' ? 'sizes' : 'tolerance'}
        options={(['tolerance', 'sizes'] as const).map((value) => ({
          value,
          label: policyFormText.byOptions[value],
        }))}
        onChange={field.onChange}
      />
      {by === 'sizes' ? (
        <>
          <Text size="small" tone="muted">
            {policyFormText.sizesHint}
          </Text>
          <View style={styles.row}>
            {sizeNames.map((name) => (
              <NumberField key={name} name={name} label={policyFormText[name]} />
            ))}
          </View>
        </>
      ) : (
        <View style={styles.row}>
          <NumberField
            name="share"
            label={policyFormText.share}
            unit="%"
            hint={policyFormText.shareHint}
          />
        </View>
      )}
    </Section>
  );
}

function ToleranceSections({ underlyings }: { underlyings: readonly Underlying[] }) {
  return (
    <>
      <Section title={policyFormText.unitTitle}>
        <Text size="small" tone="muted">
          {policyFormText.unitHint}
        </Text>
        <View style={styles.row}>
          {underlyings.map(({ id, symbol, currency, unit }) => (
            <NumberField key={id} name={unitName(id)} label={symbol} unit={`${currency}/${unit}`} />
          ))}
        </View>
      </Section>
      <Section title={policyFormText.moneyTitle}>
        <Text size="small" tone="muted">
          {policyFormText.moneyHint}
        </Text>
        <View style={styles.row}>
          {currenciesOf(underlyings).map((currency) => (
            <NumberField
              key={currency}
              name={moneyName(currency)}
              label={policyFormText.moneyLabel(currency)}
              unit={currency}
            />
          ))}
        </View>
      </Section>
    </>
  );
}

type NumberFieldProps = { name: string; label: string; unit?: string; hint?: string };

function NumberField({ name, ...looks }: NumberFieldProps) {
  const { field, fieldState } = useController<PolicyValues>({ name });
  const { onChange, ...rest } = field;
  return (
    <View style={styles.cell}>
      <TextField
        {...looks}
        {...rest}
        inputMode="decimal"
        selectAllOnFocus
        onChangeText={onChange}
        error={fieldState.error?.message}
      />
    </View>
  );
}

function ReasonField() {
  const { field, fieldState } = useController<PolicyValues>({ name: 'reason' });
  const { onChange, ...rest } = field;
  return (
    <TextAreaField
      {...rest}
      label={policyFormText.reason}
      hint={policyFormText.reasonHint}
      maxLength={500}
      required
      onChangeText={onChange}
      error={fieldState.error?.message}
    />
  );
}

const styles = StyleSheet.create({
  row: { flexDirection: 'row', flexWrap: 'wrap', gap: space.sm },
  cell: { flexGrow: 1, flexShrink: 1, flexBasis: 190 },
});
