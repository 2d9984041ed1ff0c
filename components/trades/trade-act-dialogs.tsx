import { zodResolver } from '@hookform/resolvers/zod';
import { useEffect, type ReactNode } from 'react';
import {
  FormProvider,
  useForm,
  useWatch,
  type FieldValues,
  type Path,
  type UseFormReturn,
} from 'react-hook-form';
import { z } from 'zod';
import { ConfirmDialog } from '@/components/ui/confirm-dialog';
import { tradeActText } from '@/constants/texts/trades';
import { forgetForm, keepForm, readKeptForm } from '@/hooks/kept-form';
import { storeKey } from '@/hooks/local-store';
import type { TradeAct } from '@/hooks/use-trades';
import { endpoints } from '@/shared/contracts';
import { tradeClosingSchema, tradeExpirySchema } from '@/shared/contracts/trade-acts';
import type { DeskAccess } from '@/shared/contracts/sessions';
import type { Trade } from '@/shared/contracts/trades';
import { dateInZone } from '@/shared/dates';
import { formatMoney } from '@/shared/format/money';
import { parseDecimal } from '@/shared/format/parse';
import { mayEnd } from '@/shared/trade-moves';
import { typedDecimal } from './deal-form';
import { FieldRow, FormArea, FormChoice, FormText } from './form-fields';
import { useTradeConfirmation } from './use-trade-confirmation';

export type TradeActDialogProps = {
  kind: TradeAct['kind'];
  trade: Trade;
  desk: DeskAccess;
  userId: string;
  onClose: () => void;
  onDone: () => void;
};

type DialogProps = Omit<TradeActDialogProps, 'kind'>;

/** The dialog of a binding act: its fields, and what exactly will happen. */
export function TradeActDialog({ kind, ...rest }: TradeActDialogProps) {
  switch (kind) {
    case 'approve':
      return <ApproveDialog {...rest} />;
    case 'return':
      return <ReturnDialog {...rest} />;
    case 'close':
      return <CloseDialog {...rest} />;
    case 'expire':
      return <ExpireDialog {...rest} />;
  }
}

type ActFormProps<Values extends FieldValues, Read> = DialogProps & {
  kind: TradeAct['kind'];
  /** Where what is typed outlives a reload, until the act is on record. */
  keptAs?: string;
  form: UseFormReturn<Values, unknown, Read>;
  actOf: (values: Read) => TradeAct;
  sentences: readonly string[];
  danger?: boolean;
  children?: ReactNode;
};

const keptAsOf = (act: string, { trade, userId, desk }: DialogProps) =>
  storeKey(`trade-${act}.${trade.id}`, userId, desk.id);

function ActForm<Values extends FieldValues, Read>(props: ActFormProps<Values, Read>) {
  const { kind, keptAs, form, trade, desk, actOf, sentences, onClose, onDone } = props;
  const { confirm, ...confirmation } = useTradeConfirmation(desk.id, trade, () => {
    if (keptAs) forgetForm(keptAs);
    onDone();
  });
  const { subscribe } = form;
  useEffect(() => {
    if (!keptAs) return;
    const callback = ({ values }: { values: Values }) => keepForm(keptAs, values);
    return subscribe({ formState: { values: true }, callback });
  }, [subscribe, keptAs]);
  const fields = Object.keys(form.getValues());
  const submit = form.handleSubmit((values) =>
    confirm(actOf(values), (path, message) => {
      if (!fields.includes(path)) return false;
      form.setError(path as Path<Values>, { message });
      return true;
    }),
  );
  const { willHappen: title, recorded: foot } = tradeActText;
  return (
    <FormProvider {...form}>
      <ConfirmDialog
        {...confirmation}
        title={`${tradeActText[kind]}: ${trade.number}`}
        act={tradeActText[kind]}
        danger={props.danger}
        willHappen={{ title, sentences, foot }}
        onSubmit={(event) => void submit(event)}
        onClose={onClose}
      >
        {props.children}
      </ConfirmDialog>
    </FormProvider>
  );
}

function ApproveDialog(props: DialogProps) {
  const { trade } = props;
  const form = useForm();
  return (
    <ActForm
      {...props}
      kind="approve"
      form={form}
      actOf={() => ({ kind: 'approve', body: { version: trade.version } })}
      sentences={[
        trade.status === 'amended'
          ? tradeActText.willReplace(trade.number)
          : tradeActText.willApprove(trade.number, trade.book.code),
      ]}
    />
  );
}

const returnForm = endpoints.returnTrade.body.omit({ version: true });

const ReasonArea = () => (
  <FormArea
    name="reason"
    label={tradeActText.reason}
    hint={tradeActText.reasonHint}
    maxLength={500}
    required
  />
);

function ReturnDialog(props: DialogProps) {
  const { trade } = props;
  const keptAs = keptAsOf('return', props);
  const form = useForm({
    resolver: zodResolver(returnForm),
    defaultValues: readKeptForm(keptAs, { reason: '' }),
  });
  const will =
    trade.status === 'amended' ? tradeActText.willReturnAmendment : tradeActText.willReturn;
  return (
    <ActForm
      {...props}
      kind="return"
      keptAs={keptAs}
      form={form}
      actOf={(values) => ({ kind: 'return', body: { ...values, version: trade.version } })}
      sentences={[will(trade.number, trade.versions[0].proposedBy.name)]}
    >
      <ReasonArea />
    </ActForm>
  );
}

const todayAt = ({ timeZone }: DeskAccess) => dateInZone(Date.now(), timeZone);

const closeForm = tradeClosingSchema.omit({ version: true }).extend({
  amount: typedDecimal.pipe(tradeClosingSchema.shape.amount),
  currency: z.string().trim().toUpperCase().pipe(tradeClosingSchema.shape.currency),
});

function amountWords(amount: string, currency: string): string {
  const parsed = parseDecimal(amount);
  const known = parsed.ok && /^[A-Z]{3}$/.test(currency);
  return known ? formatMoney(parsed.value, currency, 'always') : '…';
}

function CloseDialog(props: DialogProps) {
  const { trade, desk } = props;
  const keptAs = keptAsOf('close', props);
  const form = useForm({
    resolver: zodResolver(closeForm),
    defaultValues: readKeptForm(keptAs, {
      date: todayAt(desk),
      amount: '',
      currency: trade.underlying.currency,
      reason: '',
    }),
  });
  const [date, amount, currency] = useWatch({
    control: form.control,
    name: ['date', 'amount', 'currency'],
  });
  const money = amountWords(amount, currency.trim().toUpperCase());
  return (
    <ActForm
      {...props}
      danger
      kind="close"
      keptAs={keptAs}
      form={form}
      actOf={(values) => ({ kind: 'close', body: { ...values, version: trade.version } })}
      sentences={[tradeActText.willClose(trade.number, money, date)]}
    >
      <FormText name="date" label={tradeActText.closingDate} required />
      <FieldRow>
        <FormText
          name="amount"
          label={tradeActText.closingAmount}
          hint={tradeActText.closingHint}
          inputMode="decimal"
          required
        />
        <FormText name="currency" label={tradeActText.currency} maxLength={3} required />
      </FieldRow>
      <ReasonArea />
    </ActForm>
  );
}

const expireForm = tradeExpirySchema.omit({ version: true });

/** What can have become of the option by now. */
function outcomesOf({ exercise, expiryAt }: Trade) {
  const all = ['lapsed', 'exercised'] as const;
  const now = Date.now();
  return all.map((value) => ({
    value,
    label: tradeActText[value],
    disabled: !mayEnd(value, exercise, Date.parse(expiryAt), now),
  }));
}

function ExpireDialog(props: DialogProps) {
  const { trade, desk } = props;
  const outcomes = outcomesOf(trade);
  const today = todayAt(desk);
  const form = useForm({
    resolver: zodResolver(expireForm),
    defaultValues: {
      outcome: outcomes.find(({ disabled }) => !disabled)?.value ?? 'lapsed',
      date: trade.expiryDate < today ? trade.expiryDate : today,
    },
  });
  const [outcome, date] = useWatch({ control: form.control, name: ['outcome', 'date'] });
  return (
    <ActForm
      {...props}
      danger
      kind="expire"
      form={form}
      actOf={(values) => ({ kind: 'expire', body: { ...values, version: trade.version } })}
      sentences={[
        tradeActText.willExpire(trade.number, tradeActText[outcome], date),
        ...(trade.status === 'amended' ? [tradeActText.dropsAmendment] : []),
        ...(outcomes.some(({ disabled }) => disabled) ? [tradeActText.early] : []),
      ]}
    >
      <FormChoice name="outcome" label={tradeActText.outcome} options={outcomes} />
      <FormText name="date" label={tradeActText.closingDate} required />
    </ActForm>
  );
}
