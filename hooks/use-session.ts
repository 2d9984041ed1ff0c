import { useSyncExternalStore } from 'react';
import type { DeskAccess } from '@/shared/contracts/sessions';
import type { Permission } from '@/shared/permissions';
import { readSession, signIn, signOut, subscribeSession, type SessionState } from './api';

export type SessionView = SessionState & {
  /** The desk as this person sees it; undefined when they are no member of it. */
  desk: (deskId: string) => DeskAccess | undefined;
  /** Whether the person may do this on the desk now; what they may not do is not offered. */
  may: (deskId: string, permission: Permission) => boolean;
  signIn: typeof signIn;
  signOut: typeof signOut;
};

export function useSession(): SessionView {
  const state = useSyncExternalStore(subscribeSession, readSession);
  const desk = (deskId: string) => state.me?.desks.find(({ id }) => id === deskId);
  const may = (deskId: string, permission: Permission) => {
    const access = desk(deskId);
    return access !== undefined && !access.suspended && access.permissions.includes(permission);
  };
  return { ...state, desk, may, signIn, signOut };
}
