import { z } from 'zod';
import type { Access, Endpoint } from '@/shared/endpoint';
import { AppError } from '@/shared/errors';
import type { Permission } from '@/shared/permissions';
import { findDeskActor, type DeskActor } from '../services/access';
import type { SignedIn } from '../services/sessions';

const isPermission = (access: Access): access is Permission =>
  access !== 'public' && access !== 'session';

const uuidSchema = z.uuid();

/**
 * Whether this person may do this on this desk, from the membership as it is now. A desk that does
 * not exist is answered like one that the person is no member of.
 */
export async function authorize(
  endpoint: Endpoint,
  signedIn: SignedIn,
  deskId: unknown,
): Promise<DeskActor | null> {
  const { access, stepUp } = endpoint;
  let actor: DeskActor | null = null;
  if (isPermission(access)) {
    const desk = uuidSchema.safeParse(deskId);
    actor = desk.success ? await findDeskActor(signedIn, desk.data) : null;
    if (!actor) throw new AppError('not-a-member');
    if (actor.membership.suspendedAt !== null) throw new AppError('suspended');
    if (!actor.permissions.includes(access)) throw new AppError('not-permitted');
  }
  if (stepUp && !signedIn.steppedUp) throw new AppError('step-up-required');
  return actor;
}
