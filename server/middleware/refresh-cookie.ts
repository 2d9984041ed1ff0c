import type { Request, Response } from 'express';
import { apiBase } from '@/shared/endpoint';
import { env } from '../env';

export const refreshCookiePath = `${apiBase}/sessions`;

/** Cookies know no ports: two services on one host would overwrite each other's without it. */
const cookieName = `driftless_refresh_${env.port}`;

export function readRefreshCookie(req: Request): string | null {
  const pairs = (req.headers.cookie ?? '').split(';').map((pair) => pair.trim());
  const own = pairs.find((pair) => pair.startsWith(`${cookieName}=`));
  return own === undefined ? null : own.slice(cookieName.length + 1);
}

const attributes = (req: Request) => ({
  httpOnly: true,
  sameSite: 'strict' as const,
  secure: req.secure,
  path: refreshCookiePath,
});

export function setRefreshCookie(req: Request, res: Response, token: string, expires: Date) {
  res.cookie(cookieName, token, { ...attributes(req), expires });
}

export function clearRefreshCookie(req: Request, res: Response) {
  res.clearCookie(cookieName, attributes(req));
}
