import { memo, type ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { TextField } from '@/components/ui/text-field';
import type { TicketTextField } from '@/hooks/ticket-draft';
import type { Ticket } from '@/hooks/use-ticket';

export type TermFieldProps = {
  ticket: Ticket;
  field: TicketTextField;
  label: string;
  unit?: string;
  trailing?: ReactNode;
  labelAction?: ReactNode;
  hint?: string;
};

/** One typed term: numeric keyboard, everything selected on focus, arrow keys step. */
export function TermField({ ticket, field, ...looks }: TermFieldProps) {
  const { draft, dispatch, errors } = ticket;
  return (
    <TermInput
      {...looks}
      field={field}
      text={draft.texts[field]}
      error={errors[field]}
      dispatch={dispatch}
    />
  );
}

type TermInputProps = Omit<TermFieldProps, 'ticket'> & {
  text: string;
  error?: string;
  dispatch: Ticket['dispatch'];
};

/** Drawn again only when its own text changes: a price arrives at each key stroke. */
const TermInput = memo(function TermInput({ field, text, dispatch, ...looks }: TermInputProps) {
  return (
    <View style={styles.cell}>
      <TextField
        {...looks}
        name={field}
        value={text}
        inputMode={field === 'expiry' ? 'text' : 'decimal'}
        maxLength={40}
        selectAllOnFocus
        onChangeText={(typed) => dispatch({ type: 'type', field, text: typed })}
        onStep={(steps) => dispatch({ type: 'step', field, steps })}
      />
    </View>
  );
});

const styles = StyleSheet.create({
  cell: { flexGrow: 1, flexShrink: 1, flexBasis: 160 },
});
