import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { endpoints } from '@shared/contract';
import { type Role, roles } from '@shared/contract/common';
import { routes } from '../../server/routes';
import { startApi, type Agent, type Api } from '../support/api';

describe('the contract', () => {
  it('is answered, each endpoint by exactly one route', () => {
    const places = routes.map(({ endpoint }) => `${endpoint.method} ${endpoint.path}`).sort();
    const declared = endpoints.map(({ endpoint }) => `${endpoint.method} ${endpoint.path}`).sort();
    expect(places).toEqual(declared);
  });
});

/* Every endpoint x every role and a stranger, generated from the contract: who may not come in gets 401 or 403, whoever
   may gets anything else. Bodies are left out, so that those let in are stopped by what they did not send. */
describe('who may call what', () => {
  let api: Api;
  const agents = {} as Record<Role | 'stranger', Agent>;
  beforeAll(async () => {
    api = await startApi();
    for (const role of roles) agents[role] = await api.agentFor(role);
    agents.stranger = api.stranger();
  });
  afterAll(() => api.close());

  const nobody = '00000000-0000-4000-8000-000000000000';
  const ending = new Set(['/api/session', '/api/sessions/:id']);

  function call(
    agent: Agent,
    method: (typeof endpoints)[number]['endpoint']['method'],
    path: string,
  ) {
    const filled = path
      .replace(':token', 'x'.repeat(43))
      .replace(/:(id|\w+Id)\b/g, nobody)
      .replace(/:(\w+)/g, 'anything');
    return agent[method](filled);
  }

  const rows = endpoints.flatMap(({ name, endpoint }) =>
    ([...roles, 'stranger'] as const).map((who) => {
      const open =
        endpoint.roles === 'anyone' ||
        (who !== 'stranger' && (endpoint.roles === 'signedIn' || endpoint.roles.includes(who)));
      return { name, who, endpoint, open };
    }),
  );

  it.each(rows.filter(({ open }) => !open))('$name refuses $who', async ({ who, endpoint }) => {
    const answer = await call(agents[who], endpoint.method, endpoint.path);
    expect(answer.status).toBe(who === 'stranger' ? 401 : 403);
    expect(answer.body).toEqual({
      error: expect.objectContaining({ code: expect.any(String), message: expect.any(String) }),
    });
  });

  const streams = (endpoint: { produces?: string }) => endpoint.produces === 'text/event-stream';
  it.each(rows.filter(({ open, endpoint }) => open && !ending.has(endpoint.path)))(
    '$name lets $who in',
    async ({ who, endpoint }) => {
      const asked = call(agents[who], endpoint.method, endpoint.path);
      // Streams do not end by themselves; their first line is enough.
      const answer = streams(endpoint)
        ? await asked.buffer(false).parse((response, done) => {
            done(null, '');
            (response as unknown as { destroy(): void }).destroy();
          })
        : await asked;
      // A bench is let in by its token, which is not a session.
      const byToken = endpoint.path.startsWith('/api/machine/');
      if (byToken) expect(answer.body).toMatchObject({ error: { code: 'bench.not_known' } });
      else expect([401, 403]).not.toContain(answer.status);
      expect(answer.status).not.toBe(500);
    },
  );
});
