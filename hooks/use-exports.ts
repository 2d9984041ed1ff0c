import { useInfiniteQuery, useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { endpoints } from '@/shared/contracts';
import type { ExportFormat } from '@/shared/contracts/exports';
import type { HistoryFilter } from '@/shared/contracts/history';
import { call, newIdempotencyKey } from './api';
import { saveFile } from './save-file';

const pollEveryMs = 500;

export function useExports(deskId: string) {
  return useInfiniteQuery({
    queryKey: ['exports', deskId],
    initialPageParam: undefined as string | undefined,
    queryFn: ({ pageParam, signal }) =>
      call(endpoints.listExports, {
        params: { deskId },
        query: { cursor: pageParam, limit: 20 },
        signal,
      }),
    getNextPageParam: (page) => page.nextCursor ?? undefined,
    select: ({ pages }) => pages.flatMap(({ items }) => items),
  });
}

export function useCreateExport(deskId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: { format: ExportFormat; filter: HistoryFilter }) =>
      call(endpoints.createExport, {
        params: { deskId },
        body,
        idempotencyKey: newIdempotencyKey(),
      }),
    onSuccess: () => client.invalidateQueries({ queryKey: ['exports', deskId] }),
  });
}

/** One export, asked again and again until its file is ready. */
export function useExport(deskId: string, exportId: string | null) {
  return useQuery({
    queryKey: ['export', deskId, exportId],
    queryFn: ({ signal }) =>
      call(endpoints.getExport, { params: { deskId, exportId: exportId ?? '' }, signal }),
    enabled: exportId !== null,
    refetchInterval: ({ state }) => (state.data?.status === 'ready' ? false : pollEveryMs),
  });
}

const bytesOf = (base64: string) =>
  Uint8Array.from(atob(base64), (character) => character.charCodeAt(0));

/** Reads the file of an export and hands it to the browser to keep. */
export function useSaveExport(deskId: string) {
  return useMutation({
    mutationFn: async (exportId: string) => {
      const { fileName, mediaType, base64 } = await call(endpoints.getExportFile, {
        params: { deskId, exportId },
      });
      saveFile(fileName, new Blob([bytesOf(base64)], { type: mediaType }));
    },
  });
}
