import type { Request } from 'express';
import { AppError } from '@/shared/errors';
import { findSignedIn, type SignedIn } from '../services/sessions';

export async function authenticate(req: Request): Promise<SignedIn> {
  const token = /^Bearer (\S+)$/.exec(req.headers.authorization ?? '')?.[1];
  if (token === undefined) throw new AppError('not-signed-in');
  return findSignedIn(token);
}
