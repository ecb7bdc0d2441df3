import { type z } from 'zod';
import {
  type AnswerOf,
  type BodyInput,
  type Endpoint,
  type QueryInput,
} from '@shared/contract/endpoint';
import { api, withQuery, type RequestOptions } from './client';

type AnyEndpoint = Endpoint<z.ZodType, z.ZodType, z.ZodType, z.ZodType>;

export interface CallOptions<E> {
  /** Fills the `:names` of the path. */
  params?: Record<string, string | number>;
  query?: unknown extends QueryInput<E> ? RequestOptions['query'] : Partial<QueryInput<E>>;
  body?: BodyInput<E>;
  /** Sent as multipart instead of `body`. */
  form?: FormData;
  signal?: AbortSignal;
  isBackground?: boolean;
}

/** Calls an endpoint of shared/contract; the answer has the type the contract gives it. */
export function call<E extends AnyEndpoint>(
  endpoint: E,
  { params, query, body, form, signal, isBackground }: CallOptions<E> = {},
): Promise<AnswerOf<E>> {
  const path = pathOf(endpoint, params);
  const options = { query: query as RequestOptions['query'], signal, isBackground };
  switch (endpoint.method) {
    case 'get':
      return api.get<AnswerOf<E>>(path, options);
    case 'delete':
      return api.delete<AnswerOf<E>>(path, options);
    default:
      return api[endpoint.method]<AnswerOf<E>>(path, form ?? body ?? {}, options);
  }
}

/** The endpoint's path with its `:names` filled in. Throws when one is missing, since the address would be another one. */
export function pathOf(
  { path }: Pick<AnyEndpoint, 'path'>,
  params: Record<string, string | number> = {},
): string {
  return path.replace(/:([a-zA-Z]+)/g, (_, name: string) => {
    const value = params[name];
    if (value === undefined || value === '')
      throw new Error(`The path ${path} needs a value for ${name}.`);
    return encodeURIComponent(value);
  });
}

/** The address of an endpoint that answers a file, for links. */
export function addressOf<E extends AnyEndpoint>(
  endpoint: E,
  { params, query }: Pick<CallOptions<E>, 'params' | 'query'> = {},
): string {
  return withQuery(pathOf(endpoint, params), query as RequestOptions['query']);
}
