/** The seal of an entry, as the database makes it in `chain_hash` (migration 0010-chain). */
import { createHash } from 'node:crypto';

export type SealedText = {
  /** Hash of the entry before, 64 hexadecimal digits; `noHash` for the first. */
  previous: string;
  chain: string;
  position: number;
  at: string;
  body: string;
};

export const noHash = '0'.repeat(64);

/** Four bytes of length, big-endian, then the bytes: two fields never run into each other. */
function lengthPrefixed(field: string): Buffer {
  const bytes = Buffer.from(field, 'utf8');
  const length = Buffer.alloc(4);
  length.writeUInt32BE(bytes.length);
  return Buffer.concat([length, bytes]);
}

export function entryHash({ previous, chain, position, at, body }: SealedText): string {
  const hash = createHash('sha256').update(Buffer.from(previous, 'hex'));
  for (const field of [chain, String(position), at, body]) hash.update(lengthPrefixed(field));
  return hash.digest('hex');
}
