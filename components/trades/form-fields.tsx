import { Children, type ReactNode } from 'react';
import { useController } from 'react-hook-form';
import { StyleSheet, View } from 'react-native';
import { SelectField, type Option } from '@/components/ui/select-field';
import {
  TextAreaField,
  TextField,
  type TextAreaFieldProps,
  type TextFieldProps,
} from '@/components/ui/text-field';
import { tradeFormText, tradeText } from '@/constants/texts/trades';
import { space } from '@/constants/theme';

/** The fields of a form of texts; each stands in the form around it by its name. */
type Texts = Record<string, string>;

type FormTextProps = { name: string } & Pick<
  TextFieldProps,
  'label' | 'hint' | 'inputMode' | 'maxLength' | 'required' | 'unit' | 'trailing'
>;

export function FormText({ name, ...looks }: FormTextProps) {
  const { field, fieldState } = useController<Texts>({ name });
  const { onChange, ...rest } = field;
  return (
    <TextField
      {...looks}
      {...rest}
      selectAllOnFocus={looks.inputMode === 'decimal'}
      onChangeText={onChange}
      error={fieldState.error?.message}
    />
  );
}

export function FormChoice({
  name,
  label,
  options,
}: {
  name: string;
  label: string;
  options: readonly Option<string>[];
}) {
  const { field, fieldState } = useController<Texts>({ name });
  return (
    <SelectField {...field} label={label} options={options} error={fieldState.error?.message} />
  );
}

type FormAreaProps = { name: string } & Pick<
  TextAreaFieldProps,
  'label' | 'hint' | 'maxLength' | 'required'
>;

export function FormArea({ name, ...looks }: FormAreaProps) {
  const { field, fieldState } = useController<Texts>({ name });
  const { onChange, ...rest } = field;
  return (
    <TextAreaField {...looks} {...rest} onChangeText={onChange} error={fieldState.error?.message} />
  );
}

/** Fields side by side where there is room for each. */
export function FieldRow({ children, basis = 150 }: { children: ReactNode; basis?: number }) {
  return (
    <View style={styles.row}>
      {Children.map(children, (field) => (
        <View style={[styles.cell, { flexBasis: basis }]}>{field}</View>
      ))}
    </View>
  );
}

/** What was agreed besides the option itself. */
export function DealFields({ zone, serverValue }: { zone: string; serverValue?: string }) {
  const { fields } = tradeText;
  return (
    <>
      <FormText
        name="counterparty"
        label={fields.counterparty}
        hint={tradeFormText.counterpartyHint}
        maxLength={120}
        required
      />
      <FieldRow>
        <FormText
          name="premiumAmount"
          label={fields.premiumAmount}
          inputMode="decimal"
          hint={serverValue}
          required
        />
        <FormText name="premiumCurrency" label={tradeText.fields.premiumCurrency} maxLength={3} />
      </FieldRow>
      <FieldRow basis={260}>
        <FormText
          name="premiumDate"
          label={fields.premiumDate}
          hint={tradeFormText.premiumDateHint}
        />
        <FormText name="tradedAt" label={fields.tradedAt} hint={tradeFormText.tradedAtHint(zone)} />
      </FieldRow>
      <FormArea name="note" label={tradeFormText.noteLabel} maxLength={500} />
    </>
  );
}

const styles = StyleSheet.create({
  row: { flexDirection: 'row', flexWrap: 'wrap', gap: space.sm },
  cell: { flexGrow: 1, flexShrink: 1 },
});
