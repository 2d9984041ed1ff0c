import { addDays } from '@/shared/dates';
import {
  brokenSegregation,
  effectivePermissions,
  type DeskRole,
  type Permission,
  type PermissionChange,
} from '@/shared/permissions';

export type DatedChange = PermissionChange & { endsOn: string | null };

/**
 * The first segregated pair that these changes would give, now or on a later day. A withdrawal
 * that ends gives its permission back, so the day after each end is looked at as well.
 */
export function brokenSegregationFrom(
  today: string,
  role: DeskRole,
  changes: readonly DatedChange[],
): readonly [Permission, Permission] | null {
  const ends = changes.flatMap(({ endsOn }) => (endsOn === null ? [] : [addDays(endsOn, 1)]));
  for (const day of [today, ...ends]) {
    const inForce = changes.filter(({ endsOn }) => endsOn === null || endsOn >= day);
    const broken = brokenSegregation(effectivePermissions(role, inForce));
    if (broken) return broken;
  }
  return null;
}
