import type { Member } from '@/shared/contracts/people';
import {
  effectivePermissions,
  permissions,
  type Permission,
  type PermissionChange,
} from '@/shared/permissions';

export type Effect = PermissionChange['effect'];

/**
 * What can be withdrawn is what the person holds; what can be granted is what they lack, except
 * what was withdrawn from them: that comes back by ending the withdrawal.
 */
export function changeable(member: Member, effect: Effect): Permission[] {
  const held = effectivePermissions(member.role, member.changes);
  if (effect === 'withdraw') return held;
  const named = member.changes.map(({ permission }) => permission);
  return permissions.filter(
    (permission) => !held.includes(permission) && !named.includes(permission),
  );
}
