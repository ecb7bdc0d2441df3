import { ApiError } from './api-error';
import { tellConnection } from './connection-events';

export { ApiError, messageOf } from './api-error';

type Method = 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';
type QueryValue = string | number | boolean | null | undefined;

export interface RequestOptions {
  /** Values that are null, undefined or '' are left out of the address. */
  query?: Record<string, QueryValue | readonly QueryValue[]>;
  signal?: AbortSignal;
  /** A refusal of this request is no sign that the session ended (sign-in itself, the first look at the session). */
  expectsSignedOut?: boolean;
  /** Asked by a clock, not by the person at the desk: it must not keep the session alive. */
  isBackground?: boolean;
}

/** `get('/api/lots', {query})`, `post('/api/lots', body)`; a FormData body is sent as multipart. Throws ApiError only, or AbortError. */
export const api = {
  get: <Answer>(path: string, options?: RequestOptions) =>
    send<Answer>('GET', path, undefined, options),
  post: <Answer>(path: string, body?: unknown, options?: RequestOptions) =>
    send<Answer>('POST', path, body, options),
  put: <Answer>(path: string, body?: unknown, options?: RequestOptions) =>
    send<Answer>('PUT', path, body, options),
  patch: <Answer>(path: string, body?: unknown, options?: RequestOptions) =>
    send<Answer>('PATCH', path, body, options),
  delete: <Answer>(path: string, options?: RequestOptions) =>
    send<Answer>('DELETE', path, undefined, options),
};

/** The header by which the server tells our pages from a foreign form. */
export const ownHeader = { 'X-Quartzhold': '1' } as const;

async function send<Answer>(
  method: Method,
  path: string,
  body: unknown,
  options: RequestOptions = {},
): Promise<Answer> {
  const headers: Record<string, string> = { Accept: 'application/json' };
  if (method !== 'GET') Object.assign(headers, ownHeader);
  if (options.isBackground) headers['X-Quartzhold-Background'] = '1';
  let payload: BodyInit | undefined;
  if (body instanceof FormData) payload = body;
  else if (body !== undefined) {
    headers['Content-Type'] = 'application/json';
    payload = JSON.stringify(body);
  }
  let response: Response;
  try {
    response = await fetch(withQuery(path, options.query), {
      method,
      headers,
      body: payload,
      signal: options.signal,
      credentials: 'same-origin',
    });
  } catch (error) {
    if (error instanceof DOMException && error.name === 'AbortError') throw error;
    tellConnection('offline');
    throw new ApiError(
      0,
      'offline',
      'The server cannot be reached. What you wrote is still here; try again in a moment.',
    );
  }
  tellConnection('online');
  const answer = await readAnswer(response);
  if (response.ok) return answer as Answer;
  const error = errorFrom(response.status, answer);
  if (response.status === 401 && !options.expectsSignedOut) tellConnection('session-end');
  throw error;
}

export function withQuery(path: string, query: RequestOptions['query'] = {}): string {
  const search = new URLSearchParams();
  for (const [name, value] of Object.entries(query)) {
    for (const one of Array.isArray(value) ? value : [value]) {
      if (one !== null && one !== undefined && one !== '') search.append(name, String(one));
    }
  }
  const text = search.toString();
  return text === '' ? path : `${path}?${text}`;
}

async function readAnswer(response: Response): Promise<unknown> {
  if (response.status === 204) return undefined;
  const text = await response.text();
  try {
    return text === '' ? undefined : JSON.parse(text);
  } catch {
    if (response.ok)
      throw new ApiError(
        response.status,
        'unreadable',
        'The server answered with something that cannot be read.',
      );
    return undefined;
  }
}

function errorFrom(status: number, answer: unknown): ApiError {
  const error = isRecord(answer) && isRecord(answer.error) ? answer.error : {};
  const code = typeof error.code === 'string' ? error.code : `http_${status}`;
  const message =
    typeof error.message === 'string'
      ? error.message
      : status >= 500
        ? 'The server could not finish this. Nothing was changed; try again in a moment.'
        : `The server refused this (${status}).`;
  const fields = isRecord(error.fields) ? (error.fields as Record<string, string>) : {};
  return new ApiError(status, code, message, fields);
}

function isRecord(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null;
}
