import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { SessionStore } from '../../server/http/session-store';
import { pruneSessions } from '../../server/services/sessions/list-sessions';
import { useConfig } from '../../server/config';
import { createApp } from '../../server/app';
import request from 'supertest';
import { emailOf, passphrase, startApi, type Agent, type Api, type CastName } from '../support/api';
import { asOperator, minutesPass } from '../support/outside';

let api: Api;
beforeAll(async () => {
  api = await startApi();
});
afterAll(() => api.close());

/** A session as its cookie alone, so that it can be used after the browser would have dropped it. */
async function cookieOf(name: CastName, before?: string): Promise<string> {
  const asked = api.stranger().post('/api/session');
  if (before) void asked.set('Cookie', before);
  const answer = await asked.send({ email: emailOf(name), password: passphrase }).expect(200);
  return String(answer.headers['set-cookie']![0]).split(';')[0]!;
}
const withCookie = (cookie: string) => api.stranger().get('/api/session').set('Cookie', cookie);
const sidOf = (cookie: string) => decodeURIComponent(cookie.split('=')[1]!).slice(2).split('.')[0]!;

describe('the id of a session', () => {
  it('is new at each sign-in, and the old one is dead', async () => {
    const first = await cookieOf('technician');
    const second = await cookieOf('technician', first);
    expect(sidOf(second)).not.toBe(sidOf(first));
    await withCookie(first).expect(401);
    await withCookie(second).expect(200);
  });

  it('is not taken from the outside', async () => {
    const planted = 'quartzhold=s%3Aplanted.c2lnbmF0dXJl';
    const cookie = await cookieOf('technician', planted);
    expect(cookie).not.toContain('planted');
  });

  it('is new after the password was changed', async () => {
    const cookie = await cookieOf('auditor');
    const answer = await api
      .stranger()
      .post('/api/password')
      .set('Cookie', cookie)
      .send({
        currentPassword: passphrase,
        newPassword: 'the ferry leaves without us',
        endOtherSessions: false,
      })
      .expect(200);
    const renewed = String(answer.headers['set-cookie']![0]).split(';')[0]!;
    await withCookie(cookie).expect(401);
    await withCookie(renewed).expect(200);
  });

  it('has 128 random bits and more, never twice', async () => {
    const sids = new Set<string>();
    for (let n = 0; n < 20; n += 1) sids.add(sidOf(await cookieOf('technician')));
    expect(sids.size).toBe(20);
    for (const sid of sids) expect(Buffer.from(sid, 'base64url').length).toBeGreaterThanOrEqual(16);
  });

  it('opens nothing when it was edited', async () => {
    const cookie = await cookieOf('technician');
    const changed = cookie.replace(
      /s%3A./,
      (start) => start.slice(0, -1) + (start.endsWith('A') ? 'B' : 'A'),
    );
    expect(changed).not.toBe(cookie);
    await withCookie(changed).expect(401);
  });

  it('is given to nobody who has not signed in', async () => {
    const answer = await api.stranger().get('/api/session').expect(401);
    expect(answer.headers).not.toHaveProperty('set-cookie');
  });
});

describe('the cookie', () => {
  it('belongs to our host alone, behind TLS that a trusted proxy ends', async () => {
    const secure = {
      ...api.config,
      PUBLIC_URL: 'https://quartzhold.test',
      secureCookies: true,
      TRUST_PROXY: 'loopback',
    };
    useConfig(secure);
    try {
      const answer = await request(createApp())
        .post('/api/session')
        .set({
          'X-Quartzhold': '1',
          'X-Forwarded-Proto': 'https',
          Origin: 'https://quartzhold.test',
        })
        .send({ email: emailOf('technician'), password: passphrase })
        .expect(200);
      const cookie = String(answer.headers['set-cookie']![0]);
      expect(cookie).toMatch(/^__Host-quartzhold=/);
      expect(cookie.split('; ').slice(1).sort()).toEqual([
        'HttpOnly',
        'Path=/',
        'SameSite=Lax',
        'Secure',
      ]);
    } finally {
      useConfig(api.config);
    }
  });
});

describe('a session ends', () => {
  it('after an hour without use, and use moves the end', async () => {
    const cookie = await cookieOf('technician');
    await minutesPass(api, 50);
    await withCookie(cookie).expect(200);
    await minutesPass(api, 50);
    await withCookie(cookie).expect(200);
    await minutesPass(api, 61);
    await withCookie(cookie).expect(401);
  });

  it('after twelve hours however much it is used', async () => {
    const cookie = await cookieOf('technician');
    for (let hours = 1; hours < 12; hours += 1) {
      await minutesPass(api, 30);
      await withCookie(cookie).expect(200);
      await minutesPass(api, 30);
      await withCookie(cookie).expect(200);
    }
    await minutesPass(api, 60);
    await withCookie(cookie).expect(401);
  });

  it('though a page polls in the background or listens to events', async () => {
    const cookie = await cookieOf('technician');
    await minutesPass(api, 40);
    await withCookie(cookie).set('X-Quartzhold-Background', '1').expect(200);
    await withCookie(cookie).set('Accept', 'text/event-stream').expect(200);
    await minutesPass(api, 40);
    await withCookie(cookie).expect(401);
  });

  it('later when the person asks to stay, and the page is told when', async () => {
    const cookie = await cookieOf('technician');
    await minutesPass(api, 40);
    const background = await withCookie(cookie).set('X-Quartzhold-Background', '1').expect(200);
    const extended = await api
      .stranger()
      .post('/api/session/extension')
      .set('Cookie', cookie)
      .expect(200);
    const minutesLeft = (body: { sessionEndsAt: string }) =>
      (Date.parse(body.sessionEndsAt) - Date.now()) / 60_000;
    expect(Math.round(minutesLeft(background.body))).toBe(20);
    expect(Math.round(minutesLeft(extended.body))).toBe(60);
  });

  it('at sign-out on the server, also with a slow request in flight', async () => {
    const cookie = await cookieOf('technician');
    const slow = api
      .stranger()
      .post('/api/password/reset-requests')
      .set('Cookie', cookie)
      .send({ email: 'nobody@quartzhold.test' })
      .then((answer) => answer.status);
    const out = await api.stranger().delete('/api/session').set('Cookie', cookie).expect(200);
    expect(String(out.headers['set-cookie'])).toMatch(/quartzhold=;/);
    expect(await slow).toBe(202);
    await withCookie(cookie).expect(401);
  });

  it('for good: saving it again after its row is gone brings nothing back', async () => {
    const store = new SessionStore();
    await new Promise<void>((resolve, reject) => {
      store.set('ended-long-ago', { cookie: {} } as never, (error) =>
        error ? reject(error as Error) : resolve(),
      );
    });
    expect(await asOperator(api, `SELECT 1 FROM sessions WHERE sid = 'ended-long-ago'`)).toEqual(
      [],
    );
  });

  it('on the next request once the person is disabled', async () => {
    const cookie = await cookieOf('quality2');
    const admin = await api.agentFor('administrator');
    await admin
      .post(`/api/people/${api.people.quality2.id}/disablement`)
      .send({ reason: 'left the company' })
      .expect(200);
    await withCookie(cookie).expect(401);
    await admin.delete(`/api/people/${api.people.quality2.id}/disablement`).expect(200);
    await withCookie(cookie).expect(401);
  });

  it('though its row survived, when the epoch of the person has moved on', async () => {
    const cookie = await cookieOf('quality');
    await asOperator(api, 'UPDATE people SET session_epoch = session_epoch + 1 WHERE id = $1', [
      api.people.quality.id,
    ]);
    await withCookie(cookie).expect(401);
  });
});

describe('sessions that have ended by time', () => {
  it('are neither listed nor kept, and the others are left alone', async () => {
    await api.database.pool.query('DELETE FROM sessions');
    await cookieOf('supplier');
    await minutesPass(api, 61);
    const agent = await api.agentFor('supplier');
    expect((await agent.get('/api/sessions').expect(200)).body.items).toHaveLength(1);
    expect(await pruneSessions()).toBe(1);
    await agent.get('/api/session').expect(200);
  });
});

describe('a role', () => {
  it('counts from the next request on', async () => {
    const { id } = api.people.technician;
    const technician = await api.agentFor('technician');
    const admin = await api.agentFor('administrator');
    await technician.get('/api/history').expect(403);
    const { body } = await admin.get(`/api/people/${id}`).expect(200);
    await admin
      .put(`/api/people/${id}`)
      .send({
        name: body.name,
        email: body.email,
        role: 'auditor',
        supplierId: null,
        version: body.version,
      })
      .expect(200);
    const now = await technician.get('/api/session').expect(200);
    expect(now.body.role).toBe('auditor');
    await technician.post('/api/lots').send({}).expect(403);
    await admin
      .put(`/api/people/${id}`)
      .send({
        name: body.name,
        email: body.email,
        role: 'technician',
        supplierId: null,
        version: body.version + 1,
      })
      .expect(200);
  });
});

describe('the sessions of a person', () => {
  const list = async (agent: Agent) =>
    (await agent.get('/api/sessions').expect(200)).body.items as {
      id: string;
      device: string;
      current: boolean;
    }[];

  it('are seen by the person alone, without the ids that open them', async () => {
    await api.database.pool.query('DELETE FROM sessions');
    const agent = await api.agentFor('supplier');
    await api.agentFor('supplier2');
    const cookie = await cookieOf('supplier');
    const sessions = await list(agent);
    expect(sessions).toHaveLength(2);
    expect(sessions.filter(({ current }) => current)).toHaveLength(1);
    expect(JSON.stringify(sessions)).not.toContain(sidOf(cookie));
  });

  it('are ended by the person, one or all others', async () => {
    await api.database.pool.query('DELETE FROM sessions');
    const agent = await api.agentFor('supplier');
    const [one, two, three] = [
      await cookieOf('supplier'),
      await cookieOf('supplier'),
      await cookieOf('supplier'),
    ];
    const target = (await list(agent)).find(({ current }) => !current)!;
    await agent.delete(`/api/sessions/${target.id}`).expect(200);
    expect(await list(agent)).toHaveLength(3);
    await agent.delete('/api/sessions/others').expect(200);
    for (const cookie of [one, two, three]) await withCookie(cookie!).expect(401);
    await agent.get('/api/session').expect(200);
  });

  it('are not ended by somebody else', async () => {
    const agent = await api.agentFor('supplier');
    const [own] = await list(agent);
    const other = await api.agentFor('supplier2');
    await other.delete(`/api/sessions/${own!.id}`).expect(404);
    await agent.get('/api/session').expect(200);
  });

  it('are all ended by an administrator', async () => {
    const cookie = await cookieOf('supplier');
    const admin = await api.agentFor('administrator');
    await admin.delete(`/api/people/${api.people.supplier.id}/sessions`).expect(200);
    await withCookie(cookie).expect(401);
  });

  it('say in words which device it was', async () => {
    const agent = api
      .stranger()
      .set('User-Agent', 'Mozilla/5.0 (X11; Linux x86_64; rv:140.0) Gecko/20100101 Firefox/140.0');
    await agent
      .post('/api/session')
      .send({ email: emailOf('supplier'), password: passphrase })
      .expect(200);
    expect((await list(agent)).find(({ current }) => current)!.device).toBe('Firefox on Linux');
  });
});
