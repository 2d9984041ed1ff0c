/** The people of both desks, named by their role, and what their heads have changed since. */
import { randomBytes } from 'node:crypto';
import { sequelize } from '../database';
import type { Desk } from '../models/desk';
import { addDays } from '@/shared/dates';
import type { DeskRole } from '@/shared/permissions';
import { findDeskActor, today, type DeskActor } from '../services/access';
import { appointMember, createUser, newPasswordHash } from '../services/firm';
import { changePermission, endPermissionChange, suspendMember } from '../services/people';
import signIns from './sign-ins.json';

type Person = { userId: string; name: string };
export type People = ReadonlyMap<string, Person>;

const domain = 'tarnfield.example';

/** `second-risk-officer@…` is shown as “Second risk officer”. */
function nameOf(email: string): string {
  const words = email.split('@')[0].replaceAll('-', ' ');
  return words.charAt(0).toUpperCase() + words.slice(1);
}

async function createPerson(email: string, passwordHash: string): Promise<Person> {
  const name = nameOf(email);
  const { id } = await createUser({ email, name, passwordHash });
  return { userId: id, name };
}

/** One hash a password: every person of the demonstration has the same one. */
async function hashPasswords(): Promise<ReadonlyMap<string, string>> {
  const passwords = [...new Set(signIns.map(({ password }) => password))];
  const hashes = passwords.map(
    async (password) => [password, await newPasswordHash(password)] as const,
  );
  return new Map(await Promise.all(hashes));
}

const isRole = (text: string): text is DeskRole =>
  ['analyst', 'desk-head', 'risk-officer', 'auditor'].includes(text);

/** Users and memberships. The administrator appoints them, and has no way in and no desk. */
export async function seedPeople(desks: readonly Desk[]): Promise<People> {
  const hashes = await hashPasswords();
  const nobody = await newPasswordHash(randomBytes(24).toString('hex'));
  const administrator = await createPerson(`administrator@${domain}`, nobody);
  const people = new Map<string, Person>();
  for (const { email, password, role, desk: deskName } of signIns) {
    const desk = desks.find(({ name }) => name === deskName);
    const passwordHash = hashes.get(password);
    if (!desk || !passwordHash || !isRole(role))
      throw new Error(`The sign-in of ${email} names no desk or role.`);
    const person = people.get(email) ?? (await createPerson(email, passwordHash));
    people.set(email, person);
    await appointMember(desk, {
      userId: person.userId,
      role,
      reason: 'Appointed when the desk was set up',
      madeById: administrator.userId,
    });
  }
  return people;
}

export function personNamed(people: People, account: string): Person {
  const person = people.get(`${account}@${domain}`);
  if (!person) throw new Error(`There is no ${account} among the sign-ins.`);
  return person;
}

export async function actorOn(desk: Desk, person: Person): Promise<DeskActor> {
  const actor = await findDeskActor(person, desk.id);
  if (!actor) throw new Error(`${person.name} is no member of ${desk.name}.`);
  return actor;
}

/** A grant that ends, one that was ended before its day, and a suspension. */
export async function seedChanges(desk: Desk, people: People) {
  const head = await actorOn(desk, personNamed(people, 'desk-head'));
  const secondAnalyst = personNamed(people, 'second-analyst');
  const away = personNamed(people, 'suspended-analyst');
  await changePermission(
    head,
    {
      userId: secondAnalyst.userId,
      permission: 'export-history',
      effect: 'grant',
      endsOn: addDays(today(desk), 21),
      reason: 'Prepares the file for the yearly review',
      version: 0,
    },
    (write) => sequelize.transaction(write),
  );
  const { changes, version } = await changePermission(
    head,
    {
      userId: secondAnalyst.userId,
      permission: 'start-runs',
      effect: 'withdraw',
      endsOn: null,
      reason: 'Learns the evening routine first',
      version: 1,
    },
    (write) => sequelize.transaction(write),
  );
  const withdrawn = changes.find(({ permission }) => permission === 'start-runs');
  if (!withdrawn) throw new Error('The withdrawal is not among the changes in force.');
  await endPermissionChange(head, {
    userId: secondAnalyst.userId,
    changeId: withdrawn.id,
    reason: 'Has learnt the evening routine',
    version,
  });
  await suspendMember(head, {
    userId: away.userId,
    reason: 'On leave until the spring',
    version: 0,
  });
}
