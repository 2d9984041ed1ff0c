import { getMe, refreshSession, signIn, signOut, stepUp } from '@/shared/contracts/sessions';
import type { Request, Response } from 'express';
import {
  clearRefreshCookie,
  readRefreshCookie,
  setRefreshCookie,
} from '../middleware/refresh-cookie';
import { route } from '../middleware/route';
import { passwordThrottle } from '../middleware/throttle';
import * as sessions from '../services/sessions';

const throttle = passwordThrottle();

function answerWith(req: Request, res: Response, opened: sessions.OpenedSession) {
  setRefreshCookie(req, res, opened.refreshToken, opened.expiresAt);
  return opened.session;
}

export const sessionRoutes = [
  route(signIn, async ({ body, req, res }) => {
    await throttle(req, res, body.email);
    return answerWith(req, res, await sessions.signIn(body.email, body.password));
  }),
  route(refreshSession, async ({ req, res }) =>
    answerWith(req, res, await sessions.refreshSession(readRefreshCookie(req))),
  ),
  route(signOut, async ({ req, res }) => {
    const ended = await sessions.signOut(readRefreshCookie(req));
    clearRefreshCookie(req, res);
    return { ended };
  }),
  route(stepUp, async ({ signedIn, body, req, res }) => {
    await throttle(req, res, signedIn.email);
    const validUntil = await sessions.stepUp(signedIn, body.password);
    return { validUntil: validUntil.toISOString() };
  }),
  route(getMe, ({ signedIn }) => sessions.readMe(signedIn)),
];
