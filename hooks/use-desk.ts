import { useLocalSearchParams } from 'expo-router';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { readSession } from './api';
import { useSession } from './use-session';

/** The desk of the address; the frame of the desk's screens has made sure that it is one's own. */
export function useDesk(): DeskAccess {
  const { deskId } = useLocalSearchParams<{ deskId: string }>();
  const access = useSession().desk(deskId);
  if (!access) throw new Error('A desk screen was opened outside the frame of a desk.');
  return access;
}

const storageKey = 'driftless-desk';

export const rememberDesk = (deskId: string): void =>
  window.localStorage.setItem(storageKey, deskId);

/** The desk that was open last, or the first one; one that is open to this person before others. */
export function landingDesk(): DeskAccess | undefined {
  const desks = readSession().me?.desks ?? [];
  const open = desks.filter(({ suspended }) => !suspended);
  const kept = window.localStorage.getItem(storageKey);
  return open.find(({ id }) => id === kept) ?? open[0] ?? desks[0];
}
