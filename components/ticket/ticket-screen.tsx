import { memo, type ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { CautionsSection } from '@/components/price/cautions';
import type { Evidence } from '@/components/price/evidence';
import { GreeksSection } from '@/components/price/greeks-section';
import { RoutesSection } from '@/components/price/routes-section';
import { ActionBar } from '@/components/ui/action-bar';
import { Button } from '@/components/ui/button';
import { Screen } from '@/components/ui/screen';
import { EmptyState, ErrorState, SkeletonRows } from '@/components/ui/states';
import { useWide } from '@/components/ui/use-wide';
import { ticketText } from '@/constants/texts/ticket';
import { color, space } from '@/constants/theme';
import type { DeskAccess } from '@/shared/contracts/sessions';
import type { Underlying } from '@/shared/contracts/underlyings';
import { errorOf } from '@/hooks/error-of';
import { useTicket, type Ticket } from '@/hooks/use-ticket';
import { SaveNotices } from './save-notices';
import { TermsForm } from './terms-form';
import { TicketAnswer, useEvidence } from './ticket-answer';

export type TicketScreenProps = {
  userId: string;
  desk: DeskAccess;
  /** A quote whose terms the ticket begins with. */
  from: string | null;
  onFromTaken: () => void;
};

export function TicketScreen({ userId, desk, from, onFromTaken }: TicketScreenProps) {
  const ticket = useTicket(userId, desk, from, onFromTaken);
  const { underlyings, underlying } = ticket;
  return (
    <Screen title={ticketText.title} measure={1240}>
      {underlying ? (
        <PricedTicket ticket={ticket} desk={desk} underlying={underlying} />
      ) : underlyings.isError && !underlyings.data ? (
        <ErrorState {...errorOf(underlyings.error)} onRetry={() => void underlyings.refetch()} />
      ) : underlyings.data?.length === 0 ? (
        <EmptyState title={ticketText.noUnderlyingsTitle} body={ticketText.noUnderlyingsBody} />
      ) : (
        <SkeletonRows rows={6} height={60} />
      )}
    </Screen>
  );
}

type PricedTicketProps = { ticket: Ticket; desk: DeskAccess; underlying: Underlying };

function PricedTicket({ ticket, desk, underlying }: PricedTicketProps) {
  const wide = useWide();
  const terms = <TermsForm ticket={ticket} underlying={underlying} />;
  const notices = <SaveNotices ticket={ticket} desk={desk} />;
  const answer = <TicketAnswer ticket={ticket} underlying={underlying} />;
  const evidence = <TicketEvidence ticket={ticket} underlying={underlying} />;
  const acts = <Acts ticket={ticket} />;
  if (wide)
    return (
      <View style={styles.columns}>
        <View style={styles.narrowColumn}>
          {terms}
          {acts}
          {notices}
        </View>
        <View style={styles.wideColumn}>
          {answer}
          {evidence}
        </View>
      </View>
    );
  return (
    <>
      <StickyAnswer>{answer}</StickyAnswer>
      {notices}
      {terms}
      {evidence}
      {acts}
    </>
  );
}

function StickyAnswer({ children }: { children: ReactNode }) {
  return <View style={styles.sticky}>{children}</View>;
}

function Acts({ ticket }: { ticket: Ticket }) {
  const { saving, canSave, save } = ticket;
  return (
    <ActionBar>
      <Button
        grow
        label={saveLabel(saving)}
        busy={saving.sending}
        disabled={!canSave || saving.saved !== null}
        onPress={save}
      />
    </ActionBar>
  );
}

function saveLabel({ sending, saved }: Ticket['saving']): string {
  if (sending) return ticketText.saving;
  return saved ? ticketText.savedTitle(saved.quote.number) : ticketText.save;
}

function TicketEvidence({ ticket, underlying }: { ticket: Ticket; underlying: Underlying }) {
  const { compared, price } = ticket.pricing;
  const evidence = useEvidence(ticket, underlying, compared ?? price);
  return evidence ? <EvidenceSections evidence={evidence} /> : null;
}

/** Reads from top to bottom like a note: why it can be trusted, how it moves, what it assumes. */
const EvidenceSections = memo(function EvidenceSections({ evidence }: { evidence: Evidence }) {
  return (
    <>
      <View style={styles.pair}>
        <View style={styles.half}>
          <RoutesSection evidence={evidence} />
        </View>
        <View style={styles.half}>
          <GreeksSection evidence={evidence} />
        </View>
      </View>
      <CautionsSection evidence={evidence} />
    </>
  );
});

const styles = StyleSheet.create({
  columns: { flexDirection: 'row', alignItems: 'flex-start', gap: space.xl },
  narrowColumn: { flexShrink: 0, width: 336, gap: space.lg },
  wideColumn: { flexGrow: 1, flexShrink: 1, flexBasis: 0, minWidth: 0, gap: space.lg },
  sticky: {
    position: 'sticky',
    top: 0,
    zIndex: 8,
    marginHorizontal: -space.md,
    paddingHorizontal: space.md,
    paddingVertical: space.sm,
    marginVertical: -space.sm,
    backgroundColor: color.ground,
  } as object,
  pair: { flexDirection: 'row', flexWrap: 'wrap', gap: space.lg },
  half: { flexGrow: 1, flexShrink: 1, flexBasis: 330, minWidth: 0 },
});
