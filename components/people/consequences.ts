import { consequenceText as text, memberText } from '@/constants/texts/people';
import { shellText } from '@/constants/texts/shell';
import type { Member } from '@/shared/contracts/people';
import {
  brokenSegregation,
  effectivePermissions,
  permissionSentence,
  roleHas,
  type DeskRole,
  type Permission,
  type PermissionChange,
} from '@/shared/permissions';

/** What an act will do, said before it is confirmed. */
export type Consequences = {
  sentences: string[];
  /** The act would change nothing, or the server would refuse it: it is not offered. */
  blocked: boolean;
};

const heldBy = (member: Member) => effectivePermissions(member.role, member.changes);

function refusal(after: readonly Permission[]): string | null {
  const pair = brokenSegregation(after);
  return pair && text.broken(permissionSentence(pair[0]), permissionSentence(pair[1]));
}

function withRefusal(sentences: string[], after: readonly Permission[]): Consequences {
  const refused = refusal(after);
  return refused === null
    ? { sentences, blocked: false }
    : { sentences: [...sentences, refused], blocked: true };
}

export function consequencesOfRole(member: Member, role: DeskRole): Consequences {
  if (role === member.role) return { sentences: [text.sameRole], blocked: true };
  const before = heldBy(member);
  const after = effectivePermissions(role, member.changes);
  const gained = after.filter((permission) => !before.includes(permission));
  const lost = before.filter((permission) => !after.includes(permission));
  const sentences = [
    text.role(member.user.name, shellText.roles[member.role], shellText.roles[role]),
    ...gained.map((permission) => text.gains(permissionSentence(permission))),
    ...lost.map((permission) => text.loses(permissionSentence(permission))),
  ];
  if (member.changes.length > 0) sentences.push(text.keeps);
  return withRefusal(sentences, after);
}

export function consequencesOfChange(
  member: Member,
  change: PermissionChange,
  endsOn: string | null,
): Consequences {
  const before = heldBy(member);
  const what = permissionSentence(change.permission);
  const until = endsOn === null ? memberText.withoutEnd : memberText.until(endsOn);
  const after = effectivePermissions(member.role, [...member.changes, change]);
  if (change.effect === 'grant' && before.includes(change.permission))
    return { sentences: [text.has], blocked: true };
  if (change.effect === 'withdraw' && !before.includes(change.permission))
    return { sentences: [text.lacks], blocked: true };
  return withRefusal([text[change.effect](member.user.name, what, until)], after);
}

export function consequencesOfEnd(member: Member, changeId: string): Consequences {
  const change = member.changes.find(({ id }) => id === changeId);
  if (!change) return { sentences: [], blocked: true };
  const what = permissionSentence(change.permission);
  const sentence =
    change.effect === 'grant'
      ? text.endGrant(member.user.name, what)
      : text.endWithdrawal(member.user.name, what);
  const left = member.changes.filter(({ id }) => id !== changeId);
  return withRefusal([sentence], effectivePermissions(member.role, left));
}

export type Standing = {
  permission: Permission;
  held: boolean;
  source: 'role' | 'granted' | 'withdrawn' | null;
};

/** Every permission that the person holds, or would hold by role, and where it comes from. */
export function standingOf({ role, changes }: Member): Standing[] {
  const effects = new Map(changes.map(({ permission, effect }) => [permission, effect]));
  const named = effectivePermissions(
    role,
    changes.filter(({ effect }) => effect === 'grant'),
  );
  return named.map((permission) => {
    const effect = effects.get(permission);
    if (effect === 'withdraw') return { permission, held: false, source: 'withdrawn' };
    return { permission, held: true, source: roleHas(role, permission) ? 'role' : 'granted' };
  });
}
