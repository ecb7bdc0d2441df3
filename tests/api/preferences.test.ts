import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startApi, type Agent, type Api } from '../support/api';

let api: Api;
let quality: Agent;
let quality2: Agent;
beforeAll(async () => {
  api = await startApi();
  quality = await api.agentFor('quality');
  quality2 = await api.agentFor('quality2');
});
afterAll(() => api.close());

describe('a choice of columns', () => {
  it('is kept with the person, table by table', async () => {
    await quality
      .put('/api/preferences/tables/lots')
      .send({ columns: ['lotNumber', 'state'] })
      .expect(200);
    await quality
      .put('/api/preferences/tables/holds')
      .send({ columns: ['number'] })
      .expect(200);
    const again = await api.agentFor('quality');
    expect((await again.get('/api/preferences').expect(200)).body.tables).toEqual({
      lots: { columns: ['lotNumber', 'state'] },
      holds: { columns: ['number'] },
    });
    expect((await quality2.get('/api/preferences').expect(200)).body.tables).toEqual({});
  });
});

describe('a saved filter', () => {
  const filter = { list: 'lots', name: 'Mine to judge', query: 'state=awaiting_disposition' };
  const namesFor = async (agent: Agent) =>
    (await agent.get('/api/saved-filters').query({ list: 'lots' }).expect(200)).body.items.map(
      ({ name, mine }: { name: string; mine: boolean }) => `${name}${mine ? '' : ' (shared)'}`,
    );

  it('is seen by the person alone until it is shared with the role', async () => {
    await quality.post('/api/saved-filters').send(filter).expect(201);
    await quality
      .post('/api/saved-filters')
      .send({ ...filter, name: 'Ours', sharedWithRole: true })
      .expect(201);
    const technician = await api.agentFor('technician');
    expect(await namesFor(quality)).toEqual(['Mine to judge', 'Ours']);
    expect(await namesFor(quality2)).toEqual(['Ours (shared)']);
    expect(await namesFor(technician)).toEqual([]);
  });

  it('has a name of its own in its list', async () => {
    const { body } = await quality.post('/api/saved-filters').send(filter).expect(409);
    expect(body.error.fields).toHaveProperty('name');
    await quality
      .post('/api/saved-filters')
      .send({ ...filter, list: 'holds' })
      .expect(201);
  });

  it('is deleted by its owner only, also when it is shared', async () => {
    const { items } = (await quality.get('/api/saved-filters').expect(200)).body;
    const shared = items.find(({ name }: { name: string }) => name === 'Ours');
    await quality2.delete(`/api/saved-filters/${shared.id}`).expect(404);
    await quality.delete(`/api/saved-filters/${shared.id}`).expect(200);
    expect(await namesFor(quality2)).toEqual([]);
  });
});
