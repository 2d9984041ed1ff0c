/** The steps that every request takes, in the one order there is. */
import type { Request, RequestHandler } from 'express';
import { z } from 'zod';
import type { Endpoint } from '@/shared/endpoint';
import { AppError } from '@/shared/errors';
import type { DeskActor } from '../services/access';
import type { SignedIn } from '../services/sessions';
import { findAnswer, writeOnce, type RequestKey, type WriteOnce } from '../services/write-once';
import { authenticate } from './authenticate';
import { authorize } from './authorize';
import { readJsonBody } from './json-body';
import { checkOrigin } from './origin';
import type { Route, RouteInput } from './route';
import { validate, type ValidInput } from './validate';

const keySchema = z.uuid();

function requestKeyOf(
  endpoint: Endpoint,
  req: Request,
  signedIn: SignedIn | null,
  input: ValidInput,
): RequestKey | null {
  if (!endpoint.idempotent) return null;
  if (!signedIn) throw new Error(`${endpoint.path}: an idempotent endpoint needs a session.`);
  const key = keySchema.safeParse(req.headers['idempotency-key']);
  if (!key.success) throw new AppError('idempotency-key-missing');
  const name = `${endpoint.method} ${endpoint.path}`;
  return { userId: signedIn.userId, endpoint: name, key: key.data, request: input };
}

type Caller = {
  signedIn: SignedIn | null;
  actor: DeskActor | null;
  writeOnce: WriteOnce | null;
};

function needed<Part>(part: Part | null, name: keyof Caller): Part {
  if (part === null) throw new Error(`This endpoint’s access gives its handler no ${name}.`);
  return part;
}

const inputFor = (
  input: ValidInput,
  { req, res }: Pick<RouteInput<Endpoint>, 'req' | 'res'>,
  caller: Caller,
): RouteInput<Endpoint> => ({
  ...input,
  req,
  res,
  get signedIn() {
    return needed(caller.signedIn, 'signedIn');
  },
  get actor() {
    return needed(caller.actor, 'actor');
  },
  get writeOnce() {
    return needed(caller.writeOnce, 'writeOnce');
  },
});

/** authenticate → authorize → validate → idempotency → handler → check of the answer. */
export const pipeline =
  ({ endpoint, handle }: Route): RequestHandler =>
  async (req, res) => {
    checkOrigin(endpoint, req);
    const signedIn = endpoint.access === 'public' ? null : await authenticate(req);
    const actor = signedIn ? await authorize(endpoint, signedIn, req.params.deskId) : null;
    await readJsonBody(req, res, endpoint.bodyLimitBytes);
    const input = validate(endpoint, req);
    const requestKey = requestKeyOf(endpoint, req, signedIn, input);
    res.status(endpoint.successStatus);
    const before = requestKey && (await findAnswer(requestKey));
    const caller = { signedIn, actor, writeOnce: requestKey && writeOnce(requestKey) };
    const answer = before ? before.answer : await handle(inputFor(input, { req, res }, caller));
    res.json(endpoint.response.parse(answer));
  };
