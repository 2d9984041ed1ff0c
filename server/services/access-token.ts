import { sign, TokenExpiredError, verify } from 'jsonwebtoken';
import { z } from 'zod';
import { keyNamed } from '../keys';

export const accessTokenSeconds = 600;

const payloadSchema = z.object({ sid: z.uuid() });

let key: Buffer | null = null;
const accessKey = () => (key ??= keyNamed('access-token'));

/** It says which session it belongs to and nothing else; what that person may do is read per request. */
export const makeAccessToken = (sessionId: string): string =>
  sign({ sid: sessionId }, accessKey(), { algorithm: 'HS256', expiresIn: accessTokenSeconds });

/** The session of a token; null for one that is forged, garbled or past its time. */
export function sessionIdOf(token: string): string | null {
  try {
    const payload = payloadSchema.safeParse(verify(token, accessKey(), { algorithms: ['HS256'] }));
    return payload.success ? payload.data.sid : null;
  } catch (error) {
    if (
      error instanceof TokenExpiredError ||
      (error instanceof Error && error.name === 'JsonWebTokenError')
    )
      return null;
    throw error;
  }
}
