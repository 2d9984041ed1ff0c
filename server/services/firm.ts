/** What the firm's administrator does: users, desks, and who belongs to a desk in which role. */
import { dateInZone } from '@/shared/dates';
import { AppError } from '@/shared/errors';
import type { DeskRole } from '@/shared/permissions';
import { sequelize } from '../database';
import { Desk } from '../models/desk';
import { Membership } from '../models/membership';
import { User } from '../models/user';
import { addGrant } from './grant-records';
import { hashPassword } from './passwords';

const shortestPasswordBytes = 10;
/** bcrypt reads no more. */
const longestPasswordBytes = 72;

/** The hash of a new password, if it is long enough to be one. */
export async function newPasswordHash(password: string): Promise<string> {
  const bytes = Buffer.byteLength(password);
  if (bytes < shortestPasswordBytes || bytes > longestPasswordBytes)
    throw new AppError('validation-failed', [
      {
        path: 'password',
        code: 'out-of-range',
        message: `A password has ${shortestPasswordBytes} to ${longestPasswordBytes} bytes.`,
      },
    ]);
  return hashPassword(password);
}

export const hasUsers = async (): Promise<boolean> => (await User.count()) > 0;

export const createUser = (draft: { email: string; name: string; passwordHash: string }) =>
  User.create(draft);

export const createDesk = (draft: { name: string; timeZone: string; expiryCutoff: string }) =>
  Desk.create(draft);

export type Appointment = { userId: string; role: DeskRole; reason: string; madeById: string };

/** Makes someone a member; like every later change of a role, it is a row of the grants. */
export const appointMember = (desk: Desk, { userId, role, reason, madeById }: Appointment) =>
  sequelize.transaction(async (transaction) => {
    const memberSince = dateInZone(Date.now(), desk.timeZone);
    await Membership.create({ deskId: desk.id, userId, role, memberSince }, { transaction });
    await addGrant(
      { deskId: desk.id, subjectId: userId, kind: 'role-set', role, reason, madeById },
      transaction,
    );
  });
