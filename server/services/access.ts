/** What a member may do now: the role's row of the table, and the single changes in force today. */
import { Op, type Transaction } from 'sequelize';
import { dateInZone } from '@/shared/dates';
import { effectivePermissions, type Permission, type PermissionChange } from '@/shared/permissions';
import { Desk } from '../models/desk';
import { Grant } from '../models/grant';
import { Membership } from '../models/membership';
import { User } from '../models/user';

export type ActiveChange = Grant & { permission: Permission };

/** A member at work on a desk, as this request found them. */
export type DeskActor = {
  userId: string;
  name: string;
  desk: Desk;
  membership: Membership;
  permissions: Permission[];
};

export const today = (desk: Desk): string => dateInZone(Date.now(), desk.timeZone);

const effectOf = (change: Grant): PermissionChange['effect'] =>
  change.kind === 'permission-granted' ? 'grant' : 'withdraw';

export const asPermissionChange = (change: ActiveChange): PermissionChange => ({
  permission: change.permission,
  effect: effectOf(change),
});

const hasPermission = (grant: Grant): grant is ActiveChange => grant.permission !== null;

/** Grants and withdrawals of a desk that are neither ended nor past their last day. */
export async function listActiveChanges(
  desk: Desk,
  filter: { subjectId?: string } = {},
  transaction?: Transaction,
): Promise<ActiveChange[]> {
  const rows = await Grant.findAll({
    where: {
      deskId: desk.id,
      ...filter,
      kind: ['permission-granted', 'permission-withdrawn'],
      endsOn: { [Op.or]: [{ [Op.is]: null }, { [Op.gte]: today(desk) }] },
      '$ending.id$': null,
    },
    include: [
      { model: Grant, as: 'ending', attributes: ['id'] },
      { model: User, as: 'madeBy', attributes: ['id', 'name'] },
    ],
    order: [
      ['madeAt', 'ASC'],
      ['id', 'ASC'],
    ],
    transaction,
  });
  return rows.filter(hasPermission);
}

/** A suspended member may do nothing, whatever the role says. */
export function permissionsOf(
  membership: Membership,
  changes: readonly ActiveChange[],
): Permission[] {
  if (membership.suspendedAt !== null) return [];
  return effectivePermissions(membership.role, changes.map(asPermissionChange));
}

export async function findDeskActor(
  user: { userId: string; name: string },
  deskId: string,
  transaction?: Transaction,
): Promise<DeskActor | null> {
  const membership = await Membership.findOne({
    where: { deskId, userId: user.userId },
    include: { model: Desk, as: 'desk' },
    transaction,
  });
  if (!membership?.desk) return null;
  const { desk } = membership;
  const changes = await listActiveChanges(desk, { subjectId: user.userId }, transaction);
  return { ...user, desk, membership, permissions: permissionsOf(membership, changes) };
}
