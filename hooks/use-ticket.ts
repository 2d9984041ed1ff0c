import { useEffect, useRef } from 'react';
import type { DeskAccess } from '@/shared/contracts/sessions';
import type { QuoteDraft } from '@/shared/contracts/quotes';
import type { Underlying } from '@/shared/contracts/underlyings';
import { toleranceFor } from '@/shared/tolerance';
import { hasNewerClose, type TicketDraft } from './ticket-draft';
import {
  firstErrorField,
  placeIssues,
  readTicket,
  type FieldErrors,
  type TicketReading,
} from './ticket-terms';
import { useIndicativePrice } from './use-indicative-price';
import { useMinute } from './use-minute';
import { useQuoteSaving } from './use-quote-saving';
import { useQuote } from './use-quotes';
import { useTicketDraft } from './use-ticket-draft';
import { useUnderlyings } from './use-underlyings';

/** Terms that a saved quote stands for: while they stay, it is not offered to be saved again. */
const termsKey = (draft: TicketDraft) => JSON.stringify({ ...draft, source: null });

/** Never used: nothing is priced without an underlying, which has one. */
const noTolerance = 1;

/** Opens the ticket once the underlyings are there, or with the terms of a quote. */
function useOpening(
  ticket: ReturnType<typeof useTicketDraft>,
  underlyings: readonly Underlying[] | undefined,
  deskId: string,
  from: string | null,
  onTaken: () => void,
) {
  const { dispatch } = ticket;
  const opened = useRef(false);
  const { data: quote } = useQuote(deskId, from);
  useEffect(() => {
    if (!underlyings || opened.current) return;
    opened.current = true;
    dispatch({ type: 'open', underlyings });
  }, [underlyings, dispatch]);
  useEffect(() => {
    if (!quote || !underlyings) return;
    dispatch({ type: 'use-quote', quote });
    onTaken();
  }, [quote, underlyings, dispatch, onTaken]);
}

/** The desk's tolerance for the size on the ticket; per unit alone while the size cannot be read. */
function toleranceOn(
  underlying: Underlying | null,
  { quantity, contractSize }: TicketReading['position'],
): number {
  if (!underlying) return noTolerance;
  if (quantity === undefined || contractSize === undefined) return underlying.tolerance;
  return toleranceFor(underlying, { quantity, contractSize });
}

/** Everything that a ticket knows and can do. */
export function useTicket(
  userId: string,
  desk: DeskAccess,
  from: string | null,
  onFromTaken: () => void,
) {
  const ticket = useTicketDraft(userId, desk.id);
  const { draft } = ticket;
  const underlyings = useUnderlyings(desk.id);
  useOpening(ticket, underlyings.data, desk.id, from, onFromTaken);
  const underlying = underlyings.data?.find(({ id }) => id === draft.underlyingId) ?? null;
  const nowMs = useMinute();
  const reading = readTicket(draft, underlying, desk, nowMs);
  const pricing = useIndicativePrice(
    underlying?.id ?? null,
    toleranceOn(underlying, reading.position),
    reading.priced?.request ?? null,
  );
  const saving = useQuoteSaving(userId, desk.id);
  const key = termsKey(draft);
  const { clear } = saving;
  useEffect(() => clear(), [key, clear]);
  const failures = failuresOf(pricing);
  const refusals = placeIssues(saving.refused?.issues ?? []);
  const errors: FieldErrors = { ...failures.errors, ...refusals.errors, ...reading.errors };
  const value = answerOfTicket(pricing)?.value ?? null;

  function save() {
    if (!reading.priced || value === null) return;
    const body: QuoteDraft = {
      ...reading.priced.terms,
      indicativeValue: value,
      note: draft.note.trim(),
    };
    saving.save(body);
  }

  return {
    ...ticket,
    underlyings,
    underlying,
    reading,
    pricing,
    saving,
    errors,
    /** The first field that stops the price. */
    stopping: firstErrorField({ ...failures.errors, ...reading.errors }),
    /** Complaints of the server that belong to no field. */
    complaints: refusals.elsewhere,
    newerClose: underlying !== null && hasNewerClose(draft, underlying),
    canSave: value !== null,
    save,
  };
}

export type Ticket = ReturnType<typeof useTicket>;

type Pricing = ReturnType<typeof useIndicativePrice>;

/** When no route could price the terms, what they say belongs at the fields. */
function failuresOf({ price, current }: Pricing) {
  const results = current && price ? price.routes.map(({ result }) => result) : [];
  const failed = results.filter((result) => !result.ok);
  return placeIssues(failed.length === results.length ? failed : []);
}

/** What the ticket shows for the terms that stand on it now. */
export function answerOfTicket({ price, current }: Pricing) {
  if (!current || !price) return null;
  const first = price.routes.find(({ result }) => result.ok)?.result;
  return first?.ok ? first : null;
}
