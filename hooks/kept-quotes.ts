/**
 * Quotes on their way to the server. One is kept, with its idempotency key, before it is sent, and
 * let go only when the server has answered for good: a reload, a lost connection or a second press
 * can therefore neither lose it nor save it twice.
 */
import { z } from 'zod';
import { type ApiError } from '@/shared/api-client';
import { quoteDraftSchema, type QuoteDraft } from '@/shared/contracts/quotes';

export const keptQuoteSchema = z.object({
  idempotencyKey: z.string(),
  body: quoteDraftSchema,
  keptAt: z.string(),
});
export type KeptQuote = z.infer<typeof keptQuoteSchema>;
export const keptQuotesSchema = z.array(keptQuoteSchema);

const contentOf = (body: QuoteDraft) => JSON.stringify(body);

/** The kept quote of the same content, or a new one: one key per content. */
export function keepQuote(
  kept: readonly KeptQuote[],
  body: QuoteDraft,
  newKey: () => string,
  keptAt: string,
): { quote: KeptQuote; kept: KeptQuote[] } {
  const same = kept.find((quote) => contentOf(quote.body) === contentOf(body));
  if (same) return { quote: same, kept: [...kept] };
  const quote = { idempotencyKey: newKey(), body, keptAt };
  return { quote, kept: [...kept, quote] };
}

export const letGo = (kept: readonly KeptQuote[], idempotencyKey: string): KeptQuote[] =>
  kept.filter((quote) => quote.idempotencyKey !== idempotencyKey);

/** Whether the same content may still be taken: the server was away, or nobody is signed in. */
export const mayBeSentLater = (error: ApiError): boolean =>
  error.retryable || error.code === 'session-ended' || error.code === 'not-signed-in';
