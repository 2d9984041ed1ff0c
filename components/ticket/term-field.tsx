import type { ReactNode } from 'react';
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
export function TermField({ ticket, field, label, unit, hint, ...places }: TermFieldProps) {
  const { draft, dispatch, errors } = ticket;
  return (
    <View style={styles.cell}>
      <TextField
        name={field}
        label={label}
        unit={unit}
        hint={hint}
        {...places}
        value={draft.texts[field]}
        error={errors[field]}
        inputMode={field === 'expiry' ? 'text' : 'decimal'}
        maxLength={40}
        selectAllOnFocus
        onChangeText={(text) => dispatch({ type: 'type', field, text })}
        onStep={(steps) => dispatch({ type: 'step', field, steps })}
      />
    </View>
  );
}

const styles = StyleSheet.create({
  cell: { flexGrow: 1, flexShrink: 1, flexBasis: 160 },
});
