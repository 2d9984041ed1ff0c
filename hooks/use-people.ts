import {
  useInfiniteQuery,
  useMutation,
  useQuery,
  useQueryClient,
  type QueryClient,
} from '@tanstack/react-query';
import { endpoints } from '@/shared/contracts';
import type { Member } from '@/shared/contracts/people';
import type { BodyOf } from '@/shared/endpoint';
import { call } from './api';

const peopleKey = (deskId: string) => ['people', deskId] as const;
const accessEventsKey = (deskId: string) => ['access-events', deskId] as const;

export function usePeople(deskId: string) {
  return useQuery({
    queryKey: peopleKey(deskId),
    queryFn: ({ signal }) => call(endpoints.listMembers, { params: { deskId }, signal }),
    select: ({ members }) => members,
  });
}

/** Changes of people's permissions, newest first, a page at a time. */
export function useAccessEvents(deskId: string, userId: string | undefined) {
  return useInfiniteQuery({
    queryKey: [...accessEventsKey(deskId), userId ?? 'everyone'],
    queryFn: ({ pageParam, signal }) =>
      call(endpoints.listAccessEvents, {
        params: { deskId },
        query: { userId, cursor: pageParam },
        signal,
      }),
    initialPageParam: undefined as string | undefined,
    getNextPageParam: ({ nextCursor }) => nextCursor ?? undefined,
    select: ({ pages }) => pages.flatMap(({ items }) => items),
  });
}

/** One binding act on a membership, as the confirming dialog hands it over. */
export type MemberAct =
  | { kind: 'set-role'; body: BodyOf<typeof endpoints.setRole> }
  | {
      kind: 'change-permission';
      body: BodyOf<typeof endpoints.changePermission>;
      idempotencyKey: string;
    }
  | {
      kind: 'end-change';
      changeId: string;
      body: BodyOf<typeof endpoints.endPermissionChange>;
    }
  | { kind: 'suspend' | 'reinstate'; body: BodyOf<typeof endpoints.suspendMember> };

function perform(deskId: string, userId: string, act: MemberAct): Promise<Member> {
  const params = { deskId, userId };
  switch (act.kind) {
    case 'set-role':
      return call(endpoints.setRole, { params, body: act.body });
    case 'change-permission':
      return call(endpoints.changePermission, {
        params,
        body: act.body,
        idempotencyKey: act.idempotencyKey,
      });
    case 'end-change':
      return call(endpoints.endPermissionChange, {
        params: { ...params, changeId: act.changeId },
        body: act.body,
      });
    case 'suspend':
      return call(endpoints.suspendMember, { params, body: act.body });
    case 'reinstate':
      return call(endpoints.reinstateMember, { params, body: act.body });
  }
}

type MemberList = { members: Member[] };

function putMember(client: QueryClient, deskId: string, member: Member) {
  client.setQueryData<MemberList>(peopleKey(deskId), (list) =>
    list === undefined
      ? list
      : {
          members: list.members.map((kept) => (kept.user.id === member.user.id ? member : kept)),
        },
  );
}

export function useMemberAct(deskId: string, userId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (act: MemberAct) => perform(deskId, userId, act),
    onSuccess: async (member) => {
      putMember(client, deskId, member);
      await client.invalidateQueries({ queryKey: accessEventsKey(deskId) });
    },
  });
}

/** After a stale version: what the other person made of it. */
export function useReloadPeople(deskId: string) {
  const client = useQueryClient();
  return () => client.invalidateQueries({ queryKey: peopleKey(deskId) });
}
