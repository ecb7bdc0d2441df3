import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { HistoryEntry, Person, PersonLink } from '../../server/models';
import { firstAdministratorLink } from '../../server/services/links/first-administrator';
import { emailOf, passphrase, startApi, type Agent, type Api } from '../support/api';
import { asOperator, mailsTo, minutesPass, newestToken } from '../support/outside';

let api: Api;
let admin: Agent;
beforeAll(async () => {
  api = await startApi();
  admin = await api.agentFor('administrator');
});
afterAll(() => api.close());
beforeEach(() => asOperator(api, 'DELETE FROM rate_limits'));

const fresh = 'nine boats and one lantern';
let guests = 0;
async function invite(): Promise<{ id: string; email: string; token: string }> {
  const email = `guest${(guests += 1)}@quartzhold.test`;
  const { body } = await admin
    .post('/api/people')
    .send({ name: `Guest ${guests}`, email, role: 'technician' })
    .expect(201);
  return { id: body.id as string, email, token: await newestToken(email) };
}
const use = (token: string, newPassword: string, more = {}) =>
  api
    .stranger()
    .post(`/api/links/${token}`)
    .send({ newPassword, ...more });
const signIn = (email: string, password: string) =>
  api.stranger().post('/api/session').send({ email, password });

describe('an invitation', () => {
  it('lets the invited person, and nobody else, choose a password', async () => {
    const { email, token, id } = await invite();
    const [mail] = await mailsTo(email);
    expect(mail).toMatchObject({ secret: true, personId: id, kind: 'account.invitation' });
    const info = await api.stranger().get(`/api/links/${token}`).expect(200);
    expect(info.body).toMatchObject({ purpose: 'invitation', email });
    await signIn(email, fresh).expect(401);
    await use(token, fresh).expect(200);
    await signIn(email, fresh).expect(200);
  });

  it('works once', async () => {
    const { token } = await invite();
    await use(token, fresh).expect(200);
    const second = await use(token, 'another lantern, another boat').expect(400);
    expect(second.body.error.code).toBe('link.dead');
    await api.stranger().get(`/api/links/${token}`).expect(400);
  });

  it('works once even when used twice at the same moment', async () => {
    const { token, email } = await invite();
    const answers = await Promise.all([1, 2, 3, 4].map((n) => use(token, `${fresh} number ${n}`)));
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 400, 400, 400]);
    const winner = answers.findIndex(({ status }) => status === 200) + 1;
    await signIn(email, `${fresh} number ${winner}`).expect(200);
  });

  it('stops working after three days', async () => {
    const { token } = await invite();
    await minutesPass(api, 72 * 60);
    await use(token, fresh).expect(400);
    admin = await api.agentFor('administrator');
  });

  it('stops working when a newer one is sent, the account is disabled or the address changes', async () => {
    const first = await invite();
    await admin.post(`/api/people/${first.id}/links`).expect(200);
    await use(first.token, fresh).expect(400);
    await use(await newestToken(first.email), fresh).expect(200);

    const second = await invite();
    await admin
      .post(`/api/people/${second.id}/disablement`)
      .send({ reason: 'never came' })
      .expect(200);
    await use(second.token, fresh).expect(400);

    const third = await invite();
    const { body } = await admin.get(`/api/people/${third.id}`).expect(200);
    await admin
      .put(`/api/people/${third.id}`)
      .send({
        name: body.name,
        role: body.role,
        email: `moved-${third.email}`,
        version: body.version,
      })
      .expect(200);
    await use(third.token, fresh).expect(400);
  });

  it('is 256 random bits of which only the hash is kept', async () => {
    const { token } = await invite();
    expect(Buffer.from(token, 'base64url')).toHaveLength(32);
    const stored = JSON.stringify(await PersonLink.findAll({ raw: true }));
    expect(stored).not.toContain(token);
  });

  it('cannot be guessed by trying', async () => {
    const statuses = [];
    for (let n = 0; n < 70; n += 1)
      statuses.push((await api.stranger().get(`/api/links/${String(n).padStart(43, 'x')}`)).status);
    expect(new Set(statuses)).toEqual(new Set([400, 429]));
  });

  it('is told to no administrator: neither in the answer nor in the mail shown here', async () => {
    const { body } = await admin
      .post('/api/people')
      .send({ name: 'Shown', email: 'shown@quartzhold.test', role: 'auditor' })
      .expect(201);
    const token = await newestToken('shown@quartzhold.test');
    expect(JSON.stringify(body)).not.toContain(token);
    const [mail] = await mailsTo('shown@quartzhold.test');
    const shown = await admin.get(`/api/mail/${mail!.id}`).expect(200);
    expect(JSON.stringify(shown.body)).not.toContain(token);
  });
});

describe('a password chosen by a link', () => {
  it('has 15 characters or more', async () => {
    const { token } = await invite();
    const short = await use(token, 'nine boats now').expect(400);
    expect(short.body.error.fields.newPassword).toMatch(/15/);
    await use(token, 'nine boats afar').expect(200);
  });

  it('may be long and of any characters, and every one of them counts', async () => {
    const { token, email } = await invite();
    const long = `${'a'.repeat(60)} 😀é`;
    await use(token, long).expect(200);
    await signIn(email, `${long.slice(0, -1)}e`).expect(401);
    await signIn(email, long).expect(200);
  });

  it('is not one that is tried first, nor made of the own name; the link stays good', async () => {
    const { token } = await invite();
    for (const common of ['passwordpassword', 'qwertyuiopasdfghjkl', 'Quartzhold-2026!'])
      expect((await use(token, common).expect(400)).body.error.fields.newPassword).toMatch(/own/);
    await use(token, fresh).expect(200);
  });
});

describe('a reset', () => {
  it('is answered the same for known and unknown addresses', async () => {
    const ask = (email: string) =>
      api.stranger().post('/api/password/reset-requests').send({ email }).expect(202);
    const known = await ask(emailOf('technician'));
    const unknown = await ask('nobody@quartzhold.test');
    expect(known.body).toEqual(unknown.body);
    expect(await mailsTo('nobody@quartzhold.test')).toEqual([]);
  });

  it('replaces the password, ends all sessions and tells the owner', async () => {
    const agent = await api.agentFor('technician');
    await api
      .stranger()
      .post('/api/password/reset-requests')
      .send({ email: emailOf('technician') })
      .expect(202);
    await agent.get('/api/session').expect(200);
    await use(await newestToken(emailOf('technician')), fresh).expect(200);
    await agent.get('/api/session').expect(401);
    await signIn(emailOf('technician'), passphrase).expect(401);
    await signIn(emailOf('technician'), fresh).expect(200);
    const kinds = (await mailsTo(emailOf('technician'))).map(({ kind }) => kind);
    expect(kinds).toContain('account.password_changed');
  });

  it('works for one hour', async () => {
    await api
      .stranger()
      .post('/api/password/reset-requests')
      .send({ email: emailOf('auditor') })
      .expect(202);
    const token = await newestToken(emailOf('auditor'));
    await minutesPass(api, 60);
    await use(token, fresh).expect(400);
    admin = await api.agentFor('administrator');
  });

  it('is mailed to a disabled person by nobody', async () => {
    await Person.update({ state: 'disabled' }, { where: { id: api.people.supplier2.id } });
    await api
      .stranger()
      .post('/api/password/reset-requests')
      .send({ email: emailOf('supplier2') })
      .expect(202);
    expect(await mailsTo(emailOf('supplier2'))).toEqual([]);
  });

  it('fills nobody’s mailbox', async () => {
    const statuses = [];
    for (let n = 0; n < 5; n += 1)
      statuses.push(
        (
          await api
            .stranger()
            .post('/api/password/reset-requests')
            .send({ email: emailOf('quality') })
        ).status,
      );
    expect(statuses).toEqual([202, 202, 202, 429, 429]);
  });
});

describe('changing the own password', () => {
  it('needs the current one', async () => {
    const agent = await api.agentFor('quality');
    await agent.post('/api/password').send({ newPassword: fresh }).expect(400);
    const refused = await agent
      .post('/api/password')
      .send({ currentPassword: 'not the right sentence', newPassword: fresh })
      .expect(403);
    expect(refused.body.error.fields).toHaveProperty('currentPassword');
  });

  it('ends the other sessions if asked to, keeps this one, and tells the owner', async () => {
    const [here, there] = [await api.agentFor('quality'), await api.agentFor('quality')];
    await here
      .post('/api/password')
      .send({ currentPassword: passphrase, newPassword: fresh, endOtherSessions: true })
      .expect(200);
    await here.get('/api/session').expect(200);
    await there.get('/api/session').expect(401);
    expect((await mailsTo(emailOf('quality')))[0]).toMatchObject({
      kind: 'account.password_changed',
    });
  });

  it('kills a reset link that was already mailed', async () => {
    const agent = await api.agentFor('quality2');
    await admin.post(`/api/people/${api.people.quality2.id}/links`).expect(200);
    const token = await newestToken(emailOf('quality2'));
    await agent
      .post('/api/password')
      .send({ currentPassword: passphrase, newPassword: fresh })
      .expect(200);
    await use(token, 'somebody else writes this').expect(400);
  });
});

describe('the first administrator', () => {
  it('is offered by no link while there are people', async () => {
    expect(await firstAdministratorLink()).toBeNull();
  });

  it('is made by a one-time link in an empty database, and by no second one', async () => {
    const empty = await startApi();
    try {
      await asOperator(empty, 'DELETE FROM people');
      const [older, url] = [await firstAdministratorLink(), await firstAdministratorLink()];
      const path = (link: string | null) => `/api${new URL(link!).pathname}`;
      const make = (link: string | null) =>
        empty
          .stranger()
          .post(path(link))
          .send({ newPassword: fresh, name: 'Frida First', email: 'frida@quartzhold.test' });
      const info = await empty.stranger().get(path(url)).expect(200);
      expect(info.body).toMatchObject({ purpose: 'first_administrator', email: '' });
      await make(older).expect(400);
      const bare = await empty.stranger().post(path(url)).send({ newPassword: fresh }).expect(400);
      expect(Object.keys(bare.body.error.fields)).toEqual(['name', 'email']);
      await make(url).expect(200);
      await make(url).expect(400);
      const answer = await empty
        .stranger()
        .post('/api/session')
        .send({ email: 'frida@quartzhold.test', password: fresh })
        .expect(200);
      expect(answer.body.role).toBe('administrator');
      expect(await firstAdministratorLink()).toBeNull();
      expect(await HistoryEntry.count({ where: { act: 'first_administrator.make' } })).toBe(1);
    } finally {
      await empty.close();
    }
  });
});
