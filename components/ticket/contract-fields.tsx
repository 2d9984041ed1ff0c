import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { ChoiceField, SelectField } from '@/components/ui/select-field';
import { LinkButton } from '@/components/ui/text-field';
import { ticketText } from '@/constants/texts/ticket';
import { optionKinds, pricedExercises } from '@/pricing/contract';
import type { Underlying } from '@/shared/contracts/underlyings';
import type { Ticket } from '@/hooks/use-ticket';
import { StrikeDialog } from './solve-dialogs';
import { TermField } from './term-field';

export type ContractFieldsProps = { ticket: Ticket; underlying: Underlying };

/** What the option is: kind, exercise, strike, expiry. */
export function ContractFields({ ticket, underlying }: ContractFieldsProps) {
  const { draft, dispatch, reading } = ticket;
  const [solving, setSolving] = useState(false);
  const { expiryDate } = reading;
  const resolved = expiryDate !== null && expiryDate !== draft.texts.expiry.trim();
  return (
    <>
      <View style={styles.cell}>
        <ChoiceField
          label={ticketText.kind}
          value={draft.kind}
          options={optionKinds.map((kind) => ({ value: kind, label: ticketText.kinds[kind] }))}
          onChange={(kind) => dispatch({ type: 'choose-kind', kind })}
        />
      </View>
      <View style={styles.cell}>
        <SelectField
          label={ticketText.exercise}
          value={draft.exercise}
          options={pricedExercises.map((exercise) => ({
            value: exercise,
            label: ticketText.exercises[exercise],
          }))}
          onChange={(exercise) => dispatch({ type: 'choose-exercise', exercise })}
        />
      </View>
      <TermField
        ticket={ticket}
        field="strike"
        label={ticketText.strike}
        labelAction={<LinkButton label={ticketText.fromDelta} onPress={() => setSolving(true)} />}
      />
      <TermField
        ticket={ticket}
        field="expiry"
        label={ticketText.expiry}
        trailing={resolved ? expiryDate : undefined}
      />
      {solving ? (
        <StrikeDialog ticket={ticket} underlying={underlying} onClose={() => setSolving(false)} />
      ) : null}
    </>
  );
}

const styles = StyleSheet.create({
  cell: { flexGrow: 1, flexShrink: 1, flexBasis: 160 },
});
