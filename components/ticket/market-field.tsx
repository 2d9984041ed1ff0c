import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { LinkButton } from '@/components/ui/text-field';
import { Text } from '@/components/ui/text';
import { ticketText } from '@/constants/texts/ticket';
import { space } from '@/constants/theme';
import type { Underlying } from '@/shared/contracts/underlyings';
import { closeTextBeside, type MarketTextField } from '@/hooks/ticket-draft';
import type { Ticket } from '@/hooks/use-ticket';
import { VolatilityDialog } from './solve-dialogs';
import { TermField } from './term-field';

export type MarketFieldProps = { ticket: Ticket; underlying: Underlying; field: MarketTextField };

function labelOf(field: MarketTextField, kind: Underlying['kind']): string {
  if (field === 'spot') return ticketText.spot(kind);
  if (field === 'yield') return ticketText.yield(kind);
  return ticketText[field];
}

/** A market number; where it was changed, what the close says stands beside it. */
export function MarketField({ ticket, underlying, field }: MarketFieldProps) {
  const [solving, setSolving] = useState(false);
  const closeText = closeTextBeside(ticket.draft, field);
  const unit = field === 'spot' ? undefined : ticketText.percent;
  return (
    <>
      <TermField
        ticket={ticket}
        field={field}
        label={labelOf(field, underlying.kind)}
        unit={unit}
        hint={closeText === null ? undefined : ticketText.closeSays(closeText, unit)}
        labelAction={
          field === 'volatility' ? (
            <LinkButton label={ticketText.fromPremium} onPress={() => setSolving(true)} />
          ) : undefined
        }
      />
      {solving ? (
        <VolatilityDialog
          ticket={ticket}
          underlying={underlying}
          onClose={() => setSolving(false)}
        />
      ) : null}
    </>
  );
}

/** Where the market data of the ticket came from, and whether there is a later close. */
export function CloseNote({ ticket, underlying }: Omit<MarketFieldProps, 'field'>) {
  const { source } = ticket.draft;
  const { close } = underlying;
  return (
    <View style={styles.note}>
      <Text size="small" tone="muted" tabular>
        {sourceWords(source)}
      </Text>
      {ticket.newerClose && close ? (
        <View style={styles.newer}>
          <Text size="small" tone="muted" tabular>
            {ticketText.newerClose(close.date)}
          </Text>
          <LinkButton
            label={ticketText.useClose}
            onPress={() => ticket.dispatch({ type: 'use-close', underlying })}
          />
        </View>
      ) : null}
    </View>
  );
}

function sourceWords(source: Ticket['draft']['source']): string {
  switch (source.kind) {
    case 'close':
      return ticketText.marketOfClose(source.date);
    case 'quote':
      return ticketText.marketOfQuote(source.number);
    case 'typed':
      return ticketText.noClose;
  }
}

const styles = StyleSheet.create({
  note: { flexDirection: 'row', flexWrap: 'wrap', columnGap: space.md, paddingHorizontal: 2 },
  newer: { flexDirection: 'row', gap: space.sm, alignItems: 'baseline' },
});
