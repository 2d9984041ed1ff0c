import type { Request, Response } from 'express';
import { ipKeyGenerator, rateLimit } from 'express-rate-limit';
import { AppError } from '@/shared/errors';

const attemptsPerWindow = 10;
const windowMs = 5 * 60_000;

export type Throttle = (req: Request, res: Response, account: string) => Promise<void>;

/**
 * Counts failed passwords per account and address together: nobody guesses on, and nobody locks
 * someone else out from another address. Unknown accounts are counted like any other.
 */
export function passwordThrottle(): Throttle {
  const limiter = rateLimit({
    windowMs,
    limit: attemptsPerWindow,
    skipSuccessfulRequests: true,
    standardHeaders: 'draft-7',
    legacyHeaders: false,
    keyGenerator: (req, res) => `${res.locals.account} ${ipKeyGenerator(req.ip ?? '')}`,
    handler: (_req, _res, next) => next(new AppError('too-many-attempts')),
  });
  return (req, res, account) => {
    res.locals.account = account;
    return new Promise((resolve, reject) => {
      void limiter(req, res, (error?: unknown) => (error ? reject(error) : resolve()));
    });
  };
}
