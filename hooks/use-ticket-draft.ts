import { useState, useSyncExternalStore } from 'react';
import { readStored, storeKey, writeStored } from './local-store';
import { emptyTicket, ticketDraftSchema, ticketReducer, type TicketAction } from './ticket-draft';

/** A ticket that is written down in this browser at each step. */
function createDraftStore(key: string) {
  let state = { draft: readStored(key, ticketDraftSchema) ?? emptyTicket, kept: true };
  const listeners = new Set<() => void>();
  return {
    read: () => state,
    subscribe(listener: () => void) {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
    dispatch(action: TicketAction) {
      const draft = ticketReducer(state.draft, action);
      state = { draft, kept: writeStored(key, draft) };
      for (const listener of listeners) listener();
    },
  };
}

/** The ticket of one person on one desk, which outlives reload and sign-out. */
export function useTicketDraft(userId: string, deskId: string) {
  const [store] = useState(() => createDraftStore(storeKey('ticket', userId, deskId)));
  const { draft, kept } = useSyncExternalStore(store.subscribe, store.read);
  return { draft, kept, dispatch: store.dispatch };
}
