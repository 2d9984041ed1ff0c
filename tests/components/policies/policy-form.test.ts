/** From what is typed into the form of a policy to what is sent, and back. */
import {
  fieldOfPath,
  moneyName,
  policyDefaults,
  readPolicy,
  unitName,
} from '@/components/policies/policy-form';
import { share, wheat } from '../../hooks/ticket-examples';

const underlyings = [wheat, share];
const typed = {
  ...policyDefaults(null, underlyings),
  [unitName(wheat.id)]: '0,004',
  [moneyName('EUR')]: '250',
  reason: 'First policy of the desk',
};

test('a filled form becomes a policy; what is left empty is left out', () => {
  expect(readPolicy(typed, underlyings)).toEqual({
    ok: true,
    draft: {
      primaryEuropean: 'closed-form',
      checkEuropean: 'heat-crank-nicolson',
      primaryAmerican: 'heat-crank-nicolson',
      checkAmerican: 'lattice-symmetric',
      refinement: { by: 'tolerance', share: 0.2 },
      unitTolerance: { [wheat.id]: 0.004 },
      moneyTolerance: { EUR: '250' },
      reason: 'First policy of the desk',
    },
  });
  const sized = { ...typed, by: 'sizes', gridSpaceSteps: '200', crrSteps: '500' };
  expect(readPolicy(sized, underlyings)).toMatchObject({
    draft: {
      refinement: {
        by: 'sizes',
        sizes: { 'heat-crank-nicolson': { spaceSteps: 200 }, 'lattice-crr': { steps: 500 } },
      },
    },
  });
});

test('each field says what is wrong with it', () => {
  const wrong = {
    ...typed,
    checkEuropean: 'closed-form',
    by: 'sizes',
    gridSpaceSteps: 'many',
    symmetricSteps: '99999',
    [unitName(share.id)]: '0',
    [moneyName('EUR')]: '-1',
    reason: 'why',
  };
  const read = readPolicy(wrong, underlyings);
  expect(read.ok ? [] : Object.keys(read.errors).sort()).toEqual(
    [
      'checkEuropean',
      'gridSpaceSteps',
      'reason',
      'symmetricSteps',
      moneyName('EUR'),
      unitName(share.id),
    ].sort(),
  );
});

test('a route that checks itself is refused at the check', () => {
  const read = readPolicy({ ...typed, checkEuropean: 'closed-form' }, underlyings);
  expect(read).toEqual({
    ok: false,
    errors: { checkEuropean: 'A route cannot check itself; choose another.' },
  });
});

test('paths of the server lead to their fields', () => {
  expect(fieldOfPath(`unitTolerance.${wheat.id}`)).toBe(unitName(wheat.id));
  expect(fieldOfPath('moneyTolerance.EUR')).toBe(moneyName('EUR'));
  expect(fieldOfPath('refinement.share')).toBe('share');
  expect(fieldOfPath('refinement.sizes.lattice-crr.steps')).toBe('crrSteps');
  expect(fieldOfPath('')).toBeNull();
});
