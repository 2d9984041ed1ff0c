import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { endpoints } from '@/shared/contracts';
import type { ChainKind, HeldPlace } from '@/shared/contracts/chain';
import { call, newIdempotencyKey } from './api';

const chainsKey = (deskId: string) => ['chains', deskId] as const;

/** How often work in the background is asked how far it is. */
const pollEveryMs = 500;

export function useChains(deskId: string) {
  return useQuery({
    queryKey: chainsKey(deskId),
    queryFn: ({ signal }) => call(endpoints.getChains, { params: { deskId }, signal }),
    refetchInterval: ({ state }) => {
      const works = state.data?.chains.flatMap(({ verifications }) => verifications) ?? [];
      return works.some(({ status }) => status !== 'finished') ? pollEveryMs : false;
    },
  });
}

export function useVerify(deskId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: { chain: ChainKind; held: HeldPlace | null }) =>
      call(endpoints.startVerification, {
        params: { deskId },
        body,
        idempotencyKey: newIdempotencyKey(),
      }),
    onSuccess: () => client.invalidateQueries({ queryKey: chainsKey(deskId) }),
  });
}
