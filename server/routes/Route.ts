import type { Request, RequestHandler, Response } from 'express';
import type { z } from 'zod';
import type { Actor } from '../policies/Actor.js';

export type HttpMethod = 'get' | 'post' | 'put' | 'patch' | 'delete';

/** Who gets past the door; what a project's roles allow is decided by policies once the thing is loaded. */
export type Access = 'anyone' | 'signedIn' | 'admin';

/** What a controller is given: parsed values only, never the raw request's. */
export interface RouteInput<P = unknown, Q = unknown, B = unknown, Who = Actor | undefined> {
  params: P;
  query: Q;
  body: B;
  /** Nobody where anyone may come in. */
  actor: Who;
  /** For cookies, uploads and streams only. */
  request: Request;
  response: Response;
}

export interface RouteSuccess<R extends z.ZodType | undefined> {
  status: number;
  description?: string;
  /** Absent: no JSON. With `contentType` the controller writes the body itself, without it there is none. */
  schema?: R;
  contentType?: string;
}

interface RouteOptions<
  A extends Access,
  P extends z.ZodType | undefined,
  Q extends z.ZodType | undefined,
  B extends z.ZodType | undefined,
  R extends z.ZodType | undefined,
> {
  method: HttpMethod;
  /** Under /api/v1, in Express's form: `/projects/:projectId`. */
  path: string;
  tag: string;
  summary: string;
  description?: string;
  access: A;
  params?: P;
  query?: Q;
  body?: B;
  /** `multipart`: the controller or `before` reads the body. */
  bodyType?: 'json' | 'multipart';
  /** Described only; for multipart bodies. */
  multipartFields?: Record<string, { description: string; isFile?: boolean; isRequired?: boolean }>;
  /** After access and params were checked, before the body is. */
  before?: RequestHandler[];
  success: RouteSuccess<R>;
  /** Codes that this route may answer beyond those of its access and schemas, by status. */
  errors?: Record<number, string>;
  handle: (input: RouteInput<Output<P>, Output<Q>, Output<B>, Asker<A>>) => Answer<R> | Promise<Answer<R>>;
}

type Asker<A extends Access> = A extends 'anyone' ? undefined : Actor;

/** Without a schema whatever is returned is dropped. */
type Answer<R extends z.ZodType | undefined> = R extends z.ZodType ? z.input<R> : unknown;

type Output<S extends z.ZodType | undefined> = S extends z.ZodType ? z.output<S> : undefined;

/** One row of a route table: Express and the OpenAPI document are both made from it. */
export interface Route extends Omit<
  RouteOptions<Access, z.ZodType | undefined, z.ZodType | undefined, z.ZodType | undefined, z.ZodType | undefined>,
  'handle'
> {
  handle: (input: RouteInput) => unknown;
}

/** Declares a route with the types of its parts held together. */
export function route<
  A extends Access,
  P extends z.ZodType | undefined = undefined,
  Q extends z.ZodType | undefined = undefined,
  B extends z.ZodType | undefined = undefined,
  R extends z.ZodType | undefined = undefined,
>(options: RouteOptions<A, P, Q, B, R>): Route {
  // The binder gives each handler exactly what its own schemas parsed; past this point that link is not expressible.
  return options as unknown as Route;
}
