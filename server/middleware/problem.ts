/** Every failure leaves as an RFC 9457 problem document. */
import type { ErrorRequestHandler, Request, RequestHandler, Response } from 'express';
import { ConnectionError } from 'sequelize';
import { z } from 'zod';
import { AppError, errorRow, type Problem } from '@/shared/errors';

/** What body-parser throws: which kind, and the status that it would give. */
const bodyErrorSchema = z.object({ type: z.string(), status: z.number().min(400).max(499) });

function appErrorOf(error: unknown): AppError {
  if (error instanceof AppError) return error;
  if (error instanceof ConnectionError) return new AppError('not-ready');
  const bodyError = bodyErrorSchema.safeParse(error);
  if (!bodyError.success) return new AppError('unexpected');
  return new AppError(
    bodyError.data.type === 'entity.too.large' ? 'request-too-large' : 'malformed-request',
  );
}

function sendProblem(req: Request, res: Response, { code, message, issues }: AppError) {
  const { status } = errorRow(code);
  const problem: Problem = {
    type: `urn:driftless:problem:${code}`,
    title: message,
    status,
    code,
    requestId: String(req.id),
    issues,
  };
  res.status(status).type('application/problem+json').send(JSON.stringify(problem));
}

export const unknownPath: RequestHandler = () => {
  throw new AppError('not-found');
};

export const wrongMethod =
  (allowed: readonly string[]): RequestHandler =>
  (_req, res) => {
    res.set('Allow', allowed.join(', '));
    throw new AppError('method-not-allowed');
  };

/** Express knows an error handler by its four parameters. */
export const problems: ErrorRequestHandler = (error, req, res, next) => {
  const appError = appErrorOf(error);
  // The request's own log line carries it, as an error.
  if (appError.code === 'unexpected') res.err = error;
  if (res.headersSent) next(error);
  else sendProblem(req, res, appError);
};
