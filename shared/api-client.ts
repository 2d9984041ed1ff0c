/**
 * The one way from a screen to the server: fills the path, sends JSON, checks the answer against
 * the endpoint's schema and turns a problem document into an `ApiError`.
 */
import type { z } from 'zod';
import { apiBase, type Endpoint, type ResponseOf } from './endpoint';
import { errorRow, isErrorCode, problemSchema, type ErrorCode, type Issue } from './errors';

export type ApiErrorCode = ErrorCode | 'no-connection' | 'unreadable-answer';

/** An answer that is not a success: the server's problem, or no answer at all. */
export class ApiError extends Error {
  readonly code: ApiErrorCode;
  readonly issues: Issue[];
  readonly requestId: string | null;

  constructor(
    code: ApiErrorCode,
    message: string,
    issues: Issue[] = [],
    requestId: string | null = null,
  ) {
    super(message);
    this.name = 'ApiError';
    this.code = code;
    this.issues = issues;
    this.requestId = requestId;
  }

  get retryable(): boolean {
    return isErrorCode(this.code) ? errorRow(this.code).retryable : true;
  }
}

export type CallInput<E extends Endpoint> = {
  params?: z.input<E['params']>;
  query?: z.input<E['query']>;
  body?: z.input<E['body']>;
  accessToken?: string;
  idempotencyKey?: string;
  signal?: AbortSignal;
};

export function endpointUrl(
  endpoint: Endpoint,
  params: Readonly<Record<string, string>>,
  query: Readonly<Record<string, string | number | undefined>>,
): string {
  const path = endpoint.path.replace(/:(\w+)/g, (_, name: string) =>
    encodeURIComponent(params[name]),
  );
  const search = new URLSearchParams();
  for (const [name, value] of Object.entries(query))
    if (value !== undefined && value !== '') search.set(name, String(value));
  const text = search.toString();
  return `${apiBase}${path}${text === '' ? '' : `?${text}`}`;
}

async function send(url: string, init: RequestInit): Promise<Response> {
  try {
    return await fetch(url, init);
  } catch (error) {
    if (error instanceof DOMException && error.name === 'AbortError') throw error;
    throw new ApiError('no-connection', 'The server does not answer. Nothing was lost; try again.');
  }
}

async function readJson(response: Response): Promise<unknown> {
  try {
    return await response.json();
  } catch {
    throw new ApiError(
      'unreadable-answer',
      `The server’s answer (status ${response.status}) could not be read. Try again.`,
    );
  }
}

export async function callEndpoint<E extends Endpoint>(
  endpoint: E,
  input: CallInput<E> = {},
): Promise<ResponseOf<E>> {
  const headers: Record<string, string> = { accept: 'application/json' };
  if (input.accessToken) headers.authorization = `Bearer ${input.accessToken}`;
  if (input.idempotencyKey) headers['idempotency-key'] = input.idempotencyKey;
  if (endpoint.method !== 'GET') headers['content-type'] = 'application/json';
  const url = endpointUrl(
    endpoint,
    (input.params ?? {}) as Record<string, string>,
    (input.query ?? {}) as Record<string, string>,
  );
  const response = await send(url, {
    method: endpoint.method,
    headers,
    credentials: 'same-origin',
    body: endpoint.method === 'GET' ? undefined : JSON.stringify(input.body ?? {}),
    signal: input.signal,
  });
  const answer = await readJson(response);
  if (response.ok) return endpoint.response.parse(answer) as ResponseOf<E>;
  const problem = problemSchema.safeParse(answer);
  if (!problem.success || !isErrorCode(problem.data.code))
    throw new ApiError('unreadable-answer', 'The server’s answer could not be read. Try again.');
  const { code, title, issues, requestId } = problem.data;
  throw new ApiError(code, title, issues, requestId);
}
