/**
 * What an endpoint is: method, path, who may call it, and the schemas of everything that crosses
 * the wire. The server mounts handlers on it, the client calls it, the OpenAPI document lists it.
 * An endpoint without an access rule does not compile.
 */
import { z } from 'zod';
import type { Permission } from './permissions';

export type HttpMethod = 'GET' | 'POST' | 'PUT' | 'DELETE';

/** `public`: anyone; `session`: anyone signed in; else the permission on the desk in the path. */
export type Access = 'public' | 'session' | Permission;

const nothing = z.strictObject({});
export type Nothing = typeof nothing;

type DeskPath = `/desks/:deskId${string}`;
type PathFor<A extends Access> = A extends Permission ? DeskPath : `/${string}`;

export type Endpoint<
  Params extends z.ZodType = z.ZodType,
  Query extends z.ZodType = z.ZodType,
  Body extends z.ZodType = z.ZodType,
  Response extends z.ZodType = z.ZodType,
> = {
  method: HttpMethod;
  /** Below /api/v1. */
  path: string;
  access: Access;
  /** One sentence for the API's page. */
  summary: string;
  params: Params;
  query: Query;
  body: Body;
  /** A body that the schema takes: shown on the API's page and used by the role test. */
  bodyExample: unknown;
  /** A larger body is refused before it is read. */
  bodyLimitBytes: number;
  response: Response;
  successStatus: 200 | 201;
  /** A creating POST: needs an Idempotency-Key header. */
  idempotent: boolean;
  /** Asks for the password again when the last time is more than some minutes ago. */
  stepUp: boolean;
};

type Spec<
  A extends Access,
  Params extends z.ZodType,
  Query extends z.ZodType,
  Response extends z.ZodType,
> = {
  method: HttpMethod;
  access: A;
  path: PathFor<A>;
  summary: string;
  params?: Params;
  query?: Query;
  response: Response;
  successStatus?: 200 | 201;
  idempotent?: boolean;
  stepUp?: boolean;
};

/** A body never comes without an example that the schema takes. */
type BodySpec<Body extends z.ZodType> = {
  body: Body;
  bodyExample: z.input<Body>;
  bodyLimitBytes?: number;
};

const usualBodyLimitBytes = 100 * 1024;

export function defineEndpoint<
  const A extends Access,
  Response extends z.ZodType,
  Body extends z.ZodType,
  Params extends z.ZodType = Nothing,
  Query extends z.ZodType = Nothing,
>(spec: Spec<A, Params, Query, Response> & BodySpec<Body>): Endpoint<Params, Query, Body, Response>;
export function defineEndpoint<
  const A extends Access,
  Response extends z.ZodType,
  Params extends z.ZodType = Nothing,
  Query extends z.ZodType = Nothing,
>(spec: Spec<A, Params, Query, Response>): Endpoint<Params, Query, Nothing, Response>;
export function defineEndpoint(
  spec: Spec<Access, z.ZodType, z.ZodType, z.ZodType> & Partial<BodySpec<z.ZodType>>,
): Endpoint {
  return {
    method: spec.method,
    path: spec.path,
    access: spec.access,
    summary: spec.summary,
    params: spec.params ?? nothing,
    query: spec.query ?? nothing,
    body: spec.body ?? nothing,
    bodyExample: spec.bodyExample ?? {},
    bodyLimitBytes: spec.bodyLimitBytes ?? usualBodyLimitBytes,
    response: spec.response,
    successStatus: spec.successStatus ?? 200,
    idempotent: spec.idempotent ?? false,
    stepUp: spec.stepUp ?? false,
  };
}

export type ParamsOf<E extends Endpoint> = z.output<E['params']>;
export type QueryOf<E extends Endpoint> = z.output<E['query']>;
export type BodyOf<E extends Endpoint> = z.output<E['body']>;
export type ResponseOf<E extends Endpoint> = z.output<E['response']>;

export const apiBase = '/api/v1';
