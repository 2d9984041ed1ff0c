import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { endpoints } from '@/shared/contracts';
import type { BookDraft } from '@/shared/contracts/books';
import { call } from './api';

export const booksKey = (deskId: string) => ['books', deskId] as const;

export function useBooks(deskId: string) {
  return useQuery({
    queryKey: booksKey(deskId),
    queryFn: ({ signal }) => call(endpoints.listBooks, { params: { deskId }, signal }),
    select: ({ books }) => books,
  });
}

export function useCreateBook(deskId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ body, idempotencyKey }: { body: BookDraft; idempotencyKey: string }) =>
      call(endpoints.createBook, { params: { deskId }, body, idempotencyKey }),
    onSuccess: () => client.invalidateQueries({ queryKey: booksKey(deskId) }),
  });
}
