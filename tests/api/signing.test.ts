import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { inTransaction } from '../../server/database/connection';
import { type Actor } from '../../server/http/actor';
import { type Person, HistoryEntry, Signature } from '../../server/models';
import { proveSigner } from '../../server/services/signing/prove-signer';
import { sign, verifySignature } from '../../server/services/signing/sign';
import { passphrase, startApi, type Api } from '../support/api';
import { asOperator, mailsTo, minutesPass } from '../support/outside';

let api: Api;
beforeAll(async () => {
  api = await startApi();
});
afterAll(() => api.close());

function actorOf(person: Person): Actor {
  const { id, name, role, supplierId } = person;
  return { kind: 'person', id, name, role, supplierId, address: '' };
}
const wrong = 'not what I sign with';

describe('proving who signs', () => {
  it('takes the password of the person and nobody else’s', async () => {
    await proveSigner(actorOf(api.people.quality), passphrase);
    await expect(proveSigner(actorOf(api.people.quality), wrong)).rejects.toMatchObject({
      status: 403,
      code: 'signing.wrong_password',
    });
  });

  it('is for people: neither a bench nor the product signs', async () => {
    const bench: Actor = { ...actorOf(api.people.quality), kind: 'bench', role: 'bench' };
    await expect(proveSigner(bench, passphrase)).rejects.toMatchObject({ status: 403 });
  });

  it('locks signing for a quarter of an hour after five wrong passwords, tells the owner and writes it down', async () => {
    const person = api.people.quality2;
    for (let n = 0; n < 4; n += 1)
      await expect(proveSigner(actorOf(person), wrong)).rejects.toMatchObject({ status: 403 });
    await expect(proveSigner(actorOf(person), wrong)).rejects.toMatchObject({
      status: 429,
      code: 'signing.locked',
    });
    await expect(proveSigner(actorOf(person), passphrase)).rejects.toMatchObject({
      code: 'signing.locked',
    });
    expect((await mailsTo(person.email)).map(({ kind }) => kind)).toEqual(['signing_locked']);
    const acts = (
      await HistoryEntry.findAll({ where: { recordId: person.id }, order: ['at'] })
    ).map(({ act }) => act);
    expect(acts).toEqual([...new Array<string>(4).fill('signing.refuse'), 'signing.lock']);
    await minutesPass(api, 15);
    await proveSigner(actorOf(person), passphrase);
  });

  it('counts wrong passwords given at the same moment one by one', async () => {
    const person = api.people.auditor;
    const outcomes = await Promise.allSettled(
      Array.from({ length: 12 }, () => proveSigner(actorOf(person), wrong)),
    );
    const codes = outcomes.map(
      (outcome) => (outcome as PromiseRejectedResult).reason.code as string,
    );
    expect(codes.filter((code) => code === 'signing.wrong_password')).toHaveLength(4);
    expect(codes.filter((code) => code === 'signing.locked')).toHaveLength(8);
  });

  it('begins anew after a right password', async () => {
    const person = api.people.technician;
    for (let n = 0; n < 4; n += 1)
      await expect(proveSigner(actorOf(person), wrong)).rejects.toThrow();
    await proveSigner(actorOf(person), passphrase);
    await expect(proveSigner(actorOf(person), wrong)).rejects.toMatchObject({ status: 403 });
  });

  it('does not stop the person from signing in, and an administrator ends the wait', async () => {
    await api.agentFor('auditor');
    const admin = await api.agentFor('administrator');
    const locked = await admin.get(`/api/people/${api.people.auditor.id}`).expect(200);
    expect(Date.parse(locked.body.lockedUntil)).toBeGreaterThan(Date.now());
    const free = await admin.post(`/api/people/${api.people.auditor.id}/unlocking`).expect(200);
    expect(free.body.lockedUntil).toBeNull();
    await proveSigner(actorOf(api.people.auditor), passphrase);
  });
});

describe('a signature', () => {
  const toSign = (recordId: string) => ({
    actor: actorOf(api.people.quality),
    recordType: 'lot',
    recordId,
    recordVersion: 3,
    meaning: 'acceptance of the lot',
    reason: 'all units inside',
    content: { zeta: 1, alpha: ['x', null], nested: { b: 2.5, a: 'µ' } },
  });
  const put = (recordId = randomUUID(), changes = {}) =>
    inTransaction((transaction) => sign(transaction, { ...toSign(recordId), ...changes }));

  it('holds printed name, role, time of the server, zone, meaning, reason and what the signer saw', async () => {
    const before = Date.now();
    const made = await put(undefined, {
      actor: { ...actorOf(api.people.quality), name: 'Somebody Else', role: 'auditor' },
    });
    const stored = (await Signature.findByPk(made.id))!;
    expect(stored).toMatchObject({
      personId: api.people.quality.id,
      printedName: api.people.quality.name,
      role: 'quality_engineer',
      meaning: 'acceptance of the lot',
      reason: 'all units inside',
      contentText: '{"alpha":["x",null],"nested":{"a":"µ","b":2.5},"zeta":1}',
      zone: Intl.DateTimeFormat().resolvedOptions().timeZone,
    });
    expect(stored.signedAt.getTime()).toBeGreaterThanOrEqual(before);
    expect(verifySignature(stored)).toBe(true);
  });

  it.each([
    ['another record', { recordId: randomUUID() }],
    ['another version', { recordVersion: 4 }],
    ['another kind of record', { recordType: 'hold' }],
    ['another person', { personId: randomUUID() }],
    ['another name', { printedName: 'Quirina Quality' }],
    ['another role', { role: 'auditor' }],
    ['another meaning', { meaning: 'rejection of the lot' }],
    ['another reason', { reason: 'all units inside.' }],
    ['another time', { signedAt: new Date(0) }],
    ['another zone', { zone: 'Pacific/Auckland' }],
    ['other content', { contentText: '{"alpha":["x",null],"nested":{"a":"µ","b":2.4},"zeta":1}' }],
    [
      'the same content written otherwise',
      { contentText: '{"zeta":1,"alpha":["x",null],"nested":{"a":"µ","b":2.5}}' },
    ],
  ])('does not hold for %s', async (_what, changes) => {
    const made = await put();
    const copy = { ...(made.get({ plain: true }) as Signature), ...changes };
    expect(verifySignature(copy as Signature)).toBe(false);
  });

  it('is given once by one person for one version and meaning', async () => {
    const recordId = randomUUID();
    await put(recordId);
    await expect(put(recordId)).rejects.toMatchObject({ status: 409, code: 'signature.exists' });
    await put(recordId, { recordVersion: 4 });
  });

  it('is not given by somebody who is disabled', async () => {
    await asOperator(api, `UPDATE people SET state = 'disabled' WHERE id = $1`, [
      api.people.supplier2.id,
    ]);
    await expect(put(undefined, { actor: actorOf(api.people.supplier2) })).rejects.toMatchObject({
      status: 403,
    });
  });

  it('cannot be changed or deleted by the application', async () => {
    const { id } = await put();
    for (const statement of [
      `UPDATE signatures SET reason = 'other' WHERE id = '${id}'`,
      `DELETE FROM signatures WHERE id = '${id}'`,
      'TRUNCATE signatures CASCADE',
    ])
      await expect(api.database.pool.query(statement)).rejects.toThrow(/permission denied/);
  });
});
