import { useEffect, useState } from 'react';
import { AnswerCard, AnswerPlaceholder } from '@/components/price/answer-card';
import { findingOf } from '@/components/charts/agreement-finding';
import { agreementOf, answerOf, decimalsOf, type Evidence } from '@/components/price/evidence';
import { LiveRegion } from '@/components/ui/live-region';
import { fieldName, ticketText } from '@/constants/texts/ticket';
import type { Underlying } from '@/shared/contracts/underlyings';
import { formatErrorEstimate, formatNumber } from '@/shared/format/numbers';
import type { IndicativePrice } from '@/hooks/use-indicative-price';
import type { Ticket } from '@/hooks/use-ticket';

/** The ticket's price with what speaks for it; null before the first route has come in. */
export function evidenceOf(
  ticket: Ticket,
  underlying: Underlying,
  price: IndicativePrice | null,
): Evidence | null {
  if (!price || price.routes.length === 0) return null;
  const first = price.routes.find(({ result }) => result.ok) ?? price.routes[0];
  const { quantity, contractSize } = ticket.reading.position;
  return {
    routes: price.routes,
    primary: first.name,
    verdict: price.comparison?.verdict ?? null,
    refuted: price.comparison?.refuted ?? false,
    tolerance: price.tolerance,
    underlying,
    exercise: price.request.contract.exercise,
    position:
      quantity === undefined || contractSize === undefined
        ? null
        : { direction: ticket.draft.direction, quantity, contractSize },
  };
}

export function TicketAnswer({ ticket, underlying }: { ticket: Ticket; underlying: Underlying }) {
  const { pricing, stopping } = ticket;
  const newest = evidenceOf(ticket, underlying, pricing.price);
  const settled = pricing.compared === pricing.price ? null : pricing.compared;
  const compared = evidenceOf(ticket, underlying, settled);
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
      <AnswerCard
        evidence={newest}
        compared={compared ?? undefined}
        staleReason={stopping ? staleWords(fieldName(stopping)) : undefined}
      />
      <SpokenPrice evidence={compared ?? newest} />
    </>
  );
}

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
