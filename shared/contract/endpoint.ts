import { type z } from 'zod';
import { type Role } from './common';

/**
 * One entry of the product's interface. The server mounts it, the browser calls it, OpenAPI describes it and
 * the role matrix in tests/api is generated from it, so that the four can never disagree.
 */
export interface Endpoint<
  Params extends z.ZodType = z.ZodType,
  Query extends z.ZodType = z.ZodType,
  Body extends z.ZodType = z.ZodType,
  Answer extends z.ZodType = z.ZodType,
> {
  method: 'get' | 'post' | 'put' | 'patch' | 'delete';
  /** Express path, e.g. `/api/lots/:id`. */
  path: string;
  /** Who may call it at all; per-record rules live in server/policies. `anyone` needs no session. */
  roles: 'anyone' | 'signedIn' | readonly Role[];
  summary: string;
  params?: Params;
  query?: Query;
  body?: Body;
  /** A file travels in multipart field(s) of these names; `body` then describes the text fields. */
  files?: readonly string[];
  answer?: Answer;
  /** Content type when the answer is not JSON, e.g. `text/csv`. */
  produces?: string;
  status?: number;
}

/** Declares an endpoint and keeps the exact types of its schemas. */
export function endpoint<
  Params extends z.ZodType,
  Query extends z.ZodType,
  Body extends z.ZodType,
  Answer extends z.ZodType,
>(spec: Endpoint<Params, Query, Body, Answer>): Endpoint<Params, Query, Body, Answer> {
  return spec;
}

export type ParamsOf<E> =
  E extends Endpoint<infer P, z.ZodType, z.ZodType, z.ZodType> ? z.output<P> : never;
export type QueryOf<E> =
  E extends Endpoint<z.ZodType, infer Q, z.ZodType, z.ZodType> ? z.output<Q> : never;
export type BodyOf<E> =
  E extends Endpoint<z.ZodType, z.ZodType, infer B, z.ZodType> ? z.output<B> : never;
export type AnswerOf<E> =
  E extends Endpoint<z.ZodType, z.ZodType, z.ZodType, infer A> ? z.output<A> : never;
/** What a caller may send: before defaults are filled in. */
export type BodyInput<E> =
  E extends Endpoint<z.ZodType, z.ZodType, infer B, z.ZodType> ? z.input<B> : never;
export type QueryInput<E> =
  E extends Endpoint<z.ZodType, infer Q, z.ZodType, z.ZodType> ? z.input<Q> : never;
