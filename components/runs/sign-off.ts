/** Who may sign a run off, said plainly to those who may not. */
import { signOffText } from '@/constants/texts/runs';
import type { Run } from '@/shared/contracts/runs';
import type { DeskAccess } from '@/shared/contracts/sessions';

export type SignOffStanding = {
  /** Whether this person can sign the run off now. */
  maySignOff: boolean;
  /** What stands in the way, a sentence each. */
  hindrances: string[];
};

export function signOffStanding(
  { status, openExceptions, startedBy, makerIds }: Run,
  { permissions }: DeskAccess,
  userId: string,
): SignOffStanding {
  if (status !== 'finished') return { maySignOff: false, hindrances: [] };
  const hindrances = openExceptions > 0 ? [signOffText.opens(openExceptions)] : [];
  if (!permissions.includes('sign-off-runs')) hindrances.push(signOffText.waitsForOfficer);
  else if (startedBy.id === userId) hindrances.push(signOffText.started);
  else if (makerIds.includes(userId)) hindrances.push(signOffText.hadAHand);
  return { maySignOff: hindrances.length === 0, hindrances };
}
