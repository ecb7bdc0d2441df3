import {
  OpenApiGeneratorV31,
  OpenAPIRegistry,
  zodToOpenAPIRegistry,
  type RouteConfig,
} from '@asteasolutions/zod-to-openapi';
import { z } from 'zod';
import { areas, endpoints } from '@shared/contract';
import { ErrorAnswer } from '@shared/contract/common';
import { type Endpoint } from '@shared/contract/endpoint';
import { config } from '../config';
import { cookieName } from './sessions';

/** What can go wrong, by status; which of them an endpoint can answer follows from its declaration. */
const refusals = {
  400: 'What was sent cannot be taken; `fields` names the places',
  401: 'Nobody is signed in',
  403: 'The role, or the page the request came from, is not allowed to do this',
  404: 'There is no such record, or it is not for this person',
  409: 'The state of things does not allow it now, or somebody changed it meanwhile',
  413: 'Too large',
  429: 'Too many tries; `Retry-After` says how many seconds to wait',
  503: 'The database does not answer; nothing was changed',
  500: 'Something unexpected; logged under the id in the message',
} as const;

/** Exported schemas of the contract become named components; the name is the exported one. */
function nameSchemas(): void {
  for (const module of Object.values(areas)) {
    for (const [name, value] of Object.entries(module)) {
      const schema: unknown = value;
      if (schema instanceof z.ZodObject && !zodToOpenAPIRegistry.has(schema))
        zodToOpenAPIRegistry.add(schema, { _internal: { refId: name } });
    }
  }
  zodToOpenAPIRegistry.add(ErrorAnswer, { _internal: { refId: 'ErrorAnswer' } });
}

function statusesOf(endpoint: Endpoint): (keyof typeof refusals)[] {
  const unsafe = endpoint.method !== 'get';
  const holds: [keyof typeof refusals, boolean][] = [
    [400, Boolean(endpoint.params ?? endpoint.query ?? endpoint.body ?? endpoint.files)],
    [401, endpoint.roles !== 'anyone' || endpoint.path === '/api/session'],
    [403, unsafe || Array.isArray(endpoint.roles)],
    [404, endpoint.path.includes(':')],
    [409, unsafe],
    [413, Boolean(endpoint.files ?? endpoint.body)],
    [429, unsafe],
    [500, true],
    [503, true],
  ];
  return holds.filter(([, possible]) => possible).map(([status]) => status);
}

function bodyOf(
  endpoint: Endpoint,
): { body: NonNullable<RouteConfig['request']>['body'] } | object {
  if (endpoint.files) {
    const files = Object.fromEntries(
      endpoint.files.map((name) => [
        name,
        name === 'files'
          ? z.array(z.any().meta({ type: 'string', format: 'binary' }))
          : z.any().meta({ type: 'string', format: 'binary' }),
      ]),
    );
    const fields = endpoint.body instanceof z.ZodObject ? endpoint.body.shape : {};
    return {
      body: { content: { 'multipart/form-data': { schema: z.object({ ...fields, ...files }) } } },
    };
  }
  if (!endpoint.body) return {};
  return { body: { required: true, content: { 'application/json': { schema: endpoint.body } } } };
}

function answerOf(endpoint: Endpoint) {
  const { produces, answer } = endpoint;
  if (produces && produces !== 'application/json') {
    const binary = /octet-stream|pdf/.test(produces);
    return {
      [produces]: { schema: { type: 'string' as const, ...(binary ? { format: 'binary' } : {}) } },
    };
  }
  return { 'application/json': { schema: answer ?? { type: 'object' as const } } };
}

function roleText({ roles }: Endpoint): string {
  if (roles === 'anyone') return 'Needs no session.';
  if (roles === 'signedIn') return 'For everybody who is signed in.';
  return `For ${roles.map((role) => role.replace('_', ' ')).join(', ')}.`;
}

function pathOf(area: string, name: string, endpoint: Endpoint): RouteConfig {
  const unsafe = endpoint.method !== 'get';
  return {
    method: endpoint.method,
    path: endpoint.path.replace(/:([A-Za-z]+)/g, '{$1}'),
    operationId: name,
    tags: [area],
    summary: endpoint.summary,
    description: roleText(endpoint),
    security:
      endpoint.roles === 'anyone'
        ? endpoint.path.startsWith('/api/machine/')
          ? [{ benchToken: [] }]
          : []
        : [{ session: [] }],
    request: {
      ...(endpoint.params ? { params: endpoint.params as z.ZodObject } : {}),
      ...(endpoint.query ? { query: endpoint.query as z.ZodObject } : {}),
      ...(unsafe ? { headers: z.object({ 'X-Quartzhold': z.literal('1') }) } : {}),
      ...bodyOf(endpoint),
    },
    responses: {
      [endpoint.status ?? 200]: { description: endpoint.summary, content: answerOf(endpoint) },
      ...Object.fromEntries(
        statusesOf(endpoint).map((status) => [
          status,
          {
            description: refusals[status],
            content: { 'application/json': { schema: ErrorAnswer } },
          },
        ]),
      ),
    },
  };
}

let made: object | undefined;

/** OpenAPI 3.1 of every endpoint of the contract, made once. */
export function openApi(): object {
  if (made) return made;
  nameSchemas();
  const registry = new OpenAPIRegistry();
  registry.registerComponent('securitySchemes', 'session', {
    type: 'apiKey',
    in: 'cookie',
    name: cookieName(config()),
  });
  registry.registerComponent('securitySchemes', 'benchToken', { type: 'http', scheme: 'bearer' });
  for (const { area, name, endpoint } of endpoints)
    registry.registerPath(pathOf(area, name, endpoint));
  made = new OpenApiGeneratorV31(registry.definitions).generateDocument({
    openapi: '3.1.0',
    info: {
      title: 'Quartzhold',
      version: '1',
      description:
        'Receive quartz crystals and oscillators in lots and decide whether the radio that uses them will work. ' +
        'Every unsafe request carries `X-Quartzhold: 1`. Errors are `{error: {code, message, fields?}}`. ' +
        'Lists are read by keyset: hand `next` back as `after` until it is null.',
    },
    servers: [{ url: '/' }],
    tags: Object.keys(areas).map((name) => ({ name })),
  });
  return made;
}
