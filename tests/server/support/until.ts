import { setTimeout as pause } from 'node:timers/promises';

/** Waits for a condition that comes true by itself, leaving the processor to what makes it true. */
export async function until(isTrue: () => Promise<boolean>): Promise<void> {
  while (!(await isTrue())) await pause(50);
}
