/** What this browser keeps for one person on one desk. Reading never trusts what it finds. */
import type { z } from 'zod';

export const storeKey = (noun: string, userId: string, deskId: string): string =>
  `driftless.${noun}.${userId}.${deskId}`;

export function readStored<S extends z.ZodType>(key: string, schema: S): z.output<S> | null {
  const text = storageOr(() => localStorage.getItem(key), null);
  if (text === null) return null;
  try {
    const parsed = schema.safeParse(JSON.parse(text));
    return parsed.success ? parsed.data : null;
  } catch (error) {
    if (error instanceof SyntaxError) return null;
    throw error;
  }
}

/** False where the browser keeps nothing: storage is full, or refused by its settings. */
export const writeStored = (key: string, value: unknown): boolean =>
  storageOr(() => {
    localStorage.setItem(key, JSON.stringify(value));
    return true;
  }, false);

function storageOr<T>(attempt: () => T, otherwise: T): T {
  try {
    return attempt();
  } catch (error) {
    if (error instanceof DOMException) return otherwise;
    throw error;
  }
}
