/** Secret keys of this installation: made at first start, in files that only the service reads. */
import { randomBytes } from 'node:crypto';
import { linkSync, mkdirSync, readFileSync, unlinkSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { env } from './env';

const keyBytes = 32;

const isErrno = (error: unknown, code: string): boolean =>
  typeof error === 'object' && error !== null && 'code' in error && error.code === code;

/**
 * The key of a name, made when absent. It is written aside and linked into place, so that of two
 * processes that start at once one makes it, both read it, and nobody sees half a key.
 */
export function keyNamed(name: string, keysDir = env.keysDir): Buffer {
  mkdirSync(keysDir, { recursive: true, mode: 0o700 });
  const file = path.join(keysDir, `${name}.key`);
  const draft = `${file}.${process.pid}.${randomBytes(6).toString('hex')}`;
  writeFileSync(draft, randomBytes(keyBytes).toString('hex'), { mode: 0o600, flag: 'wx' });
  try {
    linkSync(draft, file);
  } catch (error) {
    if (!isErrno(error, 'EEXIST')) throw error;
  } finally {
    unlinkSync(draft);
  }
  const key = Buffer.from(readFileSync(file, 'utf8'), 'hex');
  if (key.length !== keyBytes) throw new Error(`${file} does not hold a key of ${keyBytes} bytes.`);
  return key;
}
