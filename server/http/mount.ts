import { json, type Express, type NextFunction, type Request, type Response } from 'express';
import { type z } from 'zod';
import { type Endpoint } from '@shared/contract/endpoint';
import { type Actor } from './actor';
import { InvalidInput, NotAllowed, NotSignedIn } from './errors';
import { type Route } from './route';

const jsonBody = json({ limit: '1mb', strict: true });

/** Reads the person of the session (set by passport) as an actor. */
export function actorOf(request: Request): Actor | null {
  const person = request.user;
  if (!person) return null;
  return {
    kind: 'person',
    id: person.id,
    name: person.name,
    role: person.role,
    supplierId: person.supplierId,
    address: request.ip ?? '',
  };
}

function authorise(endpoint: Endpoint) {
  return (request: Request, response: Response, next: NextFunction) => {
    const actor = actorOf(request);
    if (endpoint.roles !== 'anyone') {
      if (!actor) throw new NotSignedIn();
      if (endpoint.roles !== 'signedIn' && !endpoint.roles.includes(actor.role as never))
        throw new NotAllowed();
    }
    response.locals.actor = actor;
    next();
  };
}

function check(schema: z.ZodType | undefined, value: unknown): unknown {
  if (!schema) return undefined;
  const parsed = schema.safeParse(value ?? {});
  if (parsed.success) return parsed.data;
  const fields: Record<string, string> = {};
  for (const issue of parsed.error.issues) fields[issue.path.join('.') || '_'] ??= issue.message;
  const [first] = Object.entries(fields);
  throw new InvalidInput(
    first && first[0] !== '_' ? `${first[0]}: ${first[1]}` : (first?.[1] ?? 'This cannot be read.'),
    fields,
  );
}

/** session -> origin -> role -> body -> schema -> handler. The order matters: nothing is read for strangers. */
export function mount(app: Express, routes: Route[]): void {
  for (const { endpoint, handle, parser } of routes) {
    const body = endpoint.method === 'get' ? [] : [jsonBody, ...(parser ? [parser] : [])];
    app[endpoint.method](
      endpoint.path,
      authorise(endpoint),
      ...body,
      async (request: Request, response: Response) => {
        const answer = await handle({
          params: check(endpoint.params, request.params) as never,
          query: check(endpoint.query, request.query) as never,
          body: check(endpoint.body, request.body) as never,
          actor: response.locals.actor,
          request,
          response,
        });
        if (endpoint.produces || response.headersSent) return;
        response.status(endpoint.status ?? 200).json(answer);
      },
    );
  }
}
