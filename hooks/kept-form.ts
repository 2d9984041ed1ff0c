/**
 * A form that is kept in this browser until the server has taken it, with the idempotency key of
 * what was sent last: a reload, a lost connection or a second press can neither lose nor double it.
 */
import { z } from 'zod';
import { newIdempotencyKey } from './api';
import { readStored, writeStored } from './local-store';

const keptSchema = z.object({
  values: z.record(z.string(), z.string()),
  sent: z.object({ content: z.string(), idempotencyKey: z.string() }).nullable(),
});

/** What was typed before, of those fields that the form still has. */
export function readKeptForm<Values extends Record<string, string>>(
  key: string,
  defaults: Values,
): Values {
  const kept = readStored(key, keptSchema)?.values ?? {};
  const entries = Object.entries(defaults).map(([name, text]) => [name, kept[name] ?? text]);
  return Object.fromEntries(entries) as Values;
}

export function keepForm(key: string, values: Record<string, string>): void {
  const sent = readStored(key, keptSchema)?.sent ?? null;
  writeStored(key, { values, sent });
}

/** The key of this content: the one it was sent with before, else a new one. */
export function keyForContent(key: string, body: unknown): string {
  const content = JSON.stringify(body);
  const kept = readStored(key, keptSchema);
  if (kept?.sent?.content === content) return kept.sent.idempotencyKey;
  const idempotencyKey = newIdempotencyKey();
  writeStored(key, { values: kept?.values ?? {}, sent: { content, idempotencyKey } });
  return idempotencyKey;
}

export const forgetForm = (key: string): boolean => writeStored(key, null);
