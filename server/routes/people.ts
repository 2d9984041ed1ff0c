import {
  changePermission,
  endPermissionChange,
  listAccessEvents,
  listMembers,
  reinstateMember,
  setRole,
  suspendMember,
} from '@/shared/contracts/people';
import { route } from '../middleware/route';
import * as accessEvents from '../services/access-events';
import * as members from '../services/members';
import * as people from '../services/people';

export const peopleRoutes = [
  route(listMembers, async ({ actor }) => ({ members: await members.listMembers(actor.desk) })),
  route(setRole, ({ actor, params, body }) =>
    people.setRole(actor, { userId: params.userId, ...body }),
  ),
  route(changePermission, ({ actor, params, body, writeOnce }) =>
    people.changePermission(actor, { userId: params.userId, ...body }, writeOnce),
  ),
  route(endPermissionChange, ({ actor, params, body }) =>
    people.endPermissionChange(actor, {
      userId: params.userId,
      changeId: params.changeId,
      ...body,
    }),
  ),
  route(suspendMember, ({ actor, params, body }) =>
    people.suspendMember(actor, { userId: params.userId, ...body }),
  ),
  route(reinstateMember, ({ actor, params, body }) =>
    people.reinstateMember(actor, { userId: params.userId, ...body }),
  ),
  route(listAccessEvents, ({ actor, query }) => accessEvents.listAccessEvents(actor.desk, query)),
];
