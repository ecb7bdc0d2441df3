import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { emailOf, passphrase, startApi, type Agent, type Api } from '../support/api';
import { asOperator, newestToken } from '../support/outside';

let api: Api;
let admin: Agent;
let auditor: Agent;
beforeAll(async () => {
  api = await startApi();
  admin = await api.agentFor('administrator');
  auditor = await api.agentFor('auditor');
});
afterAll(() => api.close());

const entries = () =>
  asOperator(api, 'SELECT act, payload FROM history_entries ORDER BY at, id') as Promise<
    { act: string; payload: string }[]
  >;
/** The acts that an act of a person adds. */
async function added(perform: () => PromiseLike<unknown>): Promise<string[]> {
  const before = (await entries()).length;
  await perform();
  return (await entries()).slice(before).map(({ act }) => act);
}

const secrets = {
  right: passphrase,
  wrong: 'a wrong sentence that nobody keeps',
  chosen: 'seven lanterns over the pier',
  changed: 'eight lanterns over the pier',
};

describe('every act is written down once', () => {
  let personId: string;
  let supplierId: string;
  let benchId: string;
  let tokenId: string;
  let filterId: string;
  const email = 'written@quartzhold.test';
  const bench = {
    name: 'Bench W',
    counter: 'C',
    expandedUncertaintyPpm: 0.1,
    calibrationDue: '2099-01-01',
  };
  const version = async (path: string) => (await admin.get(path)).body.version as number;

  const acts: [string, () => PromiseLike<unknown>][] = [
    [
      'person.invite',
      async () => {
        const { body } = await admin
          .post('/api/people')
          .send({ name: 'Wanda', email, role: 'technician' })
          .expect(201);
        personId = body.id;
      },
    ],
    ['person.send_link', () => admin.post(`/api/people/${personId}/links`).expect(200)],
    [
      'password.set_by_link',
      async () =>
        api
          .stranger()
          .post(`/api/links/${await newestToken(email)}`)
          .send({ newPassword: secrets.chosen })
          .expect(200),
    ],
    [
      'session.refuse',
      () =>
        api.stranger().post('/api/session').send({ email, password: secrets.wrong }).expect(401),
    ],
    [
      'session.refuse',
      () =>
        api
          .stranger()
          .post('/api/session')
          .send({ email: secrets.wrong, password: 'x' })
          .expect(401),
    ],
    [
      'session.start',
      () =>
        api.stranger().post('/api/session').send({ email, password: secrets.chosen }).expect(200),
    ],
    [
      'password.reset_request',
      () => api.stranger().post('/api/password/reset-requests').send({ email }).expect(202),
    ],
    [
      'person.change',
      async () =>
        admin
          .put(`/api/people/${personId}`)
          .send({
            name: 'Wanda W',
            email,
            role: 'technician',
            version: await version(`/api/people/${personId}`),
          })
          .expect(200),
    ],
    ['person.unlock', () => admin.post(`/api/people/${personId}/unlocking`).expect(200)],
    ['person.end_sessions', () => admin.delete(`/api/people/${personId}/sessions`).expect(200)],
    [
      'person.disable',
      () => admin.post(`/api/people/${personId}/disablement`).send({ reason: 'left' }).expect(200),
    ],
    ['person.enable', () => admin.delete(`/api/people/${personId}/disablement`).expect(200)],
    [
      'supplier.add',
      async () => {
        supplierId = (await admin.post('/api/suppliers').send({ name: 'Written' }).expect(201)).body
          .id;
      },
    ],
    [
      'supplier.change',
      () =>
        admin
          .put(`/api/suppliers/${supplierId}`)
          .send({ name: 'Rewritten', version: 1 })
          .expect(200),
    ],
    [
      'bench.add',
      async () => {
        benchId = (await admin.post('/api/benches').send(bench).expect(201)).body.id;
      },
    ],
    [
      'bench.change',
      () =>
        admin
          .put(`/api/benches/${benchId}`)
          .send({ ...bench, location: 'Hall 2', version: 1 })
          .expect(200),
    ],
    [
      'bench.token.issue',
      async () => {
        const { body } = await admin
          .post(`/api/benches/${benchId}/tokens`)
          .send({ label: 'w' })
          .expect(201);
        tokenId = body.id;
        Object.assign(secrets, { token: body.secret });
      },
    ],
    [
      'bench.token.revoke',
      () => admin.delete(`/api/benches/${benchId}/tokens/${tokenId}`).expect(200),
    ],
    [
      'preference.mail',
      () => auditor.put('/api/preferences/mail').send({ mailChoice: 'daily' }).expect(200),
    ],
    [
      'preference.table',
      () =>
        auditor
          .put('/api/preferences/tables/lots')
          .send({ columns: ['lotNumber'] })
          .expect(200),
    ],
    [
      'filter.save',
      async () => {
        const { body } = await auditor
          .post('/api/saved-filters')
          .send({ list: 'lots', name: 'Held', query: 'state=on_hold' })
          .expect(201);
        filterId = body.id;
      },
    ],
    ['filter.delete', () => auditor.delete(`/api/saved-filters/${filterId}`).expect(200)],
    ['session.end', () => auditor.delete('/api/sessions/others').expect(200)],
    [
      'password.change',
      () =>
        auditor
          .post('/api/password')
          .send({ currentPassword: passphrase, newPassword: secrets.changed })
          .expect(200),
    ],
    ['session.end', () => auditor.delete('/api/session').expect(200)],
  ];
  it.each(acts)('%s', async (act, perform) => {
    expect(await added(perform)).toEqual([act]);
  });

  it('and what was refused leaves no act behind', async () => {
    expect(
      await added(async () => {
        await admin.post('/api/suppliers').send({ name: 'rewritten' }).expect(409);
        await admin
          .put(`/api/suppliers/${supplierId}`)
          .send({ name: 'Late', version: 1 })
          .expect(409);
        await admin.post('/api/people').send({ name: 'W', email, role: 'auditor' }).expect(409);
      }),
    ).toEqual([]);
  });
});

describe('the entries', () => {
  it('hold old and new values, and who did it', async () => {
    const changed = (await entries()).find(({ act }) => act === 'supplier.change')!;
    expect(JSON.parse(changed.payload)).toMatchObject({
      actorId: api.people.admin.id,
      actorRole: 'administrator',
      before: { name: 'Written' },
      after: { name: 'Rewritten' },
    });
  });

  it('hold no password, no token, no link and no hash of them', async () => {
    const rows = JSON.stringify([
      await entries(),
      await asOperator(api, 'SELECT * FROM history_personal'),
    ]);
    const links = await asOperator(api, 'SELECT text_body FROM mails WHERE secret');
    const tokens = links.flatMap(({ text_body }) =>
      [...String(text_body).matchAll(/\/links\/([\w-]+)/g)].map(([, token]) => token!),
    );
    expect(tokens.length).toBeGreaterThan(1);
    const hashes = await asOperator(
      api,
      'SELECT password_hash AS hash FROM people WHERE password_hash IS NOT NULL UNION SELECT token_hash FROM person_links UNION SELECT token_hash FROM bench_tokens',
    );
    const sids = await asOperator(api, 'SELECT sid FROM sessions');
    for (const secret of [
      ...Object.values(secrets),
      ...tokens,
      ...hashes.map(({ hash }) => String(hash)),
      ...sids.map(({ sid }) => String(sid)),
    ])
      expect(rows).not.toContain(secret);
  });

  it('keep names and addresses of people beside the chain', async () => {
    const chained = JSON.stringify(await entries());
    expect(chained).not.toContain('Wanda');
    expect(chained).not.toContain('written@');
    expect(chained).not.toContain(emailOf('admin'));
    const beside = JSON.stringify(await asOperator(api, 'SELECT * FROM history_personal'));
    expect(beside).toContain('Wanda W');
  });
});
