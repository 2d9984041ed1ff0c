/** Password hashes take most of a second by design, so they are made beside the event loop. */
import { compare, hash } from 'bcryptjs';

export type HashTask = { password: string; cost: number };
export type CompareTask = { password: string; hash: string };

export const hashPassword = (task: HashTask): Promise<string> => hash(task.password, task.cost);

export const comparePassword = (task: CompareTask): Promise<boolean> =>
  compare(task.password, task.hash);
