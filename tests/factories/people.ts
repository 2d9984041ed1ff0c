import { randomUUID } from 'node:crypto';
import { hashSync } from 'bcryptjs';
import { Desk } from '@/server/models/desk';
import { Grant } from '@/server/models/grant';
import { Membership } from '@/server/models/membership';
import { Session } from '@/server/models/session';
import { User } from '@/server/models/user';
import { makeAccessToken } from '@/server/services/access-token';
import type { DeskRole, Permission, PermissionChange } from '@/shared/permissions';

export const password = 'a long enough password';
const passwordHash = hashSync(password, 4);

let count = 0;
const next = () => (count += 1);

export function makeUser(fields: Partial<{ name: string; email: string }> = {}): Promise<User> {
  const number = next();
  const name = fields.name ?? `Person ${number}`;
  return User.create({
    email: `person-${number}@tarnfield.example`,
    passwordHash,
    ...fields,
    name,
  });
}

export const makeDesk = (fields: Partial<{ timeZone: string; expiryCutoff: string }> = {}) =>
  Desk.create({
    name: `Desk ${next()}`,
    timeZone: 'Europe/Berlin',
    expiryCutoff: '17:30',
    ...fields,
  });

export const makeMembership = (
  desk: Desk,
  user: User,
  role: DeskRole,
  fields: Partial<Pick<Membership, 'suspendedAt' | 'suspensionReason'>> = {},
) =>
  Membership.create({
    deskId: desk.id,
    userId: user.id,
    role,
    memberSince: '2026-01-05',
    ...fields,
  });

export const suspended = () => ({
  suspendedAt: new Date(),
  suspensionReason: 'On leave for the season',
});

/** A session with its access token, as a sign-in would leave it. */
export async function makeSession(user: User, fields: Partial<Session> = {}) {
  const now = new Date();
  const session = await Session.create({
    userId: user.id,
    refreshHash: randomUUID().replaceAll('-', '').repeat(2),
    steppedUpAt: now,
    createdAt: now,
    rotatedAt: now,
    expiresAt: new Date(now.getTime() + 3_600_000),
    ...fields,
  });
  return { session, token: makeAccessToken(session.id) };
}

/** A member who is signed in. */
export async function makeMember(
  desk: Desk,
  role: DeskRole,
  fields: Parameters<typeof makeMembership>[3] = {},
) {
  const user = await makeUser();
  const membership = await makeMembership(desk, user, role, fields);
  const { token } = await makeSession(user);
  return { user, membership, token };
}
export type TestMember = Awaited<ReturnType<typeof makeMember>>;

export async function makeGrant(
  desk: Desk,
  subject: User,
  permission: Permission,
  fields: Partial<Pick<Grant, 'endsOn' | 'madeAt'>> &
    Partial<Pick<PermissionChange, 'effect'>> = {},
) {
  const { effect = 'grant', ...rest } = fields;
  const madeBy = await makeUser();
  return Grant.create({
    deskId: desk.id,
    subjectId: subject.id,
    kind: effect === 'grant' ? 'permission-granted' : 'permission-withdrawn',
    permission,
    reason: 'Set up for a test',
    madeById: madeBy.id,
    ...rest,
  });
}
