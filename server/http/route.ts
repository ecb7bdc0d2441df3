import { type Request, type RequestHandler, type Response } from 'express';
import { type z } from 'zod';
import { type Endpoint } from '@shared/contract/endpoint';
import { type Actor } from './actor';

type Output<Schema> = Schema extends z.ZodType ? z.output<Schema> : undefined;

/** One call, parsed and authorised by role; the handler asks a policy about the record, calls a service and presents. */
export interface Call<P, Q, B> {
  params: P;
  query: Q;
  body: B;
  /** Present on every endpoint but those for `anyone`. */
  actor: Actor;
  request: Request;
  response: Response;
}

export interface Route {
  endpoint: Endpoint;
  /** Reads a multipart body; runs after session, origin and role checks, so that strangers cannot fill the disk. */
  parser?: RequestHandler;
  handle: (call: Call<never, never, never>) => Promise<unknown>;
}

/**
 * Ties an endpoint of the contract to what answers it. Whatever the handler returns goes out as JSON with the
 * endpoint's status; an endpoint that `produces` something else writes to `response` itself and returns nothing.
 */
export function route<
  P extends z.ZodType,
  Q extends z.ZodType,
  B extends z.ZodType,
  A extends z.ZodType,
>(
  endpoint: Endpoint<P, Q, B, A>,
  handle: (call: Call<Output<P>, Output<Q>, Output<B>>) => Promise<z.input<A> | void>,
  parser?: RequestHandler,
): Route {
  return {
    endpoint: endpoint as unknown as Endpoint,
    handle: handle as unknown as Route['handle'],
    parser,
  };
}
