import type { Request } from 'express';
import type { z } from 'zod';
import type { Endpoint } from '@/shared/endpoint';
import { AppError } from '@/shared/errors';
import { issuesOfError, sentenceOf } from './issues';

export type ValidInput = { params: unknown; query: unknown; body: unknown };

/** Checks everything that was sent before complaining, so that one answer names every field. */
export function validate(endpoint: Endpoint, req: Request): ValidInput {
  const parse = (schema: z.ZodType, input: unknown) =>
    schema.safeParse(input, { reportInput: true, error: sentenceOf });
  const params = parse(endpoint.params, req.params);
  const query = parse(endpoint.query, req.query);
  const body = parse(endpoint.body, req.body ?? {});
  if (params.success && query.success && body.success)
    return { params: params.data, query: query.data, body: body.data };
  const issues = [params, query, body].flatMap(({ error }) => (error ? issuesOfError(error) : []));
  throw new AppError('validation-failed', issues);
}
