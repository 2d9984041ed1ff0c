import { memo, useEffect, useMemo, useState } from 'react';
import { AnswerCard, AnswerPlaceholder } from '@/components/price/answer-card';
import { findingOf } from '@/components/charts/agreement-finding';
import { agreementOf, answerOf, decimalsOf, type Evidence } from '@/components/price/evidence';
import { LiveRegion } from '@/components/ui/live-region';
import { fieldName, ticketText } from '@/constants/texts/ticket';
import type { Underlying } from '@/shared/contracts/underlyings';
import { formatErrorEstimate, formatNumber } from '@/shared/format/numbers';
import type { IndicativePrice } from '@/hooks/use-indicative-price';
import type { Ticket } from '@/hooks/use-ticket';

/**
 * The ticket's price with what speaks for it; null before the first route has come in. It stays
 * the same object while nothing of it changes, so that a key stroke draws only what it moves.
 */
export function useEvidence(
  ticket: Ticket,
  underlying: Underlying,
  price: IndicativePrice | null,
): Evidence | null {
  const { direction } = ticket.draft;
  const { quantity, contractSize } = ticket.reading.position;
  return useMemo(() => {
    if (!price || price.routes.length === 0) return null;
    const first = price.routes.find(({ result }) => result.ok) ?? price.routes[0];
    const known = quantity !== undefined && contractSize !== undefined;
    return {
      routes: price.routes,
      primary: first.name,
      verdict: price.comparison?.verdict ?? null,
      refuted: price.comparison?.refuted ?? false,
      tolerance: price.tolerance,
      underlying,
      exercise: price.request.contract.exercise,
      position: known ? { direction, quantity, contractSize } : null,
    };
  }, [price, underlying, direction, quantity, contractSize]);
}

export function TicketAnswer({ ticket, underlying }: { ticket: Ticket; underlying: Underlying }) {
  const { pricing, stopping } = ticket;
  const newest = useEvidence(ticket, underlying, pricing.price);
  const settled = pricing.compared === pricing.price ? null : pricing.compared;
  const compared = useEvidence(ticket, underlying, settled);
  if (pricing.failed) return <AnswerPlaceholder>{ticketText.workerFailed}</AnswerPlaceholder>;
  if (!newest)
    return (
      <AnswerPlaceholder>
        {stopping ? ticketText.stoppedBy(fieldName(stopping)) : ticketText.firstPrice}
      </AnswerPlaceholder>
    );
  const staleWords = pricing.current ? ticketText.stoppedBy : ticketText.staleBecause;
  return (
    <>
      <MemoizedCard
        evidence={newest}
        compared={compared ?? undefined}
        staleReason={stopping ? staleWords(fieldName(stopping)) : undefined}
      />
      <SpokenPrice evidence={compared ?? newest} />
    </>
  );
}

const MemoizedCard = memo(AnswerCard);

/** Long enough that a price is read out once typing rests, not at every key. */
const spokenAfterMs = 900;

function SpokenPrice({ evidence }: { evidence: Evidence }) {
  const words = spokenWords(evidence);
  const [spoken, setSpoken] = useState('');
  useEffect(() => {
    const timer = setTimeout(() => setSpoken(words), spokenAfterMs);
    return () => clearTimeout(timer);
  }, [words]);
  return <LiveRegion text={spoken} />;
}

function spokenWords(evidence: Evidence): string {
  const answer = answerOf(evidence);
  const { currency, unit } = evidence.underlying;
  if (!answer || evidence.verdict === null) return '';
  return ticketText.live(
    formatNumber(answer.value, decimalsOf(evidence)),
    ticketText.perUnit(currency, unit),
    formatErrorEstimate(answer.errorEstimate),
    findingOf(agreementOf(evidence, evidence.verdict)),
  );
}
