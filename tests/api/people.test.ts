import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startApi, emailOf, type Agent, type Api } from '../support/api';
import { mailsTo } from '../support/outside';

let api: Api;
let admin: Agent;
beforeAll(async () => {
  api = await startApi();
  admin = await api.agentFor('administrator');
});
afterAll(() => api.close());

const invite = (fields: object) => admin.post('/api/people').send(fields);
const names = (body: { items: { name: string }[] }) => body.items.map(({ name }) => name);

describe('inviting', () => {
  it('makes an account without a password and shows how the mail fares', async () => {
    const { body } = await invite({
      name: ' Nils New ',
      email: 'nils@quartzhold.test',
      role: 'technician',
    }).expect(201);
    expect(body).toMatchObject({
      name: 'Nils New',
      state: 'invited',
      supplier: null,
      link: { purpose: 'invitation', mailState: 'queued', usedAt: null },
      lastSignInAt: null,
    });
    expect(Date.parse(body.link.expiresAt) - Date.now()).toBeGreaterThan(71 * 3600_000);
  });

  it.each([
    ['no name', { email: 'a@b.example', role: 'auditor' }, 'name'],
    ['no proper address', { name: 'A', email: 'a(at)b', role: 'auditor' }, 'email'],
    ['no such role', { name: 'A', email: 'a@b.example', role: 'owner' }, 'role'],
    [
      'a supplier contact without supplier',
      { name: 'A', email: 'a@b.example', role: 'supplier_contact' },
      'supplierId',
    ],
  ])('is refused with %s', async (_what, fields, field) => {
    const { body } = await invite(fields).expect(400);
    expect(body.error.fields).toHaveProperty(field);
  });

  it('binds only supplier contacts to a supplier, and only to one that exists', async () => {
    const person = { name: 'A', email: 'bound@b.example' };
    await invite({ ...person, role: 'auditor', supplierId: api.suppliers.first.id }).expect(400);
    await invite({ ...person, role: 'supplier_contact', supplierId: api.people.admin.id }).expect(
      400,
    );
    const { body } = await invite({
      ...person,
      role: 'supplier_contact',
      supplierId: api.suppliers.first.id,
    }).expect(201);
    expect(body.supplier).toEqual({ id: api.suppliers.first.id, name: api.suppliers.first.name });
  });

  it('never gives an address to a second account, in whatever case, and not after disabling either', async () => {
    const { body } = await invite({
      name: 'Once',
      email: 'once@quartzhold.test',
      role: 'auditor',
    }).expect(201);
    await admin.post(`/api/people/${body.id}/disablement`).send({ reason: 'left' }).expect(200);
    const second = await invite({
      name: 'Again',
      email: 'ONCE@quartzhold.test',
      role: 'auditor',
    }).expect(409);
    expect(second.body.error.fields).toHaveProperty('email');
  });

  it('of one address twice at the same moment makes one account', async () => {
    const answers = await Promise.all(
      Array.from({ length: 6 }, () =>
        invite({ name: 'Twin', email: 'twin@quartzhold.test', role: 'auditor' }),
      ),
    );
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 409, 409, 409, 409, 409]);
    expect(await mailsTo('twin@quartzhold.test')).toHaveLength(1);
  });
});

describe('changing', () => {
  const put = (id: string, fields: object) => admin.put(`/api/people/${id}`).send(fields);
  const fieldsOf = async (id: string) => {
    const { name, email, role, supplier, version } = (
      await admin.get(`/api/people/${id}`).expect(200)
    ).body;
    return { name, email, role, supplierId: supplier?.id ?? null, version };
  };

  it('is refused when somebody else changed the person meanwhile', async () => {
    const { id } = api.people.technician;
    const fields = await fieldsOf(id);
    await put(id, { ...fields, name: 'Tilda the First' }).expect(200);
    const late = await put(id, { ...fields, name: 'Tilda the Second' }).expect(409);
    expect(late.body.error.code).toBe('record.changed');
    expect((await fieldsOf(id)).name).toBe('Tilda the First');
  });

  it('tells an address change to the old mailbox and the new one', async () => {
    const { id } = api.people.auditor;
    await put(id, { ...(await fieldsOf(id)), email: 'aude@quartzhold.test' }).expect(200);
    for (const email of [emailOf('auditor'), 'aude@quartzhold.test'])
      expect((await mailsTo(email)).map(({ kind }) => kind)).toEqual(['account.address_changed']);
    await put(id, { ...(await fieldsOf(id)), email: emailOf('auditor') }).expect(200);
  });

  it('of the own role is refused', async () => {
    const { id } = api.people.admin;
    const { body } = await put(id, { ...(await fieldsOf(id)), role: 'auditor' }).expect(409);
    expect(body.error.fields).toHaveProperty('role');
  });

  it('of a person who is not there is a 404', async () => {
    await put(api.suppliers.first.id, await fieldsOf(api.people.admin.id)).expect(404);
  });
});

describe('disabling', () => {
  it('needs a reason and is not for oneself', async () => {
    await admin.post(`/api/people/${api.people.quality.id}/disablement`).send({}).expect(400);
    const own = await admin
      .post(`/api/people/${api.people.admin.id}/disablement`)
      .send({ reason: 'tired of it' })
      .expect(409);
    expect(own.body.error.message).toMatch(/another administrator/);
  });

  it('leaves an administrator, also when two disable each other at the same moment', async () => {
    const { body } = await invite({
      name: 'Second',
      email: 'second@quartzhold.test',
      role: 'administrator',
    }).expect(201);
    const { Person } = await import('../../server/models');
    await Person.update(
      { state: 'active', passwordHash: api.people.admin.passwordHash },
      { where: { id: body.id } },
    );
    const second = await api.agentFor('second@quartzhold.test');
    const [one, two] = await Promise.all([
      admin.post(`/api/people/${body.id}/disablement`).send({ reason: 'race' }),
      second.post(`/api/people/${api.people.admin.id}/disablement`).send({ reason: 'race' }),
    ]);
    expect([one.status, two.status].filter((status) => status === 200)).toHaveLength(1);
    expect(await Person.count({ where: { role: 'administrator', state: 'active' } })).toBe(1);
    await Person.update({ state: 'active' }, { where: { id: api.people.admin.id } });
    admin = await api.agentFor('administrator');
  });

  it('is undone by enabling, which brings whoever never chose a password back to the invitation', async () => {
    const { body } = await invite({
      name: 'Back',
      email: 'back@quartzhold.test',
      role: 'auditor',
    }).expect(201);
    await admin.post(`/api/people/${body.id}/disablement`).send({ reason: 'mistake' }).expect(200);
    await admin.post(`/api/people/${body.id}/links`).expect(409);
    const back = await admin.delete(`/api/people/${body.id}/disablement`).expect(200);
    expect(back.body.state).toBe('invited');
    await admin.delete(`/api/people/${body.id}/disablement`).expect(409);
  });
});

describe('the list', () => {
  it('finds by name and address, filters by role and is read page by page without gaps', async () => {
    for (let n = 0; n < 7; n += 1)
      await invite({
        name: 'Same Name',
        email: `same${n}@quartzhold.test`,
        role: 'auditor',
      }).expect(201);
    const found = await admin.get('/api/people').query({ find: 'SAME3@' }).expect(200);
    expect(names(found.body)).toEqual(['Same Name']);
    const suppliers = await admin
      .get('/api/people')
      .query({ role: 'supplier_contact' })
      .expect(200);
    for (const item of suppliers.body.items) expect(item.role).toBe('supplier_contact');

    const all = (await admin.get('/api/people').query({ limit: 200 }).expect(200)).body;
    const ids: string[] = [];
    let after: string | undefined;
    do {
      const page = (
        await admin
          .get('/api/people')
          .query({ limit: 3, ...(after ? { after } : {}) })
          .expect(200)
      ).body;
      expect(page.items.length).toBeLessThanOrEqual(3);
      ids.push(...page.items.map(({ id }: { id: string }) => id));
      after = page.next ?? undefined;
    } while (after);
    expect(ids).toEqual(all.items.map(({ id }: { id: string }) => id));
    expect(new Set(ids).size).toBe(ids.length);
    expect(all.next).toBeNull();
  });
});
