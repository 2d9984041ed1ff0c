import { useQuery } from '@tanstack/react-query';
import { endpoints } from '@/shared/contracts';
import { call } from './api';

/** Underlyings of the desk with their last approved close; kept while the server is away. */
export function useUnderlyings(deskId: string) {
  return useQuery({
    queryKey: ['underlyings', deskId],
    queryFn: ({ signal }) => call(endpoints.listUnderlyings, { params: { deskId }, signal }),
    select: ({ underlyings }) => underlyings,
  });
}
