import type { Transaction } from 'sequelize';
import type { Member } from '@/shared/contracts/people';
import { type Desk } from '../models/desk';
import { Membership } from '../models/membership';
import { User } from '../models/user';
import { asPermissionChange, listActiveChanges, permissionsOf, type ActiveChange } from './access';

function memberOf(membership: Membership, changes: readonly ActiveChange[]): Member {
  const { user, role, memberSince, suspendedAt, suspensionReason, version } = membership;
  if (!user) throw new Error('A membership was read without its user.');
  return {
    user: { id: user.id, name: user.name, email: user.email },
    role,
    memberSince,
    suspendedAt: suspendedAt?.toISOString() ?? null,
    suspensionReason,
    permissions: permissionsOf(membership, changes),
    changes: changes.map((change) => {
      if (!change.madeBy) throw new Error('A grant was read without its maker.');
      const { id, reason, endsOn, madeBy, madeAt } = change;
      return {
        id,
        ...asPermissionChange(change),
        reason,
        endsOn,
        madeBy: { id: madeBy.id, name: madeBy.name },
        madeAt: madeAt.toISOString(),
      };
    }),
    version,
  };
}

export async function readMember(
  desk: Desk,
  userId: string,
  transaction?: Transaction,
): Promise<Member> {
  const membership = await Membership.findOne({
    where: { deskId: desk.id, userId },
    include: { model: User, as: 'user' },
    rejectOnEmpty: true,
    transaction,
  });
  return memberOf(membership, await listActiveChanges(desk, { subjectId: userId }, transaction));
}

export async function listMembers(desk: Desk): Promise<Member[]> {
  const memberships = await Membership.findAll({
    where: { deskId: desk.id },
    include: { model: User, as: 'user', required: true },
    order: [
      [{ model: User, as: 'user' }, 'name', 'ASC'],
      ['id', 'ASC'],
    ],
  });
  const changes = await listActiveChanges(desk);
  return memberships.map((membership) =>
    memberOf(
      membership,
      changes.filter(({ subjectId }) => subjectId === membership.userId),
    ),
  );
}
