import {
  consequencesOfChange,
  consequencesOfEnd,
  consequencesOfRole,
  standingOf,
} from '@/components/people/consequences';
import type { Member } from '@/shared/contracts/people';
import { effectivePermissions, type DeskRole, type PermissionChange } from '@/shared/permissions';

const head = { id: '00000000-0000-4000-8000-000000000001', name: 'Desk head' };

function member(role: DeskRole, changes: PermissionChange[] = []): Member {
  return {
    user: {
      id: '00000000-0000-4000-8000-000000000002',
      name: 'Ada',
      email: 'ada@tarnfield.example',
    },
    role,
    memberSince: '2026-09-01',
    suspendedAt: null,
    suspensionReason: null,
    permissions: effectivePermissions(role, changes),
    changes: changes.map((change, index) => ({
      ...change,
      id: `00000000-0000-4000-8000-00000000010${index}`,
      reason: 'For the quarter',
      endsOn: null,
      madeBy: head,
      madeAt: '2026-11-03T09:12:00Z',
    })),
    version: 0,
  };
}

test('a role’s change names what is gained and what is lost, by the one table', () => {
  const { sentences, blocked } = consequencesOfRole(member('analyst'), 'desk-head');
  expect(blocked).toBe(false);
  expect(sentences).toEqual([
    'Ada changes from Analyst to Desk head.',
    'Gains: Approve or return trades, never one’s own',
    'Gains: Export the valuation history and verify the chain',
    'Gains: Read the audit log',
    'Gains: Set roles analyst and desk head, grants and suspensions',
    'Loses: Enter market data',
  ]);
});

test('a role that would change nothing is not offered', () => {
  expect(consequencesOfRole(member('analyst'), 'analyst').blocked).toBe(true);
});

test('what is granted beside the role is neither gained nor lost with the role', () => {
  const granted = member('analyst', [{ permission: 'read-audit-log', effect: 'grant' }]);
  const { sentences } = consequencesOfRole(granted, 'desk-head');
  expect(sentences).not.toContain('Gains: Read the audit log');
  expect(sentences).toContain('Single grants and withdrawals stay as they are.');
});

test('a grant that would join maker and checker in one person says so and is blocked', () => {
  const { sentences, blocked } = consequencesOfChange(
    member('analyst'),
    { permission: 'approve-market-data', effect: 'grant' },
    null,
  );
  expect(blocked).toBe(true);
  expect(sentences.at(-1)).toMatch(
    /refused: nobody may both “Enter market data” and “Approve market data/,
  );
});

test('a grant says what and until when', () => {
  const grant = { permission: 'export-history', effect: 'grant' } as const;
  expect(consequencesOfChange(member('analyst'), grant, '2027-03-31')).toEqual({
    sentences: [
      'Ada may do this until 2027-03-31: Export the valuation history and verify the chain.',
    ],
    blocked: false,
  });
});

test('grants of what is held and withdrawals of what is not are blocked', () => {
  const grant = { permission: 'price', effect: 'grant' } as const;
  const withdraw = { permission: 'export-history', effect: 'withdraw' } as const;
  expect(consequencesOfChange(member('analyst'), grant, null).blocked).toBe(true);
  expect(consequencesOfChange(member('analyst'), withdraw, null).blocked).toBe(true);
});

test('ending a withdrawal gives back, ending a grant takes away', () => {
  const changed = member('analyst', [
    { permission: 'export-history', effect: 'grant' },
    { permission: 'price', effect: 'withdraw' },
  ]);
  expect(consequencesOfEnd(changed, changed.changes[0].id).sentences[0]).toMatch('loses');
  expect(consequencesOfEnd(changed, changed.changes[1].id).sentences[0]).toMatch('gets back');
});

test('the standing tells role, grant and withdrawal apart', () => {
  const changed = member('analyst', [
    { permission: 'export-history', effect: 'grant' },
    { permission: 'price', effect: 'withdraw' },
  ]);
  const sources = Object.fromEntries(
    standingOf(changed).map(({ permission, held, source }) => [permission, [held, source]]),
  );
  expect(sources).toMatchObject({
    price: [false, 'withdrawn'],
    'read-desk': [true, 'role'],
    'export-history': [true, 'granted'],
  });
  expect(sources).not.toHaveProperty('sign-off-runs');
});
