import { useInfiniteQuery, useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { endpoints } from '@/shared/contracts';
import {
  largestFileBytes,
  type MarketFileReport,
  type Snapshot,
  type SnapshotDraft,
  type SnapshotStatus,
} from '@/shared/contracts/market-data';
import { call } from './api';

const pageSize = 50;

const listKey = (deskId: string) => ['market-data', deskId] as const;
const snapshotKey = (deskId: string, snapshotId: string) =>
  ['market-snapshot', deskId, snapshotId] as const;

export function useSnapshots(deskId: string, status: SnapshotStatus | null) {
  return useInfiniteQuery({
    queryKey: [...listKey(deskId), status],
    initialPageParam: undefined as string | undefined,
    queryFn: ({ pageParam, signal }) =>
      call(endpoints.listSnapshots, {
        params: { deskId },
        query: { cursor: pageParam, limit: pageSize, status: status ?? undefined },
        signal,
      }),
    getNextPageParam: (page) => page.nextCursor ?? undefined,
    select: ({ pages }) => pages.flatMap(({ items }) => items),
  });
}

export function useSnapshot(deskId: string, snapshotId: string) {
  return useQuery({
    queryKey: snapshotKey(deskId, snapshotId),
    queryFn: ({ signal }) =>
      call(endpoints.getSnapshot, { params: { deskId, snapshotId }, signal }),
  });
}

/** The approved close that the numbers of a day are compared with; not asked for half a date. */
export function usePreviousClose(deskId: string, date: string | null) {
  return useQuery({
    queryKey: [...listKey(deskId), 'previous', date],
    enabled: date !== null,
    queryFn: ({ signal }) =>
      call(endpoints.getPreviousClose, { params: { deskId, date: date ?? '' }, signal }),
    select: ({ close }) => close,
  });
}

/** An approved close is what tickets start from: underlyings are read again as well. */
function useKeepSnapshot(deskId: string) {
  const client = useQueryClient();
  return (snapshot: Snapshot) => {
    client.setQueryData(snapshotKey(deskId, snapshot.id), snapshot);
    void client.invalidateQueries({ queryKey: listKey(deskId) });
    void client.invalidateQueries({ queryKey: ['underlyings', deskId] });
  };
}

export type SnapshotSending = { body: SnapshotDraft; idempotencyKey: string };

/** Enters a close, or saves the draft that is open. */
export function useSendSnapshot(deskId: string, draft: Pick<Snapshot, 'id' | 'version'> | null) {
  const client = useQueryClient();
  const keep = useKeepSnapshot(deskId);
  return useMutation({
    mutationFn: ({ body, idempotencyKey }: SnapshotSending) =>
      draft === null
        ? call(endpoints.createSnapshot, { params: { deskId }, body, idempotencyKey })
        : call(endpoints.saveSnapshot, {
            params: { deskId, snapshotId: draft.id },
            body: { ...body, version: draft.version },
          }),
    onSuccess: keep,
    onError: () => {
      if (draft) void client.invalidateQueries({ queryKey: snapshotKey(deskId, draft.id) });
    },
  });
}

export function useApproveSnapshot(deskId: string, { id, version }: Snapshot) {
  const client = useQueryClient();
  const keep = useKeepSnapshot(deskId);
  return useMutation({
    mutationFn: (confirmedWarnings: string[]) =>
      call(endpoints.approveSnapshot, {
        params: { deskId, snapshotId: id },
        body: { version, confirmedWarnings },
      }),
    onSuccess: keep,
    onError: () => void client.invalidateQueries({ queryKey: snapshotKey(deskId, id) }),
  });
}

export function useRestateSnapshot(deskId: string, snapshotId: string) {
  const keep = useKeepSnapshot(deskId);
  return useMutation({
    mutationFn: ({ reason, idempotencyKey }: { reason: string; idempotencyKey: string }) =>
      call(endpoints.restateSnapshot, {
        params: { deskId, snapshotId },
        body: { reason },
        idempotencyKey,
      }),
    onSuccess: keep,
  });
}

/** The bytes as base64, in pieces that fit into one call. */
function base64Of(bytes: Uint8Array): string {
  const pieceSize = 8_192;
  let binary = '';
  for (let from = 0; from < bytes.length; from += pieceSize)
    binary += String.fromCharCode(...bytes.subarray(from, from + pieceSize));
  return btoa(binary);
}

export const isTooLarge = ({ size }: File): boolean => size > largestFileBytes;

/** A dry run: the server says what is wrong with the file, and writes nothing. */
export function useFileCheck(deskId: string) {
  return useMutation<MarketFileReport, Error, File>({
    mutationFn: async (file) =>
      call(endpoints.checkMarketFile, {
        params: { deskId },
        body: { content: base64Of(new Uint8Array(await file.arrayBuffer())) },
      }),
  });
}
