import { useCallback, useEffect, useRef, useState } from 'react';
import { ApiError } from '@/shared/api-client';
import type { Quote, QuoteDraft } from '@/shared/contracts/quotes';
import { newIdempotencyKey } from './api';
import { keepQuote, keptQuotesSchema, letGo, mayBeSentLater, type KeptQuote } from './kept-quotes';
import { readStored, storeKey, writeStored } from './local-store';
import { useSaveQuote } from './use-quotes';

export type SavedQuote = { quote: Quote; sent: QuoteDraft };

export type QuoteSaving = {
  sending: boolean;
  saved: SavedQuote | null;
  /** The server's refusal of what was sent last. */
  refused: ApiError | null;
  /** Quotes that the server has not answered for yet. */
  kept: readonly KeptQuote[];
  save: (body: QuoteDraft) => void;
  retry: (quote: KeptQuote) => void;
  discard: (quote: KeptQuote) => void;
  /** Terms have changed: what was said about the last quote no longer belongs here. */
  clear: () => void;
};

/** Quotes kept in this browser; a second tab of the same desk reads and writes the same list. */
function useKeptQuotes(userId: string, deskId: string) {
  const key = storeKey('unsent-quotes', userId, deskId);
  const read = () => readStored(key, keptQuotesSchema) ?? [];
  const [kept, setKept] = useState<readonly KeptQuote[]>(read);
  const change = (next: readonly KeptQuote[]) => {
    writeStored(key, next);
    setKept(next);
  };
  return { kept, read, change };
}

export function useQuoteSaving(userId: string, deskId: string): QuoteSaving {
  const { kept, read, change } = useKeptQuotes(userId, deskId);
  const { mutateAsync } = useSaveQuote(deskId);
  const [saved, setSaved] = useState<SavedQuote | null>(null);
  const [refused, setRefused] = useState<ApiError | null>(null);
  const [sendingKeys, setSendingKeys] = useState<readonly string[]>([]);
  const underWay = useRef(new Set<string>());

  const mark = (key: string, sends: boolean) => {
    if (sends) underWay.current.add(key);
    else underWay.current.delete(key);
    setSendingKeys([...underWay.current]);
  };

  async function send(quote: KeptQuote) {
    const { idempotencyKey, body } = quote;
    if (underWay.current.has(idempotencyKey)) return;
    mark(idempotencyKey, true);
    setRefused(null);
    try {
      const answer = await mutateAsync({ idempotencyKey, body });
      change(letGo(read(), idempotencyKey));
      setSaved({ quote: answer, sent: body });
    } catch (error) {
      if (!(error instanceof ApiError)) throw error;
      if (!mayBeSentLater(error)) {
        change(letGo(read(), idempotencyKey));
        setRefused(error);
      }
    } finally {
      mark(idempotencyKey, false);
    }
  }

  useEffect(() => {
    const onOnline = () => read().forEach((quote) => void send(quote));
    addEventListener('online', onOnline);
    return () => removeEventListener('online', onOnline);
  });

  const clear = useCallback(() => {
    setSaved(null);
    setRefused(null);
  }, []);

  return {
    sending: sendingKeys.length > 0,
    saved,
    refused,
    kept: kept.filter(({ idempotencyKey }) => !sendingKeys.includes(idempotencyKey)),
    save(body) {
      const next = keepQuote(read(), body, newIdempotencyKey, new Date().toISOString());
      change(next.kept);
      void send(next.quote);
    },
    retry: (quote) => void send(quote),
    discard: (quote) => change(letGo(read(), quote.idempotencyKey)),
    clear,
  };
}
