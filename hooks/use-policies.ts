import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { endpoints } from '@/shared/contracts';
import type { Policy, PolicyDraft } from '@/shared/contracts/policies';
import { call } from './api';

const policiesKey = (deskId: string) => ['policies', deskId] as const;

export function usePolicies(deskId: string) {
  return useQuery({
    queryKey: policiesKey(deskId),
    queryFn: ({ signal }) => call(endpoints.listPolicies, { params: { deskId }, signal }),
    select: ({ policies }) => policies,
  });
}

/** Whatever comes of it, policies are read again; tickets take their tolerances from them. */
function useReread(deskId: string) {
  const client = useQueryClient();
  return async () => {
    void client.invalidateQueries({ queryKey: ['underlyings', deskId] });
    await client.invalidateQueries({ queryKey: policiesKey(deskId) });
  };
}

export type PolicySending = { body: PolicyDraft; idempotencyKey: string };

/** Writes a policy, or saves the draft that waits. */
export function useSendPolicy(deskId: string, draft: Pick<Policy, 'id' | 'version'> | null) {
  const reread = useReread(deskId);
  return useMutation({
    mutationFn: ({ body, idempotencyKey }: PolicySending) =>
      draft === null
        ? call(endpoints.createPolicy, { params: { deskId }, body, idempotencyKey })
        : call(endpoints.savePolicy, {
            params: { deskId, policyId: draft.id },
            body: { ...body, version: draft.version },
          }),
    onSettled: reread,
  });
}

export function useApprovePolicy(deskId: string, { id, version }: Policy) {
  const reread = useReread(deskId);
  return useMutation({
    mutationFn: () =>
      call(endpoints.approvePolicy, { params: { deskId, policyId: id }, body: { version } }),
    onSettled: reread,
  });
}
