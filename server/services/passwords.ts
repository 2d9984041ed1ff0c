import { randomBytes } from 'node:crypto';
import { env } from '../env';
import { threadPool } from '../thread-pool';
import type { CompareTask, HashTask } from '../threads/password';

/** One thread: sign-ins queue up rather than take every core from pricing. */
const pool = threadPool('password', 'hashPassword', 1);

export async function hashPassword(password: string): Promise<string> {
  const task: HashTask = { password, cost: env.passwordCost };
  return pool.run(task);
}

let unknownAccountHash: Promise<string> | null = null;

/** A hash that no password fits, for accounts that do not exist. */
export const hashOfNobody = (): Promise<string> =>
  (unknownAccountHash ??= hashPassword(randomBytes(24).toString('hex')));

/** An account without a hash takes as long as any other, so that nobody learns who exists. */
export async function passwordFits(password: string, hash: string | null): Promise<boolean> {
  const task: CompareTask = { password, hash: hash ?? (await hashOfNobody()) };
  const fits: boolean = await pool.run(task, { name: 'comparePassword' });
  return fits && hash !== null;
}

/** Requests have been answered by then; only the hash that none of them waits for may be under way. */
export async function closePasswordThreads() {
  await unknownAccountHash;
  await pool.destroy();
}
