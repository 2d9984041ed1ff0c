import { createHash, randomBytes, timingSafeEqual } from 'node:crypto';
import { Op, type Transaction } from 'sequelize';
import { z } from 'zod';
import type { Me, Session as SessionOnTheWire } from '@/shared/contracts/sessions';
import { AppError } from '@/shared/errors';
import { sequelize } from '../database';
import { log } from '../log';
import { Desk } from '../models/desk';
import { Membership } from '../models/membership';
import { Session } from '../models/session';
import { User } from '../models/user';
import { accessTokenSeconds, makeAccessToken, sessionIdOf } from './access-token';
import { listActiveChanges, permissionsOf } from './access';
import { passwordFits } from './passwords';

const hourMs = 3_600_000;

/** A working day; then the password is asked for again. */
const sessionLifeMs = 12 * hourMs;
const stepUpLifeMs = 5 * 60_000;
/** How long a session that is over stays on record. */
const sessionRetentionMs = 90 * 24 * hourMs;

export type SignedIn = {
  userId: string;
  name: string;
  email: string;
  sessionId: string;
  steppedUp: boolean;
};

/** What the client gets, and the token for the cookie that its scripts never see. */
export type OpenedSession = { session: SessionOnTheWire; refreshToken: string; expiresAt: Date };

const hashOf = (secret: string) => createHash('sha256').update(secret).digest('hex');

const isOver = (session: Session) =>
  session.endedAt !== null || session.expiresAt.getTime() <= Date.now();

function newSecret() {
  const secret = randomBytes(32).toString('base64url');
  return { secret, refreshHash: hashOf(secret) };
}

export async function readMe(user: { userId: string; name: string; email: string }): Promise<Me> {
  const memberships = await Membership.findAll({
    where: { userId: user.userId },
    include: { model: Desk, as: 'desk', required: true },
    order: [[{ model: Desk, as: 'desk' }, 'name', 'ASC']],
  });
  const desks = memberships.map(async (membership) => {
    const { desk, role, suspendedAt } = membership;
    if (!desk) throw new Error('A membership was read without its desk.');
    const changes = await listActiveChanges(desk, { subjectId: user.userId });
    return {
      id: desk.id,
      name: desk.name,
      timeZone: desk.timeZone,
      expiryCutoff: desk.expiryCutoff,
      role,
      suspended: suspendedAt !== null,
      permissions: permissionsOf(membership, changes),
    };
  });
  return {
    user: { id: user.userId, name: user.name, email: user.email },
    desks: await Promise.all(desks),
  };
}

async function opened(session: Session, user: User, secret: string): Promise<OpenedSession> {
  return {
    session: {
      accessToken: makeAccessToken(session.id),
      expiresInSeconds: accessTokenSeconds,
      me: await readMe({ userId: user.id, name: user.name, email: user.email }),
    },
    refreshToken: `${session.id}.${secret}`,
    expiresAt: session.expiresAt,
  };
}

/** Signing in gives the password, so it also counts as the confirmation of a binding act. */
export async function signIn(email: string, password: string): Promise<OpenedSession> {
  const user = await User.findOne({ where: { email } });
  const fits = await passwordFits(password, user?.passwordHash ?? null);
  if (!user || !fits) throw new AppError('sign-in-failed');
  const now = new Date();
  const { secret, refreshHash } = newSecret();
  const session = await Session.create({
    userId: user.id,
    refreshHash,
    steppedUpAt: now,
    createdAt: now,
    rotatedAt: now,
    expiresAt: new Date(now.getTime() + sessionLifeMs),
  });
  return opened(session, user, secret);
}

const refreshTokenSchema = z.tuple([z.uuid(), z.string().min(1)]);

type Presented = { session: Session; user: User; isNewest: boolean };

/** The session that a refresh token names, locked, and whether the token is its newest one. */
async function readPresented(
  refreshToken: string | null,
  transaction: Transaction,
): Promise<Presented | null> {
  const parts = refreshTokenSchema.safeParse(refreshToken?.split('.'));
  if (!parts.success) return null;
  const [id, secret] = parts.data;
  const session = await Session.findByPk(id, { transaction, lock: true });
  if (!session || isOver(session)) return null;
  const user = await User.findByPk(session.userId, { transaction, rejectOnEmpty: true });
  const isNewest = timingSafeEqual(
    Buffer.from(session.refreshHash, 'hex'),
    Buffer.from(hashOf(secret), 'hex'),
  );
  return { session, user, isNewest };
}

const endSession = (
  session: Session,
  endCause: 'signed-out' | 'token-reused',
  transaction: Transaction,
) => session.update({ endedAt: new Date(), endCause }, { transaction });

/**
 * A refresh token works once. One that comes a second time was copied: whoever holds the copy and
 * whoever holds the newest are both signed out.
 */
export async function refreshSession(refreshToken: string | null): Promise<OpenedSession> {
  if (refreshToken === null) throw new AppError('not-signed-in');
  const rotated = await sequelize.transaction(async (transaction) => {
    const presented = await readPresented(refreshToken, transaction);
    if (!presented) return null;
    const { session, user, isNewest } = presented;
    if (!isNewest) {
      await endSession(session, 'token-reused', transaction);
      log.warn({ sessionId: session.id }, 'a refresh token came twice: session ended');
      return null;
    }
    const { secret, refreshHash } = newSecret();
    await session.update({ refreshHash, rotatedAt: new Date() }, { transaction });
    return { session, user, secret };
  });
  if (!rotated) throw new AppError('session-ended');
  return opened(rotated.session, rotated.user, rotated.secret);
}

/** Whether there was a session to end. */
export const signOut = (refreshToken: string | null): Promise<boolean> =>
  sequelize.transaction(async (transaction) => {
    const presented = await readPresented(refreshToken, transaction);
    if (!presented) return false;
    await endSession(
      presented.session,
      presented.isNewest ? 'signed-out' : 'token-reused',
      transaction,
    );
    return true;
  });

/** Who sent a request, by its access token. The session is read each time, so that its end counts at once. */
export async function findSignedIn(accessToken: string): Promise<SignedIn> {
  const sessionId = sessionIdOf(accessToken);
  if (sessionId === null) throw new AppError('not-signed-in');
  const session = await Session.findByPk(sessionId, {
    include: { model: User, as: 'user', attributes: ['id', 'name', 'email'] },
  });
  if (!session?.user || isOver(session)) throw new AppError('session-ended');
  const { id, name, email } = session.user;
  const steppedUp = Date.now() - session.steppedUpAt.getTime() <= stepUpLifeMs;
  return { userId: id, name, email, sessionId, steppedUp };
}

/** Until when binding acts are open to this session. */
export async function stepUp(signedIn: SignedIn, password: string): Promise<Date> {
  const user = await User.findByPk(signedIn.userId, { rejectOnEmpty: true });
  if (!(await passwordFits(password, user.passwordHash))) throw new AppError('sign-in-failed');
  const now = new Date();
  await Session.update({ steppedUpAt: now }, { where: { id: signedIn.sessionId } });
  return new Date(now.getTime() + stepUpLifeMs);
}

/** Sessions are technical rows: those long over may go. */
export const removeOldSessions = (): Promise<number> =>
  Session.destroy({
    where: { expiresAt: { [Op.lt]: new Date(Date.now() - sessionRetentionMs) } },
  });
