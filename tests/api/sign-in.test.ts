import { hash, type verify as realVerify } from '@node-rs/argon2';
import { type Options } from 'sequelize';
import { afterAll, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import { useConfig } from '../../server/config';
import { isOutdated, passwordCost } from '../../server/services/sign-in/password';
import { Person } from '../../server/models';
import { emailOf, passphrase, startApi, testConfig, type Api } from '../support/api';
import { asOperator, minutesPass } from '../support/outside';

const verifications = vi.hoisted(() => ({ count: 0 }));
vi.mock('@node-rs/argon2', async (original) => {
  const real = await original<{ verify: typeof realVerify }>();
  return {
    ...real,
    verify: (...given: Parameters<typeof realVerify>) => {
      verifications.count += 1;
      return real.verify(...given);
    },
  };
});

let api: Api;
beforeAll(async () => {
  // Tests choose the address they come from.
  api = await startApi({ TRUST_PROXY: 'loopback' });
});
afterAll(() => api.close());
beforeEach(() => asOperator(api, 'DELETE FROM rate_limits'));

const wrong = 'a heron sleeps on the weir';
const tryFrom = (address: string, email: string, password: string) =>
  api.stranger().post('/api/session').set('X-Forwarded-For', address).send({ email, password });

describe('signing in', () => {
  it('tells who is signed in, under the address written in any case', async () => {
    const answer = await tryFrom('192.0.2.1', 'QUALITY@quartzhold.test', passphrase).expect(200);
    expect(answer.body).toMatchObject({
      email: 'quality@quartzhold.test',
      role: 'quality_engineer',
      supplier: null,
    });
    expect(answer.body).not.toHaveProperty('passwordHash');
  });

  it('takes the password whole and as it is: neither cut nor folded', async () => {
    for (const almost of [passphrase.slice(0, -1), `${passphrase} `, passphrase.toUpperCase()])
      await tryFrom('192.0.2.2', emailOf('auditor'), almost).expect(401);
  });

  it('does not mind how old a password is', async () => {
    await asOperator(api, `UPDATE people SET created_at = created_at - interval '1 year'`);
    await tryFrom('192.0.2.3', emailOf('auditor'), passphrase).expect(200);
  });

  it('knows no usual pairs', async () => {
    for (const name of ['admin', 'root', 'administrator', 'quartzhold', 'guest'])
      for (const password of ['admin', 'password', 'quartzhold', 'changeme'])
        await tryFrom(`192.0.2.${10 + name.length}`, name, password).then((answer) =>
          expect([401, 429]).toContain(answer.status),
        );
  });
});

describe('what a stranger can learn by trying', () => {
  const cases = {
    'an unknown address': 'nobody@quartzhold.test',
    'a wrong password': emailOf('technician'),
    'a disabled person': 'gone@quartzhold.test',
    'an invited person': 'guest@quartzhold.test',
  };
  beforeAll(async () => {
    const { passwordHash } = api.people.technician;
    const base = { name: 'Somebody', role: 'technician' as const };
    await Person.create({
      ...base,
      email: cases['a disabled person'],
      passwordHash,
      state: 'disabled',
    });
    await Person.create({ ...base, email: cases['an invited person'], state: 'invited' });
  });

  it('the answer is the same for all of them', async () => {
    const bodies = [];
    for (const email of Object.values(cases))
      bodies.push((await tryFrom('192.0.2.30', email, wrong).expect(401)).body);
    expect(new Set(bodies.map((body) => JSON.stringify(body))).size).toBe(1);
  });

  it('a disabled person is not let in by the right password either', async () => {
    await tryFrom('192.0.2.31', cases['a disabled person'], passphrase).expect(401);
  });

  it('the work is the same for all of them: one hash and the same statements', async () => {
    const works = [];
    for (const [index, email] of Object.values(cases).entries()) {
      const statements: string[] = [];
      const { options } = api.database.sequelize as unknown as { options: Options };
      options.logging = (sql) => {
        // Values differ; what is done with them must not.
        statements.push(
          sql
            .replace(/^Executing \([^)]*\): /, '')
            .replace(/'(?:[^']|'')*'|\bNULL\b|\b\d+\b/g, '?'),
        );
      };
      verifications.count = 0;
      await tryFrom(`192.0.2.${40 + index}`, email, wrong).expect(401);
      options.logging = false;
      works.push({ hashes: verifications.count, statements });
    }
    expect(works[0]!.hashes).toBe(1);
    expect(works[0]!.statements.length).toBeGreaterThan(5);
    for (const work of works) expect(work).toEqual(works[0]);
  });

  it('waits begin for addresses that nobody has just as for others', async () => {
    const answers = [];
    for (const email of ['stranger@quartzhold.test', emailOf('quality2')]) {
      for (let n = 0; n < 5; n += 1) await tryFrom('192.0.2.50', email, wrong).expect(401);
      answers.push((await tryFrom('192.0.2.50', email, wrong).expect(429)).body);
    }
    expect(answers[0]).toEqual(answers[1]);
  });
});

describe('guessing', () => {
  it('is slowed after five tries, says for how long, and the wait grows', async () => {
    const email = emailOf('technician');
    for (let n = 0; n < 5; n += 1) await tryFrom('192.0.2.60', email, wrong).expect(401);
    const first = await tryFrom('192.0.2.60', email, passphrase).expect(429);
    expect(Number(first.headers['retry-after'])).toBeGreaterThan(0);
    await minutesPass(api, 1);
    await tryFrom('192.0.2.60', email, wrong).expect(401);
    const second = await tryFrom('192.0.2.60', email, wrong).expect(429);
    expect(Number(second.headers['retry-after'])).toBeGreaterThan(
      Number(first.headers['retry-after']),
    );
  });

  it('gets 150 tries nowhere, and the right password works when the longest wait is over', async () => {
    const email = emailOf('quality');
    const statuses = [];
    for (let n = 0; n < 150; n += 1)
      statuses.push((await tryFrom('192.0.2.61', email, `${wrong} ${n}`)).status);
    // Waits that pass while the test runs let a few more tries be judged, each wait twice as long as the last.
    expect(statuses.slice(0, 5)).toEqual([401, 401, 401, 401, 401]);
    expect(new Set(statuses)).toEqual(new Set([401, 429]));
    expect(statuses.filter((status) => status === 401).length).toBeLessThan(20);
    await minutesPass(api, 15);
    await tryFrom('192.0.2.61', email, passphrase).expect(200);
  });

  it('is not helped by trying at the same moment', async () => {
    const answers = await Promise.all(
      Array.from({ length: 20 }, () => tryFrom('192.0.2.62', emailOf('auditor'), wrong)),
    );
    expect(answers.filter(({ status }) => status === 401).length).toBeLessThanOrEqual(5);
  });

  it('holds up neither the owner at another desk nor anybody else', async () => {
    for (let n = 0; n < 20; n += 1) await tryFrom('192.0.2.63', emailOf('auditor'), wrong);
    await tryFrom('192.0.2.64', emailOf('auditor'), passphrase).expect(200);
    await tryFrom('192.0.2.63', emailOf('technician'), passphrase).expect(200);
  });

  it('from many desks at one account is slowed as well, but never for more than a quarter of an hour', async () => {
    const email = emailOf('supplier');
    for (let n = 0; n < 45; n += 1) await tryFrom(`198.51.100.${n}`, email, wrong);
    const answer = await tryFrom('198.51.100.200', email, passphrase).expect(429);
    expect(Number(answer.headers['retry-after'])).toBeLessThanOrEqual(15 * 60);
    await minutesPass(api, 15);
    await tryFrom('198.51.100.200', email, passphrase).expect(200);
  });

  it('from one desk at many accounts is slowed as well', async () => {
    const statuses = [];
    for (let n = 0; n < 45; n += 1)
      statuses.push((await tryFrom('192.0.2.70', `guess${n}@quartzhold.test`, wrong)).status);
    expect(statuses.slice(0, 40)).not.toContain(429);
    expect(statuses.slice(40)).toContain(429);
  });

  it('is ended for an account by an administrator', async () => {
    const email = emailOf('technician');
    for (let n = 0; n < 6; n += 1) await tryFrom('192.0.2.71', email, wrong);
    await tryFrom('192.0.2.71', email, passphrase).expect(429);
    const admin = await api.agentFor('administrator');
    await admin.post(`/api/people/${api.people.technician.id}/unlocking`).expect(200);
    await tryFrom('192.0.2.71', email, passphrase).expect(200);
  });
});

describe('stored passwords', () => {
  it('are argon2id hashes with 19 MiB and two passes outside of tests', () => {
    useConfig(testConfig(api.testDatabase.appUrl, { NODE_ENV: 'production' }));
    try {
      expect(passwordCost()).toEqual({
        algorithm: 2,
        memoryCost: 19_456,
        timeCost: 2,
        parallelism: 1,
      });
      expect(isOutdated('$argon2id$v=19$m=19456,t=2,p=1$c2FsdA$aGFzaA')).toBe(false);
      expect(isOutdated('$argon2id$v=19$m=4096,t=3,p=1$c2FsdA$aGFzaA')).toBe(true);
    } finally {
      useConfig(api.config);
    }
  });

  it('are made anew at sign-in when they were made with other parameters', async () => {
    const old = await hash(passphrase, {
      algorithm: 2,
      memoryCost: 2048,
      timeCost: 1,
      parallelism: 1,
    });
    await Person.update({ passwordHash: old }, { where: { id: api.people.quality2.id } });
    await tryFrom('192.0.2.80', emailOf('quality2'), passphrase).expect(200);
    const person = await Person.findByPk(api.people.quality2.id);
    expect(person!.passwordHash).toMatch(/^\$argon2id\$v=19\$m=1024,t=1,p=1\$/);
    await tryFrom('192.0.2.80', emailOf('quality2'), passphrase).expect(200);
  });
});
