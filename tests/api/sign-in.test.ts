import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startApi, type Api } from '../support/api';

let api: Api;
beforeAll(async () => {
  api = await startApi();
});
afterAll(() => api.close());

describe('signing in', () => {
  it('tells who is signed in', async () => {
    const agent = await api.agentFor('quality_engineer');
    const answer = await agent.get('/api/session').expect(200);
    expect(answer.body).toMatchObject({
      email: 'quality@quartzhold.test',
      role: 'quality_engineer',
    });
  });
  it('signs out', async () => {
    const agent = await api.agentFor('auditor');
    await agent.delete('/api/session').expect(200);
    await agent.get('/api/session').expect(401);
  });
});
