import { useEffect, useRef } from 'react';
import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { Text } from '@/components/ui/text';
import { ticketText } from '@/constants/texts/ticket';
import { uiText } from '@/constants/texts/ui';
import { space } from '@/constants/theme';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { formatInstant } from '@/shared/format/dates';
import { formatDifference, formatQuantity, valueDecimals } from '@/shared/format/numbers';
import { optionTerms } from '@/shared/format/terms';
import type { KeptQuote } from '@/hooks/kept-quotes';
import type { SavedQuote } from '@/hooks/use-quote-saving';
import type { Ticket } from '@/hooks/use-ticket';

/** What became of a quote: saved, refused, or kept until the server answers. */
export function SaveNotices({ ticket, desk }: { ticket: Ticket; desk: DeskAccess }) {
  const { saved, refused, kept } = ticket.saving;
  const place = useRef<HTMLDivElement>(null);
  const outcome = saved?.quote.id ?? refused?.requestId ?? (kept.length > 0 ? kept.length : null);
  const before = useRef(outcome);
  useEffect(() => {
    // Only what has just happened is brought into view, not what a reload finds again.
    if (outcome !== null && outcome !== before.current)
      place.current?.scrollIntoView({ block: 'nearest' });
    before.current = outcome;
  }, [outcome]);
  if (outcome === null && ticket.kept) return null;
  return (
    <div ref={place} className="outcome">
      {saved ? <SavedNotice saved={saved} desk={desk} /> : null}
      {refused ? (
        <Notice
          tone="brick"
          title={ticketText.refusedTitle}
          body={
            <View>
              <Text>{ticket.complaints[0] ?? refused.message}</Text>
              {refused.requestId ? (
                <Text size="small" tone="muted" mono>
                  {uiText.requestId(refused.requestId)}
                </Text>
              ) : null}
            </View>
          }
        />
      ) : null}
      {kept.length > 0 ? <KeptNotice ticket={ticket} desk={desk} /> : null}
      {ticket.kept ? null : <Notice tone="ochre" title={ticketText.storageFull} />}
    </div>
  );
}

function SavedNotice({ saved: { quote, sent }, desk }: { saved: SavedQuote; desk: DeskAccess }) {
  const same = Object.is(quote.value, sent.indicativeValue);
  const decimals = valueDecimals(quote.tolerance, quote.underlying.priceDecimals);
  const shown = (value: number) => formatQuantity(value, decimals, 17);
  const words = same
    ? ticketText.sameBits
    : ticketText.otherBits(
        shown(quote.value),
        shown(sent.indicativeValue),
        formatDifference(quote.value - sent.indicativeValue, decimals),
      );
  return (
    <Notice
      tone={same ? 'moss' : 'ochre'}
      title={ticketText.savedTitle(quote.number)}
      body={words}
      action={
        <View style={styles.acts}>
          <Button
            kind="secondary"
            label={ticketText.openQuote}
            href={`/desks/${desk.id}/quotes/${quote.id}`}
          />
          {desk.permissions.includes('propose-trades') ? (
            <Button
              label={ticketText.proposeTrade}
              href={`/desks/${desk.id}/quotes/${quote.id}/propose`}
            />
          ) : null}
        </View>
      }
    />
  );
}

function KeptNotice({ ticket, desk }: { ticket: Ticket; desk: DeskAccess }) {
  const { kept } = ticket.saving;
  return (
    <Notice
      tone="ochre"
      title={kept.length === 1 ? ticketText.keptTitle : ticketText.keptTitles(kept.length)}
      body={
        <View style={styles.kept}>
          <Text>{ticketText.keptBody}</Text>
          {kept.map((quote) => (
            <KeptLine key={quote.idempotencyKey} quote={quote} ticket={ticket} desk={desk} />
          ))}
        </View>
      }
    />
  );
}

type KeptLineProps = { quote: KeptQuote; ticket: Ticket; desk: DeskAccess };

function KeptLine({ quote, ticket, desk }: KeptLineProps) {
  const { body, keptAt } = quote;
  const name = ticket.underlyings.data?.find(({ id }) => id === body.underlyingId)?.name ?? '';
  const at = formatInstant(keptAt, desk.timeZone);
  return (
    <View style={styles.line}>
      <Text tabular>{ticketText.keptLine(`${name} ${optionTerms(body)}`, at)}</Text>
      <View style={styles.acts}>
        <Button
          kind="secondary"
          label={ticketText.retry}
          onPress={() => ticket.saving.retry(quote)}
        />
        <Button
          kind="quiet"
          label={ticketText.discard}
          onPress={() => ticket.saving.discard(quote)}
        />
      </View>
    </View>
  );
}

const styles = StyleSheet.create({
  kept: { gap: space.sm },
  line: { gap: space.sm },
  acts: { flexDirection: 'row', flexWrap: 'wrap', gap: space.sm },
});
