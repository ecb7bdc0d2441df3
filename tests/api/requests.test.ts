import request from 'supertest';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { createApp } from '../../server/app';
import { HistoryEntry, Supplier } from '../../server/models';
import { emailOf, passphrase, startApi, type Agent, type Api } from '../support/api';
import { asOperator } from '../support/outside';

let api: Api;
let admin: Agent;
let cookie: string;
beforeAll(async () => {
  api = await startApi();
  admin = await api.agentFor('administrator');
  const answer = await api
    .stranger()
    .post('/api/session')
    .send({ email: emailOf('admin'), password: passphrase });
  cookie = String(answer.headers['set-cookie']![0]).split(';')[0]!;
});
afterAll(() => api.close());
beforeEach(() => asOperator(api, 'DELETE FROM rate_limits'));

describe('a request that changes something', () => {
  const add = (headers: Record<string, string>, name: string) =>
    request(api.app)
      .post('/api/suppliers')
      .set({ Cookie: cookie, ...headers })
      .send({ name });

  it.each<[string, Record<string, string>]>([
    ['without our header', {}],
    ['with a wrong header', { 'X-Quartzhold': '0' }],
    ['from a foreign page', { 'X-Quartzhold': '1', Origin: 'https://elsewhere.example' }],
    ['from no page that says so', { 'X-Quartzhold': '1', Origin: 'null' }],
    [
      'from a neighbour of our host',
      { 'X-Quartzhold': '1', Origin: 'http://other.quartzhold.test' },
    ],
    [
      'from another port of our host',
      { 'X-Quartzhold': '1', Origin: 'http://quartzhold.test:8080' },
    ],
    [
      'from another site, as the browser says',
      { 'X-Quartzhold': '1', 'Sec-Fetch-Site': 'cross-site' },
    ],
    ['from a neighbouring site', { 'X-Quartzhold': '1', 'Sec-Fetch-Site': 'same-site' }],
  ])('%s is refused', async (_what, headers) => {
    const answer = await add(headers, 'Foreign').expect(403);
    expect(answer.body.error.code).toBe('request.foreign');
    expect(await Supplier.count({ where: { name: 'Foreign' } })).toBe(0);
  });

  it.each(['application/x-www-form-urlencoded', 'text/plain', 'multipart/form-data; boundary=x'])(
    'as a form would send it (%s) is refused',
    async (type) => {
      await request(api.app)
        .post('/api/suppliers')
        .set({ Cookie: cookie, 'Content-Type': type })
        .send('name=Foreign')
        .expect(403);
    },
  );

  it.each<[string, Record<string, string>]>([
    ['our public address', { Origin: 'http://quartzhold.test' }],
    ['our page, as the browser says', { 'Sec-Fetch-Site': 'same-origin' }],
    ['a program that sends no origin', {}],
    [
      'the address it was sent to',
      { Host: 'desk.example:3000', Origin: 'http://desk.example:3000' },
    ],
  ])('from %s is taken', async (what, headers) => {
    await add({ 'X-Quartzhold': '1', ...headers }, `Ours: ${what}`).expect(201);
  });

  it('is refused before the session is looked at, so that nothing is learned', async () => {
    const answer = await request(api.app).post('/api/suppliers').send({ name: 'x' }).expect(403);
    expect(answer.body.error.code).toBe('request.foreign');
  });
});

describe('reading', () => {
  it('writes nothing', async () => {
    const before = await HistoryEntry.count();
    for (const path of [
      '/api/people',
      '/api/suppliers',
      '/api/benches',
      '/api/session',
      '/api/preferences',
    ])
      await admin.get(path).expect(200);
    expect(await HistoryEntry.count()).toBe(before);
  });
});

describe('fields that nobody may set', () => {
  it('change nothing on a person', async () => {
    const intruder = {
      name: 'Mallory',
      email: 'mallory@quartzhold.test',
      role: 'technician',
      state: 'active',
      passwordHash: 'x',
      sessionEpoch: 9,
      version: 40,
      id: '11111111-1111-4111-8111-111111111111',
      password: passphrase,
    };
    const { body } = await admin.post('/api/people').send(intruder).expect(201);
    expect(body).toMatchObject({ state: 'invited', version: 1 });
    expect(body.id).not.toBe(intruder.id);
    const [row] = await asOperator(
      api,
      'SELECT password_hash, session_epoch FROM people WHERE id = $1',
      [body.id],
    );
    expect(row).toEqual({ password_hash: null, session_epoch: 1 });
  });

  it('change nothing on a supplier, a bench or oneself', async () => {
    const supplier = await admin
      .post('/api/suppliers')
      .send({
        name: 'Plain',
        version: 7,
        createdAt: '2001-01-01T00:00:00Z',
        id: api.suppliers.first.id,
      })
      .expect(201);
    expect(supplier.body).toMatchObject({ version: 1 });
    expect(supplier.body.id).not.toBe(api.suppliers.first.id);
    const auditor = await api.agentFor('auditor');
    const mine = await auditor
      .put('/api/preferences/mail')
      .send({ mailChoice: 'daily', role: 'administrator', email: 'other@quartzhold.test' })
      .expect(200);
    expect(mine.body).toMatchObject({
      role: 'auditor',
      email: emailOf('auditor'),
      mailChoice: 'daily',
    });
  });

  it('the role is not taken from anywhere but the account', async () => {
    const technician = await api.agentFor('technician');
    await technician
      .post('/api/people')
      .set('X-Role', 'administrator')
      .send({ role: 'administrator' })
      .expect(403);
  });
});

describe('every answer', () => {
  it.each([
    '/',
    '/lots/anything',
    '/api/health',
    '/api/session',
    '/api/docs',
    '/api/nothing',
    '/missing.png',
  ])('%s closes the page against foreign code', async (path) => {
    const { headers } = await request(api.app).get(path);
    const policy = String(headers['content-security-policy']);
    expect(policy).toContain("script-src 'self';");
    for (const closed of [
      "object-src 'none'",
      "base-uri 'none'",
      "frame-ancestors 'none'",
      "script-src-attr 'none'",
    ])
      expect(policy).toContain(closed);
    expect(policy).not.toContain('unsafe-eval');
    expect(policy.replace("style-src-attr 'unsafe-inline'", '')).not.toContain('unsafe-inline');
    expect(headers['x-content-type-options']).toBe('nosniff');
    expect(headers['referrer-policy']).toBe('no-referrer');
    expect(headers['x-frame-options']).toBe('DENY');
    expect(
      Number(/max-age=(\d+)/.exec(String(headers['strict-transport-security']))![1]),
    ).toBeGreaterThanOrEqual(31_536_000);
    expect(headers).not.toHaveProperty('x-powered-by');
  });

  it('of the interface is kept by no cache', async () => {
    for (const path of ['/api/health', '/api/session', '/api/people', '/api/nothing'])
      expect((await admin.get(path)).headers['cache-control']).toBe('no-store');
  });

  it.each([
    '/.git/config',
    '/.env',
    '/package.json',
    '/server/app.ts',
    '/assets/',
    '/assets/index.js.map',
    '/api/debug',
    '/server-status',
    '/..%2fpackage.json',
    '/%2e%2e/package.json',
  ])('%s gives nothing away', async (path) => {
    const answer = await request(api.app).get(path);
    expect(answer.text ?? '').not.toMatch(
      /"dependencies"|\[core\]|SESSION_SECRET|createApp|Index of/,
    );
    if (!/text\/html/.test(String(answer.headers['content-type']))) expect(answer.status).toBe(404);
  });

  it('to an address of the interface that is not there is an error in JSON', async () => {
    const answer = await admin.get('/api/nothing/here').expect(404).expect('Content-Type', /json/);
    expect(answer.body.error.code).toBe('record.not_found');
  });
});

describe('what goes wrong', () => {
  const bare = /node_modules|at \w|Sequelize|SELECT|INSERT|pg_|\.ts:|stack/i;

  it('is said without insides when the JSON is broken', async () => {
    const answer = await admin
      .post('/api/suppliers')
      .set('Content-Type', 'application/json')
      .send('{"name": ')
      .expect(400);
    expect(answer.body.error.code).toBe('request.not_json');
    expect(JSON.stringify(answer.body)).not.toMatch(bare);
  });

  it('names the fields when the input is wrong', async () => {
    const answer = await admin.post('/api/benches').send({ name: '', counter: 'C' }).expect(400);
    expect(Object.keys(answer.body.error.fields).sort()).toEqual([
      'calibrationDue',
      'expandedUncertaintyPpm',
      'name',
    ]);
  });

  it('is refused when the body is too large', async () => {
    const answer = await admin
      .post('/api/suppliers')
      .send({ name: 'x', notes: 'n'.repeat(1_200_000) })
      .expect(413);
    expect(answer.body.error.code).toBe('request.too_large');
  });

  it('is a 400 when an address is malformed', async () => {
    await admin.get('/api/people/not-an-id').expect(400);
    await admin.get('/api/people/%').expect(400);
    await admin.get('/api/people?after=nonsense').expect(400);
    await admin.get('/api/people?limit=9999').expect(400);
  });

  it('takes quotes, tags and line breaks as text', async () => {
    for (const name of [
      `'; DROP TABLE people; --`,
      '<script>alert(1)</script>',
      'two\r\nlines "quoted"',
      '%_\\',
    ]) {
      const { body } = await admin.post('/api/suppliers').send({ name }).expect(201);
      expect(body.name).toBe(name);
      const found = await admin.get('/api/suppliers').query({ find: name }).expect(200);
      expect(found.body.items.map((item: { name: string }) => item.name)).toEqual([name]);
    }
  });
});

describe('a forged address', () => {
  it('does not get round the waits when no proxy is trusted', async () => {
    const statuses = [];
    for (let n = 0; n < 7; n += 1)
      statuses.push(
        (
          await api
            .stranger()
            .post('/api/session')
            .set('X-Forwarded-For', `203.0.113.${n}`)
            .send({ email: emailOf('quality'), password: 'a wrong sentence it is' })
        ).status,
      );
    expect(statuses).toContain(429);
  });
});

describe('without its database', () => {
  it('the server says 503, changes nothing and gives no insides away', async () => {
    const other = await startApi();
    const agent = await other.agentFor('administrator');
    const app = createApp();
    await other.testDatabase.drop();
    for (const asked of [
      agent.get('/api/suppliers'),
      agent.post('/api/suppliers').send({ name: 'Lost' }),
    ]) {
      const answer = await asked.expect(503);
      expect(answer.body.error.code).toBe('service.not_ready');
      expect(JSON.stringify(answer.body)).not.toMatch(/quartzhold_app|password|127\.0\.0\.1|FATAL/);
    }
    await request(app)
      .post('/api/session')
      .set('X-Quartzhold', '1')
      .send({ email: emailOf('admin'), password: passphrase })
      .expect(503);
    const health = await request(app).get('/api/health').expect(503);
    expect(health.body).toMatchObject({ status: 'degraded', checks: [] });
    await other.close();
  });
});
