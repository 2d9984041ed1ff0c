/** The policy that each desk prices by, and one that waits for the second risk officer. */
import type { PolicyDraft } from '@/shared/contracts/policies';
import { sequelize } from '../database';
import type { DeskActor } from '../services/access';
import { approvePolicy, createPolicy } from '../services/policies';
import type { WriteOnce } from '../services/write-once';
import type { Listed } from './quotes';

const once: WriteOnce = (write) => sequelize.transaction(write);

/** In money, for a whole position; small beside any premium of the demonstration. */
export const moneyTolerances: Record<string, string> = {
  EUR: '50.00',
  USD: '50.00',
  SEK: '500.00',
  NOK: '500.00',
};

/** Enough for most of what the desk trades, and no more. */
export const firstSizes = {
  'heat-crank-nicolson': { spaceSteps: 100, timeSteps: 50 },
  'lattice-symmetric': { steps: 200 },
} as const;

const toleranceOf = ({ id, underlying }: Listed): [string, number] => [id, underlying.tolerance];

function draftOf(listed: readonly Listed[]): PolicyDraft {
  const currencies = [...new Set(listed.map(({ underlying }) => underlying.currency))];
  return {
    primaryEuropean: 'closed-form',
    checkEuropean: 'heat-crank-nicolson',
    primaryAmerican: 'heat-crank-nicolson',
    checkAmerican: 'lattice-symmetric',
    refinement: { by: 'sizes', sizes: firstSizes },
    unitTolerance: Object.fromEntries(listed.map(toleranceOf)),
    moneyTolerance: Object.fromEntries(currencies.map((one) => [one, moneyTolerances[one]])),
    reason: 'First policy of the desk, as agreed when it was set up',
  };
}

export async function seedPolicies(
  listed: readonly Listed[],
  author: DeskActor,
  second: DeskActor,
) {
  const draft = draftOf(listed);
  const { id, version } = await createPolicy(author, draft, once);
  await approvePolicy(second, id, version);
  await createPolicy(
    author,
    {
      ...draft,
      refinement: { by: 'tolerance', share: 0.2 },
      reason:
        'Refine to a fifth of the tolerance: fixed sizes are too rough for the largest positions',
    },
    once,
  );
}
