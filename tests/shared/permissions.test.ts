import {
  brokenSegregation,
  deskRoles,
  effectivePermissions,
  permissions,
  roleHas,
} from '@/shared/permissions';

/** The table that the desk agreed on, written out once more by hand. */
const agreed = `
price                analyst desk-head risk-officer
read-desk            analyst desk-head risk-officer auditor
propose-trades       analyst desk-head
approve-trades       desk-head
enter-market-data    analyst
approve-market-data  risk-officer
start-runs           analyst desk-head risk-officer
sign-off-runs        risk-officer
run-studies          analyst desk-head risk-officer
sign-off-studies     risk-officer
author-policy        risk-officer
export-history       desk-head risk-officer auditor
read-audit-log       desk-head risk-officer auditor
manage-people        desk-head
`.trim();

test('the role matrix is the agreed one', () => {
  const table = permissions
    .map((name) =>
      [name.padEnd(20), ...deskRoles.filter((role) => roleHas(role, name))].join(' ').trimEnd(),
    )
    .join('\n');
  expect(table.replace(/ +/g, ' ')).toBe(agreed.replace(/ +/g, ' '));
});

test('no role breaks segregation by itself', () => {
  for (const role of deskRoles)
    expect(brokenSegregation(effectivePermissions(role, []))).toBeNull();
});

test('grants add, withdrawals take, and a withdrawal wins over a grant', () => {
  const granted = effectivePermissions('analyst', [
    { permission: 'export-history', effect: 'grant' },
  ]);
  expect(granted).toContain('export-history');
  const withdrawn = effectivePermissions('analyst', [
    { permission: 'price', effect: 'withdraw' },
    { permission: 'price', effect: 'grant' },
  ]);
  expect(withdrawn).not.toContain('price');
});

test('maker and checker of the same thing are never one person', () => {
  const both = effectivePermissions('analyst', [
    { permission: 'approve-market-data', effect: 'grant' },
  ]);
  expect(brokenSegregation(both)).toEqual(['enter-market-data', 'approve-market-data']);
});
