/** Who changed what, when and why: read from the grants themselves. */
import type { AccessEvent } from '@/shared/contracts/people';
import type { Desk } from '../models/desk';
import { Grant } from '../models/grant';
import { User } from '../models/user';
import { after, pageOf } from './page';

function eventOf(grant: Grant): AccessEvent {
  const { id, kind, madeAt, madeBy, subject, permission, role, previousRole } = grant;
  if (!madeBy || !subject) throw new Error('A grant was read without its people.');
  return {
    id,
    kind,
    at: madeAt.toISOString(),
    madeBy: { id: madeBy.id, name: madeBy.name },
    subject: { id: subject.id, name: subject.name },
    permission,
    role,
    previousRole,
    reason: grant.reason,
    endsOn: grant.endsOn,
  };
}

export async function listAccessEvents(
  desk: Desk,
  query: { cursor?: string; limit: number; userId?: string },
) {
  const rows = await Grant.findAll({
    where: {
      deskId: desk.id,
      ...(query.userId === undefined ? {} : { subjectId: query.userId }),
      ...after('madeAt', query.cursor),
    },
    include: [
      { model: User, as: 'madeBy', attributes: ['id', 'name'] },
      { model: User, as: 'subject', attributes: ['id', 'name'] },
    ],
    order: [
      ['madeAt', 'DESC'],
      ['id', 'DESC'],
    ],
    limit: query.limit + 1,
  });
  return pageOf(rows, query.limit, eventOf, ({ madeAt, id }) => ({ at: madeAt, id }));
}
