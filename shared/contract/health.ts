import { z } from 'zod';
import { endpoint } from './endpoint';
import { Instant } from './common';

export const Health = z.object({
  status: z.enum(['ok', 'degraded']),
  version: z.string(),
  now: Instant,
  checks: z.array(z.object({ name: z.string(), ok: z.boolean(), text: z.string() })),
});
export const readHealth = endpoint({
  method: 'get',
  path: '/api/health',
  roles: 'anyone',
  summary: 'Whether the server can do its work; without a session it says only ok or not',
  answer: Health,
});
export const readOpenApi = endpoint({
  method: 'get',
  path: '/api/openapi.json',
  roles: 'anyone',
  summary: 'This description',
  produces: 'application/json',
});
export const readDocs = endpoint({
  method: 'get',
  path: '/api/docs',
  roles: 'anyone',
  summary: 'This description as a page',
  produces: 'text/html',
});
