import { type Request } from 'express';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { authenticateBench } from '../../server/http/authenticate-bench';
import { BenchToken } from '../../server/models';
import { startApi, type Agent, type Api } from '../support/api';

let api: Api;
let admin: Agent;
beforeAll(async () => {
  api = await startApi();
  admin = await api.agentFor('administrator');
});
afterAll(() => api.close());

const bench = {
  name: 'Bench 1',
  counter: 'universal counter',
  expandedUncertaintyPpm: 0.02,
  calibrationDue: '2099-01-31',
};

describe('suppliers', () => {
  it('are kept with their contacts and counts', async () => {
    const { body } = await admin.get(`/api/suppliers/${api.suppliers.first.id}`).expect(200);
    expect(body).toMatchObject({
      name: api.suppliers.first.name,
      contacts: [{ name: api.people.supplier.name, state: 'active' }],
      lotsCount: 0,
      openHoldsCount: 0,
    });
  });

  it('have a name of their own', async () => {
    const { body } = await admin
      .post('/api/suppliers')
      .send({ name: api.suppliers.first.name.toUpperCase() })
      .expect(409);
    expect(body.error.fields).toHaveProperty('name');
  });

  it('are changed by one at a time', async () => {
    const { body } = await admin
      .post('/api/suppliers')
      .send({ name: 'Changed', notes: 'first' })
      .expect(201);
    const change = { name: 'Changed', notes: 'second', active: false, version: body.version };
    const answers = await Promise.all([
      admin.put(`/api/suppliers/${body.id}`).send(change),
      admin.put(`/api/suppliers/${body.id}`).send(change),
    ]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
    const inactive = await admin.get('/api/suppliers').query({ active: 'false' }).expect(200);
    expect(inactive.body.items.map(({ name }: { name: string }) => name)).toEqual(['Changed']);
  });

  it('are shown to no supplier contact, not even the own one, nor how many there are', async () => {
    const contact = await api.agentFor('supplier_contact');
    for (const path of [
      '/api/suppliers',
      `/api/suppliers/${api.suppliers.first.id}`,
      `/api/suppliers/${api.suppliers.second.id}`,
    ]) {
      const { body } = await contact.get(path).expect(403);
      expect(Object.keys(body)).toEqual(['error']);
      expect(JSON.stringify(body)).not.toContain(api.suppliers.second.name);
    }
    const own = await contact.get('/api/session').expect(200);
    expect(own.body.supplier.name).toBe(api.suppliers.first.name);
    const mine = await contact.get('/api/preferences').expect(200);
    expect(JSON.stringify(mine.body)).not.toContain(api.suppliers.second.name);
  });
});

describe('benches', () => {
  it('say whether their calibration counts today', async () => {
    const good = await admin.post('/api/benches').send(bench).expect(201);
    expect(good.body).toMatchObject({
      inCalibration: true,
      coverageFactor: 2,
      usual: false,
      active: true,
    });
    const due = await admin
      .post('/api/benches')
      .send({ ...bench, name: 'Bench 2', calibrationDue: '2020-01-31' })
      .expect(201);
    expect(due.body.inCalibration).toBe(false);
  });

  it.each([
    ['no uncertainty', { expandedUncertaintyPpm: 0 }, 'expandedUncertaintyPpm'],
    ['no date', { calibrationDue: '31.01.2030' }, 'calibrationDue'],
    ['a range upside down', { chamberLowC: 85, chamberHighC: -40 }, 'chamberHighC'],
    ['half a range', { chamberLowC: -40 }, 'chamberHighC'],
    ['being usual but out of use', { usual: true, active: false }, 'usual'],
  ])('are refused with %s', async (_what, fields, field) => {
    const { body } = await admin
      .post('/api/benches')
      .send({ ...bench, name: 'Refused', ...fields })
      .expect(400);
    expect(body.error.fields).toHaveProperty(field);
  });

  it('have one usual one: naming another takes it from the last', async () => {
    const first = await admin
      .post('/api/benches')
      .send({ ...bench, name: 'Usual A', usual: true })
      .expect(201);
    const second = await admin
      .post('/api/benches')
      .send({ ...bench, name: 'Usual B', usual: true })
      .expect(201);
    expect((await admin.get(`/api/benches/${first.body.id}`)).body.usual).toBe(false);
    expect(second.body.usual).toBe(true);
  });

  it('are read by the house and kept by administrators', async () => {
    const technician = await api.agentFor('technician');
    const list = await technician.get('/api/benches').query({ find: 'Bench 1' }).expect(200);
    expect(list.body.items).toHaveLength(1);
    await technician
      .post('/api/benches')
      .send({ ...bench, name: 'Not mine' })
      .expect(403);
  });
});

describe('a token of a bench', () => {
  const asked = (authorization?: string) =>
    ({
      get: (name: string) => (name === 'authorization' ? authorization : undefined),
      ip: '::1',
    }) as Request;
  let id: string;
  beforeAll(async () => {
    id = (
      await admin
        .post('/api/benches')
        .send({ ...bench, name: 'By machine' })
        .expect(201)
    ).body.id as string;
  });
  const issue = async (label: string) =>
    (await admin.post(`/api/benches/${id}/tokens`).send({ label }).expect(201)).body as {
      id: string;
      secret: string;
    };

  it('is told once, kept as a hash only, and lets the bench in', async () => {
    const { id: tokenId, secret } = await issue('line 3');
    const caller = await authenticateBench(asked(`Bearer ${secret}`));
    expect(caller).toMatchObject({
      tokenId,
      actor: { kind: 'bench', id, name: 'By machine', role: 'bench' },
    });
    const list = await admin.get(`/api/benches/${id}/tokens`).expect(200);
    expect(list.body.items[0]).toMatchObject({ label: 'line 3', revokedAt: null });
    expect(list.body.items[0].lastUsedAt).not.toBeNull();
    expect(JSON.stringify([list.body, await BenchToken.findAll({ raw: true })])).not.toContain(
      secret,
    );
  });

  it.each([
    undefined,
    'Bearer',
    'Bearer short',
    `Bearer bench_${'x'.repeat(43)}`,
    'Basic YWRtaW46YWRtaW4=',
  ])('is not %s', async (authorization) => {
    await expect(authenticateBench(asked(authorization))).rejects.toMatchObject({
      status: 401,
      code: 'bench.not_known',
    });
  });

  it('ends when it is revoked, once, or when the bench goes out of use', async () => {
    const [one, two] = [await issue('to revoke'), await issue('to outlive')];
    await admin.delete(`/api/benches/${id}/tokens/${one.id}`).expect(200);
    await admin.delete(`/api/benches/${id}/tokens/${one.id}`).expect(409);
    await expect(authenticateBench(asked(`Bearer ${one.secret}`))).rejects.toMatchObject({
      status: 401,
    });
    await authenticateBench(asked(`Bearer ${two.secret}`));
    const { version } = (await admin.get(`/api/benches/${id}`)).body;
    await admin
      .put(`/api/benches/${id}`)
      .send({ ...bench, name: 'By machine', active: false, version })
      .expect(200);
    await expect(authenticateBench(asked(`Bearer ${two.secret}`))).rejects.toMatchObject({
      status: 401,
    });
    await admin.post(`/api/benches/${id}/tokens`).send({ label: 'late' }).expect(409);
  });

  it('is issued, listed and revoked by administrators only', async () => {
    const quality = await api.agentFor('quality_engineer');
    await quality.get(`/api/benches/${id}/tokens`).expect(403);
    await quality.post(`/api/benches/${id}/tokens`).send({ label: 'x' }).expect(403);
  });
});
