import type { Request } from 'express';
import type { Endpoint } from '@/shared/endpoint';
import { AppError } from '@/shared/errors';
import { refreshCookiePath } from './refresh-cookie';

const hostOf = (origin: string): string | null => {
  try {
    return new URL(origin).host;
  } catch {
    // `null` and garbled origins are nobody's pages.
    return null;
  }
};

/** A browser sends the refresh cookie here by itself, so only the tool's own pages may ask. */
export function checkOrigin(endpoint: Endpoint, req: Request) {
  if (
    endpoint.method === 'GET' ||
    !`${req.baseUrl}${req.path}/`.startsWith(`${refreshCookiePath}/`)
  )
    return;
  const { origin, host } = req.headers;
  if (origin === undefined || hostOf(origin) !== host) throw new AppError('origin-refused');
}
