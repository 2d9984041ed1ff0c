/**
 * What a desk head may change about a member. Every change is one transaction that locks the desk,
 * looks at who is asking once more, and adds the row to `grants` that says what was done and why; the
 * same is sealed into the desk's records.
 */
import { Op, type Transaction } from 'sequelize';
import type { Member } from '@/shared/contracts/people';
import { AppError } from '@/shared/errors';
import {
  effectivePermissions,
  rolesADeskHeadSets,
  type DeskRole,
  type Permission,
  type PermissionChange,
} from '@/shared/permissions';
import { sequelize } from '../database';
import { Desk } from '../models/desk';
import type { Grant } from '../models/grant';
import { Membership } from '../models/membership';
import {
  asPermissionChange,
  findDeskActor,
  listActiveChanges,
  permissionsOf,
  today,
  type ActiveChange,
  type DeskActor,
} from './access';
import { addGrant } from './grant-records';
import { readMember } from './members';
import { brokenSegregationFrom, type DatedChange } from './segregation';
import type { WriteOnce } from './write-once';

/** Whose record, as of which version, and why. */
export type MemberChange = { userId: string; version: number; reason: string };

type Subject = { membership: Membership; changes: ActiveChange[]; transaction: Transaction };

type Outcome = {
  membership?: Partial<Pick<Membership, 'role' | 'suspendedAt' | 'suspensionReason'>>;
  event: Pick<Grant, 'kind'> &
    Partial<Pick<Grant, 'permission' | 'role' | 'previousRole' | 'endsOn' | 'endedGrantId'>>;
};

const refuse = (path: string, code: string, message: string) =>
  new AppError('validation-failed', [{ path, code, message }]);

const isControlRole = (role: DeskRole) => !rolesADeskHeadSets.some((settable) => settable === role);

async function readSubject(
  actor: DeskActor,
  { userId, version }: MemberChange,
  transaction: Transaction,
): Promise<Subject> {
  const { desk } = actor;
  const now = await findDeskActor(actor, desk.id, transaction);
  if (!now?.permissions.includes('manage-people')) throw new AppError('not-permitted');
  const membership = await Membership.findOne({
    where: { deskId: desk.id, userId },
    transaction,
    lock: true,
  });
  if (!membership) throw new AppError('not-found');
  if (isControlRole(membership.role)) throw new AppError('control-role');
  if (membership.version !== version) throw new AppError('stale-version');
  const changes = await listActiveChanges(desk, { subjectId: userId }, transaction);
  return { membership, changes, transaction };
}

async function changeMember(
  actor: DeskActor,
  change: MemberChange,
  inTransaction: WriteOnce,
  decide: (subject: Subject) => Outcome | Promise<Outcome>,
): Promise<Member> {
  if (change.userId === actor.userId) throw new AppError('own-record');
  return inTransaction(async (transaction) => {
    // One change at a time on a desk: two heads who demote each other must not both succeed.
    await Desk.findByPk(actor.desk.id, { transaction, lock: true });
    const subject = await readSubject(actor, change, transaction);
    const { membership, event } = await decide(subject);
    const version = subject.membership.version + 1;
    await subject.membership.update({ ...membership, version }, { transaction });
    await addGrant(
      {
        ...event,
        deskId: actor.desk.id,
        subjectId: change.userId,
        reason: change.reason,
        madeById: actor.userId,
      },
      transaction,
    );
    return readMember(actor.desk, change.userId, transaction);
  });
}

const once: WriteOnce = (write) => sequelize.transaction(write);

function refuseBrokenSegregation(desk: Desk, role: DeskRole, changes: readonly DatedChange[]) {
  const broken = brokenSegregationFrom(today(desk), role, changes);
  if (!broken) return;
  const message = `This would give one person both “${broken[0]}” and “${broken[1]}”.`;
  throw new AppError('segregation-broken', [{ path: '', code: 'segregation-broken', message }]);
}

const dated = (changes: readonly ActiveChange[]): DatedChange[] =>
  changes.map((change) => ({ ...asPermissionChange(change), endsOn: change.endsOn }));

const leads = (membership: Membership, changes: readonly ActiveChange[]) =>
  membership.role === 'desk-head' && permissionsOf(membership, changes).includes('manage-people');

/** A desk without a head who can act could not be mended from within. */
async function refuseLastHead(
  desk: Desk,
  { membership, changes, transaction }: Subject,
  path: string,
) {
  if (!leads(membership, changes)) return;
  const others = await Membership.findAll({
    where: { deskId: desk.id, role: 'desk-head', userId: { [Op.ne]: membership.userId } },
    transaction,
  });
  const all = await listActiveChanges(desk, {}, transaction);
  const own = (userId: string) => all.filter(({ subjectId }) => subjectId === userId);
  if (others.some((other) => leads(other, own(other.userId)))) return;
  throw refuse(path, 'last-desk-head', 'This is the desk’s last desk head; appoint another first.');
}

export const setRole = (actor: DeskActor, change: MemberChange & { role: DeskRole }) =>
  changeMember(actor, change, once, async (subject) => {
    const previousRole = subject.membership.role;
    if (change.role === previousRole)
      throw refuse('role', 'unchanged', 'This member has that role already.');
    if (change.role !== 'desk-head') await refuseLastHead(actor.desk, subject, 'role');
    refuseBrokenSegregation(actor.desk, change.role, dated(subject.changes));
    return {
      membership: { role: change.role },
      event: { kind: 'role-set', role: change.role, previousRole },
    };
  });

/** A change that would change nothing is refused, with what to do instead. */
function refuseIdleChange(
  held: readonly Permission[],
  changes: readonly ActiveChange[],
  { permission, effect }: PermissionChange,
) {
  const isHeld = held.includes(permission);
  if (effect === 'withdraw' && !isHeld)
    throw refuse('permission', 'not-held', 'This member does not hold that permission.');
  if (effect === 'grant' && isHeld)
    throw refuse('permission', 'already-held', 'This member holds that permission already.');
  const isWithdrawn = changes
    .map(asPermissionChange)
    .some((other) => other.permission === permission && other.effect === 'withdraw');
  if (effect === 'grant' && isWithdrawn)
    throw refuse('permission', 'withdrawn', 'It was withdrawn; end the withdrawal instead.');
}

export const changePermission = (
  actor: DeskActor,
  change: MemberChange & DatedChange,
  inTransaction: WriteOnce,
) =>
  changeMember(actor, change, inTransaction, async (subject) => {
    const { permission, effect, endsOn } = change;
    const { membership, changes } = subject;
    if (endsOn !== null && endsOn < today(actor.desk))
      throw refuse('endsOn', 'past-date', 'Give today or a later day, or no end.');
    const held = effectivePermissions(membership.role, changes.map(asPermissionChange));
    refuseIdleChange(held, changes, change);
    if (effect === 'withdraw' && permission === 'manage-people')
      await refuseLastHead(actor.desk, subject, 'permission');
    const added = { permission, effect, endsOn };
    refuseBrokenSegregation(actor.desk, membership.role, [...dated(changes), added]);
    const kind = effect === 'grant' ? 'permission-granted' : 'permission-withdrawn';
    return { event: { kind, permission, endsOn } };
  });

export const endPermissionChange = (
  actor: DeskActor,
  change: MemberChange & { changeId: string },
) =>
  changeMember(actor, change, once, ({ membership, changes }) => {
    const ended = changes.find(({ id }) => id === change.changeId);
    if (!ended) throw new AppError('not-found');
    const left = changes.filter((other) => other !== ended);
    refuseBrokenSegregation(actor.desk, membership.role, dated(left));
    return {
      event: { kind: 'change-ended', permission: ended.permission, endedGrantId: ended.id },
    };
  });

export const suspendMember = (actor: DeskActor, change: MemberChange) =>
  changeMember(actor, change, once, async (subject) => {
    if (subject.membership.suspendedAt !== null)
      throw refuse('', 'already-suspended', 'This membership is suspended already.');
    await refuseLastHead(actor.desk, subject, '');
    return {
      membership: { suspendedAt: new Date(), suspensionReason: change.reason },
      event: { kind: 'suspended' },
    };
  });

export const reinstateMember = (actor: DeskActor, change: MemberChange) =>
  changeMember(actor, change, once, ({ membership }) => {
    if (membership.suspendedAt === null)
      throw refuse('', 'not-suspended', 'This membership is not suspended.');
    return {
      membership: { suspendedAt: null, suspensionReason: null },
      event: { kind: 'reinstated' },
    };
  });
