import { useState } from 'react';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { Text } from '@/components/ui/text';
import { TextField } from '@/components/ui/text-field';
import { fieldName, ticketText } from '@/constants/texts/ticket';
import type { OptionKind } from '@/pricing/contract';
import type { Underlying } from '@/shared/contracts/underlyings';
import { valueDecimals } from '@/shared/format/numbers';
import {
  parseNumber,
  roundedNumberText,
  roundedPercentText,
  type Parsed,
} from '@/shared/format/parse';
import type { Solution } from '@/hooks/pricing-messages';
import { requestFor } from '@/hooks/ticket-terms';
import { useSolution } from '@/hooks/use-solution';
import { answerOfTicket, type Ticket } from '@/hooks/use-ticket';

type SolveProps = { ticket: Ticket; underlying: Underlying; onClose: () => void };

/** Decimals of a percent that put the premium within a hundredth of any tolerance in use. */
const volatilityDecimals = 4;

export function VolatilityDialog({ ticket, underlying, onClose }: SolveProps) {
  const { tolerance, priceDecimals, currency, unit } = underlying;
  const shown = answerOfTicket(ticket.pricing);
  const decimals = valueDecimals(tolerance, priceDecimals);
  const [text, setText] = useState(shown ? roundedNumberText(shown.value, decimals) : '');
  const premium = readTyped(text, ticketText.missingPremium);
  const question = requestFor('volatility', ticket.reading);
  const solution = useSolution(
    question.ok && premium.ok
      ? { kind: 'volatility', request: question.request, premium: premium.value }
      : null,
  );
  const found = solution?.ok ? roundedPercentText(solution.value, volatilityDecimals) : null;
  return (
    <SolveDialog
      title={ticketText.fromPremiumTitle}
      body={ticketText.fromPremiumBody}
      label={ticketText.premium}
      unit={ticketText.perUnit(currency, unit)}
      text={text}
      onChangeText={setText}
      outcome={outcomeOf(
        question,
        premium,
        solution,
        found && ticketText.volatilityFound(`${found} ${ticketText.percent}`),
      )}
      found={found}
      onTake={(volatility) => {
        ticket.dispatch({ type: 'type', field: 'volatility', text: volatility });
        onClose();
      }}
      onClose={onClose}
    />
  );
}

/** A put's delta is negative whether or not the sign is typed: people say `25 delta put`. */
const signedDelta = (typed: number, kind: OptionKind) =>
  kind === 'put' ? -Math.abs(typed) : typed;

export function StrikeDialog({ ticket, underlying, onClose }: SolveProps) {
  const { kind } = ticket.draft;
  const shown = answerOfTicket(ticket.pricing);
  const [text, setText] = useState(shown ? roundedNumberText(shown.greeks.delta, 2) : '');
  const delta = readTyped(text, ticketText.missingDelta);
  const question = requestFor('strike', ticket.reading);
  const solution = useSolution(
    question.ok && delta.ok
      ? { kind: 'strike', request: question.request, delta: signedDelta(delta.value, kind) }
      : null,
  );
  const found = solution?.ok
    ? roundedNumberText(solution.value, underlying.priceDecimals + 2)
    : null;
  return (
    <SolveDialog
      title={ticketText.fromDeltaTitle}
      body={ticketText.fromDeltaBody}
      label={ticketText.delta}
      unit={ticketText.perOne}
      text={text}
      onChangeText={setText}
      outcome={outcomeOf(question, delta, solution, found && ticketText.strikeFound(found))}
      found={found}
      onTake={(strike) => {
        ticket.dispatch({ type: 'type', field: 'strike', text: strike });
        onClose();
      }}
      onClose={onClose}
    />
  );
}

const readTyped = (text: string, missing: string): Parsed<number> =>
  text.trim() === '' ? { ok: false, message: missing } : parseNumber(text);

type Outcome = { error?: string; message?: string };

function outcomeOf(
  question: ReturnType<typeof requestFor>,
  typed: Parsed<number>,
  solution: Solution | null,
  sentence: string | null,
): Outcome {
  if (!question.ok) return { error: ticketText.otherFieldStops(fieldName(question.stoppedBy)) };
  if (!typed.ok) return { error: typed.message };
  if (solution === null) return { message: ticketText.solving };
  return solution.ok ? { message: sentence ?? undefined } : { error: solution.message };
}

type SolveDialogProps = {
  title: string;
  body: string;
  label: string;
  unit: string;
  text: string;
  onChangeText: (text: string) => void;
  outcome: Outcome;
  /** The solved number as it goes into the field. */
  found: string | null;
  onTake: (found: string) => void;
  onClose: () => void;
};

function SolveDialog(props: SolveDialogProps) {
  const { title, body, label, unit, text, outcome, found, onChangeText, onTake, onClose } = props;
  return (
    <Dialog open title={title} onClose={onClose}>
      <form
        className="form"
        onSubmit={(event) => {
          event.preventDefault();
          if (found !== null) onTake(found);
        }}
      >
        <Text tone="muted">{body}</Text>
        <TextField
          label={label}
          unit={unit}
          value={text}
          error={outcome.error}
          inputMode="decimal"
          maxLength={40}
          autoFocus
          selectAllOnFocus
          onChangeText={onChangeText}
        />
        <Text tabular role="status">
          {outcome.message ?? ''}
        </Text>
        <Button submit label={ticketText.take} disabled={found === null} />
      </form>
    </Dialog>
  );
}
