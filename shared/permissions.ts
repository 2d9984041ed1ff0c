/** The one table of who may do what on a desk: a row a permission, a column a role. */

export const deskRoles = ['analyst', 'desk-head', 'risk-officer', 'auditor'] as const;
export type DeskRole = (typeof deskRoles)[number];

type PermissionRow = { sentence: string; roles: readonly DeskRole[] };

const permissionTable = {
  price: {
    sentence: 'Price an option and save quotes',
    roles: ['analyst', 'desk-head', 'risk-officer'],
  },
  'read-desk': {
    sentence: 'Read everything of the desk',
    roles: ['analyst', 'desk-head', 'risk-officer', 'auditor'],
  },
  'propose-trades': {
    sentence: 'Propose and amend trades',
    roles: ['analyst', 'desk-head'],
  },
  'approve-trades': {
    sentence: 'Approve or return trades, never one’s own',
    roles: ['desk-head'],
  },
  'enter-market-data': {
    sentence: 'Enter market data',
    roles: ['analyst'],
  },
  'approve-market-data': {
    sentence: 'Approve market data, never one’s own',
    roles: ['risk-officer'],
  },
  'start-runs': {
    sentence: 'Start valuation runs',
    roles: ['analyst', 'desk-head', 'risk-officer'],
  },
  'sign-off-runs': {
    sentence: 'Sign off a run that one did not start, of trades one did not touch',
    roles: ['risk-officer'],
  },
  'run-studies': {
    sentence: 'Run convergence studies',
    roles: ['analyst', 'desk-head', 'risk-officer'],
  },
  'sign-off-studies': {
    sentence: 'Sign off convergence studies',
    roles: ['risk-officer'],
  },
  'author-policy': {
    sentence: 'Author a pricing policy, which a second risk officer approves',
    roles: ['risk-officer'],
  },
  'export-history': {
    sentence: 'Export the valuation history and verify the chain',
    roles: ['desk-head', 'risk-officer', 'auditor'],
  },
  'read-audit-log': {
    sentence: 'Read the audit log',
    roles: ['desk-head', 'risk-officer', 'auditor'],
  },
  'manage-people': {
    sentence: 'Set roles analyst and desk head, grants and suspensions',
    roles: ['desk-head'],
  },
} as const satisfies Record<string, PermissionRow>;

export type Permission = keyof typeof permissionTable;

export const permissions = Object.keys(permissionTable) as Permission[];

export const permissionSentence = (permission: Permission): string =>
  permissionTable[permission].sentence;

export function roleHas(role: DeskRole, permission: Permission): boolean {
  const row: PermissionRow = permissionTable[permission];
  return row.roles.includes(role);
}

/** Roles that a desk head may set; control roles are the firm's administrator's to give. */
export const rolesADeskHeadSets = ['analyst', 'desk-head'] as const satisfies readonly DeskRole[];

/** Pairs that no one person may hold on one desk: maker and checker of the same thing. */
export const segregatedPairs: readonly (readonly [Permission, Permission])[] = [
  ['enter-market-data', 'approve-market-data'],
  ['propose-trades', 'sign-off-runs'],
  ['approve-trades', 'sign-off-runs'],
  ['propose-trades', 'sign-off-studies'],
  ['propose-trades', 'author-policy'],
  ['manage-people', 'sign-off-runs'],
  ['manage-people', 'approve-market-data'],
];

export type PermissionChange = { permission: Permission; effect: 'grant' | 'withdraw' };

/** What a person may do: the role's row set, with single grants added and withdrawals taken out. */
export function effectivePermissions(
  role: DeskRole,
  changes: readonly PermissionChange[],
): Permission[] {
  const held = new Set(permissions.filter((permission) => roleHas(role, permission)));
  for (const { permission, effect } of changes) if (effect === 'grant') held.add(permission);
  for (const { permission, effect } of changes) if (effect === 'withdraw') held.delete(permission);
  return permissions.filter((permission) => held.has(permission));
}

/** The first segregated pair among the permissions, or null. */
export function brokenSegregation(
  held: readonly Permission[],
): readonly [Permission, Permission] | null {
  return segregatedPairs.find(([a, b]) => held.includes(a) && held.includes(b)) ?? null;
}
