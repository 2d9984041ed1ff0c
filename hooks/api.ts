/**
 * The session of this tab and the one way from a hook to the server. The access token lives in
 * memory only. A call that meets an ended session refreshes it once; when that fails too, it waits
 * until the person has signed in again over the open screen, and is then sent once more, so that
 * nothing typed is lost. A call that needs the password again waits for it in the same way.
 */
import { QueryClient } from '@tanstack/react-query';
import { z } from 'zod';
import { ApiError, callEndpoint, type CallInput } from '@/shared/api-client';
import { endpoints } from '@/shared/contracts';
import type { Me, Session } from '@/shared/contracts/sessions';
import type { Endpoint, ResponseOf } from '@/shared/endpoint';
import { permissions, type Permission } from '@/shared/permissions';
import { readStored, writeStored } from './local-store';

/** What the tab asks of the person before waiting calls can go on. */
export type Prompt = 'sign-in-again' | 'confirm-password';

export type SessionState = {
  status: 'unknown' | 'signed-out' | 'signed-in';
  me: Me | null;
  prompt: Prompt | null;
  /** What the person could do when an act was sent, and was refused because it was taken away. */
  lost: readonly Permission[];
};

/** Scripts cannot see the refresh cookie; this remembers that there may be one to bring back. */
const signedInKey = 'driftless.signed-in';

let state: SessionState = { status: 'unknown', me: null, prompt: null, lost: [] };
let accessToken: string | undefined;
let refreshing: Promise<void> | null = null;
let waiting: {
  prompt: Prompt;
  settle: (answered: boolean) => void;
  answer: Promise<boolean>;
} | null = null;
const listeners = new Set<() => void>();

export const queryClient = new QueryClient({
  defaultOptions: {
    queries: {
      staleTime: 15_000,
      networkMode: 'always',
      retry: (failures, error) => failures < 2 && error instanceof ApiError && error.retryable,
    },
    mutations: { networkMode: 'always', retry: false },
  },
});

export const readSession = (): SessionState => state;

export function subscribeSession(listener: () => void): () => void {
  listeners.add(listener);
  return () => listeners.delete(listener);
}

function setState(change: Partial<SessionState>) {
  state = { ...state, ...change };
  for (const listener of listeners) listener();
}

/** Tabs share the cookie: another person who has signed in must not see what was open before. */
function adopt(session: Session) {
  accessToken = session.accessToken;
  if (state.me !== null && state.me.user.id !== session.me.user.id) {
    queryClient.clear();
    settlePrompt(false);
  }
  writeStored(signedInKey, true);
  setState({ status: 'signed-in', me: session.me });
}

/** Nobody is signed in: nothing of whoever was stays in this tab. */
export function forgetSession(): void {
  accessToken = undefined;
  queryClient.clear();
  settlePrompt(false);
  writeStored(signedInKey, false);
  setState({ status: 'signed-out', me: null, lost: [] });
}

const isSignedOut = (error: unknown): error is ApiError =>
  error instanceof ApiError && (error.code === 'session-ended' || error.code === 'not-signed-in');

const isCode = (error: unknown, ...codes: string[]) =>
  error instanceof ApiError && codes.includes(error.code);

/** Tabs share the refresh cookie, which is rotated: one tab at a time may use it. */
async function alone<T>(work: () => Promise<T>): Promise<T> {
  if (!navigator.locks) return work();
  return navigator.locks.request('driftless-session', work);
}

/** One refresh at a time in this tab; calls that fail together share it. */
function refresh(): Promise<void> {
  refreshing ??= alone(async () => adopt(await callEndpoint(endpoints.refreshSession))).finally(
    () => {
      refreshing = null;
    },
  );
  return refreshing;
}

function ask(prompt: Prompt): Promise<boolean> {
  if (waiting?.prompt === prompt) return waiting.answer;
  settlePrompt(false);
  let settle: (answered: boolean) => void = () => undefined;
  const answer = new Promise<boolean>((resolve) => {
    settle = resolve;
  });
  waiting = { prompt, settle, answer };
  setState({ prompt });
  return answer;
}

function settlePrompt(answered: boolean) {
  const asked = waiting;
  if (!asked) return;
  waiting = null;
  setState({ prompt: null });
  asked.settle(answered);
}

/** The person closed the dialog: the waiting calls fail with what the server said. */
export const dismissPrompt = (): void => settlePrompt(false);

/** Refreshes the session; where that is refused, waits for a new sign-in over the open screen. */
async function renew(failed: unknown): Promise<void> {
  try {
    await refresh();
  } catch (error) {
    if (!isSignedOut(error) || state.me === null) throw error;
    if (!(await ask('sign-in-again'))) throw failed;
  }
}

const send = <E extends Endpoint>(endpoint: E, input: CallInput<E>) =>
  callEndpoint(endpoint, { ...input, accessToken });

async function sendRenewing<E extends Endpoint>(endpoint: E, input: CallInput<E>) {
  const sentWith = accessToken;
  const sentBy = state.me?.user.id;
  try {
    return await send(endpoint, input);
  } catch (error) {
    if (!isSignedOut(error)) throw error;
    if (sentWith === accessToken) await renew(error);
    // What one person sent is never repeated in the name of another.
    if (sentBy !== state.me?.user.id) throw error;
    return send(endpoint, input);
  }
}

/** Calls an endpoint as the person who is signed in. */
export async function call<E extends Endpoint>(
  endpoint: E,
  input: CallInput<E> = {},
): Promise<ResponseOf<E>> {
  try {
    return await sendRenewing(endpoint, input);
  } catch (error) {
    if (isCode(error, 'not-permitted', 'not-a-member', 'suspended')) await followRefusal();
    if (!isCode(error, 'step-up-required') || !(await ask('confirm-password'))) throw error;
    return sendRenewing(endpoint, input);
  }
}

/** Permissions may have changed meanwhile: reads them again, and what is offered follows. */
export async function reloadMe(): Promise<void> {
  const me = await sendRenewing(endpoints.getMe, {});
  setState({ me });
}

const held = (me: Me | null, permission: Permission) =>
  me?.desks.filter((desk) => desk.permissions.includes(permission)).length ?? 0;

/** What is no longer offered would otherwise go without a word. */
async function followRefusal() {
  const before = state.me;
  await reloadMe();
  const lost = permissions.filter((each) => held(state.me, each) < held(before, each));
  if (lost.length > 0) setState({ lost });
}

export const dismissLost = (): void => setState({ lost: [] });

/** On opening the page: is there a session that the cookie can bring back? */
export async function restoreSession(): Promise<void> {
  if (readStored(signedInKey, z.boolean()) !== true) return forgetSession();
  try {
    await refresh();
  } catch (error) {
    if (!isSignedOut(error)) throw error;
    forgetSession();
  }
}

export async function signIn(body: { email: string; password: string }): Promise<void> {
  adopt(await alone(() => callEndpoint(endpoints.signIn, { body })));
  if (waiting?.prompt === 'sign-in-again') settlePrompt(true);
}

export async function confirmPassword(password: string): Promise<void> {
  await sendRenewing(endpoints.stepUp, { body: { password } });
  settlePrompt(true);
}

/** Without an answer of the server the cookie would live on: then nothing is signed out at all. */
export async function signOut(): Promise<void> {
  await alone(() => callEndpoint(endpoints.signOut, { accessToken }));
  forgetSession();
}

/** Marks one intention, so that sending it twice creates one record. */
export function newIdempotencyKey(): string {
  const bytes = crypto.getRandomValues(new Uint8Array(16));
  bytes[6] = (bytes[6] & 0x0f) | 0x40;
  bytes[8] = (bytes[8] & 0x3f) | 0x80;
  const hex = Array.from(bytes, (byte) => byte.toString(16).padStart(2, '0')).join('');
  return hex.replace(/^(.{8})(.{4})(.{4})(.{4})(.{12})$/, '$1-$2-$3-$4-$5');
}
