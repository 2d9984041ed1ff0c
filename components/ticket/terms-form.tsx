import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { ChoiceField, SelectField } from '@/components/ui/select-field';
import { LinkButton, TextAreaField } from '@/components/ui/text-field';
import { Text } from '@/components/ui/text';
import { useWide } from '@/components/ui/use-wide';
import { ticketText } from '@/constants/texts/ticket';
import { space } from '@/constants/theme';
import type { Underlying } from '@/shared/contracts/underlyings';
import type { FieldErrors, TicketField } from '@/hooks/ticket-terms';
import type { Ticket } from '@/hooks/use-ticket';
import { ContractFields } from './contract-fields';
import { CloseNote, MarketField } from './market-field';
import { TermField } from './term-field';

export type TermsFormProps = {
  ticket: Ticket;
  underlying: Underlying;
  /** Only what the value of one unit depends on: nothing of a position. */
  unitOnly?: boolean;
};

const rareFields: readonly TicketField[] = ['rate', 'yield', 'contractSize', 'note'];

/** Terms of a position that are wrong are shown even where only a unit is priced. */
const hasPositionError = ({ quantity, contractSize, note }: FieldErrors) =>
  [quantity, contractSize, note].some((error) => error !== undefined);

const hasRareError = (errors: FieldErrors) =>
  rareFields.some((field) => errors[field] !== undefined);

/** The terms in pairs; on a phone the rarer ones are folded until wanted or wrong. */
export function TermsForm({ ticket, underlying, unitOnly: asked = false }: TermsFormProps) {
  const wide = useWide();
  const unitOnly = asked && !hasPositionError(ticket.errors);
  const [unfolded, setUnfolded] = useState(false);
  const rareShown = wide || unfolded || hasRareError(ticket.errors);
  return (
    <View style={styles.form}>
      <UnderlyingField ticket={ticket} underlying={underlying} />
      <View style={styles.pairs}>
        <ContractFields ticket={ticket} underlying={underlying} />
        <MarketField ticket={ticket} underlying={underlying} field="spot" />
        <MarketField ticket={ticket} underlying={underlying} field="volatility" />
        {unitOnly ? null : <DirectionField ticket={ticket} />}
        {unitOnly ? null : (
          <TermField ticket={ticket} field="quantity" label={ticketText.quantity} />
        )}
        {rareShown ? (
          <RareFields ticket={ticket} underlying={underlying} unitOnly={unitOnly} />
        ) : null}
      </View>
      {wide ? null : (
        <View style={styles.fold}>
          <LinkButton
            label={rareShown ? ticketText.fewerTerms : ticketText.moreTerms}
            expanded={rareShown}
            onPress={() => setUnfolded(!rareShown)}
          />
          {rareShown ? null : (
            <RareSummary ticket={ticket} underlying={underlying} unitOnly={unitOnly} />
          )}
        </View>
      )}
    </View>
  );
}

function UnderlyingField({ ticket, underlying }: TermsFormProps) {
  const { draft, dispatch, errors } = ticket;
  const all = ticket.underlyings.data ?? [];
  return (
    <View style={styles.form}>
      <SelectField
        label={ticketText.underlying}
        value={underlying.id}
        options={all.map(({ id, name, symbol }) => ({ value: id, label: `${name} (${symbol})` }))}
        error={errors.underlying}
        onChange={(id) => {
          const chosen = all.find((one) => one.id === id);
          if (chosen && id !== draft.underlyingId)
            dispatch({ type: 'choose-underlying', underlying: chosen });
        }}
      />
      <CloseNote ticket={ticket} underlying={underlying} />
    </View>
  );
}

function DirectionField({ ticket: { draft, dispatch } }: { ticket: Ticket }) {
  return (
    <View style={styles.cell}>
      <ChoiceField
        label={ticketText.direction}
        value={draft.direction}
        options={[
          { value: 'buy', label: ticketText.directions.buy },
          { value: 'sell', label: ticketText.directions.sell },
        ]}
        onChange={(direction) => dispatch({ type: 'choose-direction', direction })}
      />
    </View>
  );
}

function RareFields({ ticket, underlying, unitOnly }: TermsFormProps) {
  return (
    <>
      <MarketField ticket={ticket} underlying={underlying} field="rate" />
      {underlying.kind === 'future' ? null : (
        <MarketField ticket={ticket} underlying={underlying} field="yield" />
      )}
      {unitOnly ? null : <PositionFields ticket={ticket} underlying={underlying} />}
    </>
  );
}

function PositionFields({ ticket, underlying }: TermsFormProps) {
  const { draft, dispatch, errors } = ticket;
  return (
    <>
      <TermField
        ticket={ticket}
        field="contractSize"
        label={ticketText.contractSize}
        unit={underlying.unit}
      />
      <View style={styles.whole}>
        <TextAreaField
          label={ticketText.note}
          value={draft.note}
          error={errors.note}
          maxLength={500}
          onChangeText={(text) => dispatch({ type: 'note', text })}
        />
      </View>
    </>
  );
}

/** What the folded terms say, so that nothing that moves the price is out of sight. */
function RareSummary({ ticket: { draft }, underlying, unitOnly }: TermsFormProps) {
  const { texts } = draft;
  const carry =
    underlying.kind === 'future' ? [] : [`${ticketText.yield(underlying.kind)} ${texts.yield} %`];
  const words = [
    `${ticketText.rate} ${texts.rate} %`,
    ...carry,
    ...(unitOnly ? [] : [`${texts.contractSize} ${underlying.unit}`]),
  ];
  return (
    <Text size="small" tone="muted" tabular style={styles.summary}>
      {words.join(' · ')}
    </Text>
  );
}

const styles = StyleSheet.create({
  form: { gap: space.sm },
  pairs: { flexDirection: 'row', flexWrap: 'wrap', gap: space.sm },
  cell: { flexGrow: 1, flexShrink: 1, flexBasis: 160 },
  whole: { flexBasis: '100%' },
  fold: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    alignItems: 'center',
    columnGap: space.md,
    minHeight: 44,
  },
  summary: { flexShrink: 1, marginLeft: 'auto' },
});
