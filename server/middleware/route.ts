import type { Request, Response } from 'express';
import type { BodyOf, Endpoint, ParamsOf, QueryOf, ResponseOf } from '@/shared/endpoint';
import type { DeskActor } from '../services/access';
import type { SignedIn } from '../services/sessions';
import type { WriteOnce } from '../services/write-once';

/** What a handler is given. Asking for a part that the endpoint's access does not give throws. */
export type RouteInput<E extends Endpoint> = {
  params: ParamsOf<E>;
  query: QueryOf<E>;
  body: BodyOf<E>;
  req: Request;
  res: Response;
  /** Who is signed in; not in a public endpoint. */
  signedIn: SignedIn;
  /** The member at work on the desk; only where the access is a permission. */
  actor: DeskActor;
  /** The transaction of a creating request; only in an idempotent endpoint. */
  writeOnce: WriteOnce;
};

export type Route = {
  endpoint: Endpoint;
  handle: (input: RouteInput<Endpoint>) => Promise<unknown>;
};

/** Joins an endpoint and what answers it. The pipeline checks the input before it gets here. */
export const route = <E extends Endpoint>(
  endpoint: E,
  handle: (input: RouteInput<E>) => Promise<ResponseOf<E>>,
): Route => ({ endpoint, handle: (input) => handle(input as RouteInput<E>) });
