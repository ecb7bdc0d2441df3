import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { inTransaction } from '../../../server/database/connection';
import { startMailSender } from '../../../server/jobs/handlers/mail';
import { greatestTries, greatestUncertainTries } from '../../../server/mail/backoff';
import { claimDueMail, freeAbandonedMails } from '../../../server/mail/claim';
import { startMailFake, type MailFake } from '../../../server/mail/fake';
import { queueMail, type QueuedMail } from '../../../server/mail/outbox';
import { recordTry } from '../../../server/mail/record-try';
import { sendDueMails } from '../../../server/mail/send-due';
import { HistoryEntry, Mail } from '../../../server/models';
import { useConfig } from '../../../server/config';
import { startApi, type Agent, type Api } from '../../support/api';
import { strip } from '../../support/held-lot';

describe('sending', () => {
  let fake: MailFake;
  let api: Api;
  let admin: Agent;
  beforeAll(async () => {
    fake = await startMailFake();
    api = await startApi({ SMTP_URL: fake.smtpUrl });
    admin = await api.agentFor('admin');
  });
  afterEach(async () => {
    fake.setBehaviour({ mode: 'accept' });
    fake.clear();
    await Mail.update(
      { state: 'dead', nextTryAt: null, leaseToken: null, leaseUntil: null },
      { where: {} },
    );
  });
  afterAll(async () => {
    await api?.close();
    await fake?.stop();
  });

  const queue = (changes: Partial<QueuedMail> = {}) =>
    inTransaction((transaction) =>
      queueMail(transaction, {
        personId: api.people.quality.id,
        kind: 'test',
        subject: 'A word',
        paragraphs: ['First.'],
        why: 'Because.',
        ...changes,
      }),
    );
  const read = async (id: string) => (await Mail.findByPk(id))!;
  /** As if the wait were over. */
  const dueNow = (id: string) => Mail.update({ nextTryAt: new Date(0) }, { where: { id } });
  const tryUntilOver = async (id: string, atMost = 30) => {
    for (let round = 0; round < atMost; round++) {
      await dueNow(id);
      await sendDueMails();
      const { state } = await read(id);
      if (state === 'accepted' || state === 'dead') return;
      await Mail.update({ nextTryAt: new Date(0) }, { where: { id, state: 'refused' } });
    }
    throw new Error('The tries did not end.');
  };

  it('hands the mail over as it was written, with the picture inside', async () => {
    const id = await queue({
      strip,
      link: { label: 'Open', url: '/holds/1' },
      inReplyTo: '<root@quartzhold.test>',
    });
    await sendDueMails();
    const row = await read(id);
    expect(row).toMatchObject({ state: 'accepted', tries: 1, leaseToken: null });
    expect(row.lastAnswer).toContain('250');
    const [letter] = fake.letters();
    expect(letter).toMatchObject({
      subject: 'A word',
      messageId: row.messageId,
      inReplyTo: '<root@quartzhold.test>',
      references: '<root@quartzhold.test>',
      to: ['quality@quartzhold.test'],
      from: 'no-reply@quartzhold.test',
    });
    expect(letter!.text).toContain('http://quartzhold.test/holds/1');
    const picture = row.pictures.find(({ cid }) => cid.startsWith('band-strip'))!;
    expect(letter!.html).toContain(`cid:${picture.cid}`);
    expect(letter!.pictures.find(({ cid }) => cid === picture.cid)!.base64).toBe(picture.base64);
  });

  it('lets no typed line break, list or name into headers or envelope', async () => {
    await api.people.quality.update({ name: 'Eve\r\nBcc: eve@example.com' });
    const id = await queue({ subject: 'Hi\r\nBcc: eve@example.com\r\n\r\nBody' });
    await sendDueMails();
    const [letter] = fake.letters();
    expect(letter!.to).toEqual(['quality@quartzhold.test']);
    expect(letter!.headers.map(({ key }) => key)).not.toContain('bcc');
    expect(letter!.headers.find(({ key }) => key === 'to')!.value).toBe('quality@quartzhold.test');
    expect((await read(id)).state).toBe('accepted');
    await api.people.quality.update({ name: 'Quentin Quality' });

    const list = await queue();
    await Mail.update({ toEmail: 'a@example.com, b@example.com' }, { where: { id: list } });
    fake.clear();
    await sendDueMails();
    expect(fake.letters()).toEqual([]);
    expect((await read(list)).lastAnswer).toContain('not a single e-mail address');
  });

  it('tries again later after a refusal for now, with the answer kept', async () => {
    fake.setBehaviour({ mode: 'refuse_for_now', times: 2 });
    const id = await queue();
    await sendDueMails();
    const refused = await read(id);
    expect(refused).toMatchObject({ state: 'refused', tries: 1 });
    expect(refused.lastAnswer).toContain('451');
    expect(refused.nextTryAt!.getTime()).toBeGreaterThan(Date.now() + 10_000);
    expect(await sendDueMails()).toBe(0);
    await tryUntilOver(id);
    const sent = await read(id);
    expect(sent.state).toBe('accepted');
    expect(sent.attempts.map(({ accepted }) => accepted)).toEqual([false, false, true]);
    expect(fake.letters()).toHaveLength(1);
  });

  it('gives up at once when the server says never, and shows its words', async () => {
    fake.setBehaviour({ mode: 'refuse_for_good' });
    const id = await queue();
    await sendDueMails();
    expect(await read(id)).toMatchObject({ state: 'dead', tries: 1, nextTryAt: null });
    const { body } = await admin.get('/api/mail?state=dead').expect(200);
    const row = body.items.find((item: { id: string }) => item.id === id);
    expect(row.lastAnswer).toContain('550');
    expect(row.lastAnswer).toContain('no such mailbox');
  });

  it('ends after the last try when the server never answers the door', async () => {
    useConfig({ ...api.config, SMTP_URL: 'smtp://127.0.0.1:1' });
    const id = await queue();
    await tryUntilOver(id);
    useConfig(api.config);
    const row = await read(id);
    expect(row).toMatchObject({ state: 'dead', tries: greatestTries });
    expect(row.attempts).toHaveLength(greatestTries);
    await dueNow(id);
    expect(await sendDueMails()).toBe(0);
  });

  it('makes no more doubles than its bound when answers get lost', async () => {
    fake.setBehaviour({ mode: 'drop_after' });
    const id = await queue();
    await tryUntilOver(id);
    const row = await read(id);
    expect(row).toMatchObject({ state: 'dead', uncertainTries: greatestUncertainTries });
    const ids = fake.letters().map(({ messageId }) => messageId);
    expect(ids).toEqual(Array(greatestUncertainTries).fill(row.messageId));
  });

  it('treats a connection lost before the content as harmless', async () => {
    fake.setBehaviour({ mode: 'drop_before', times: greatestUncertainTries + 1 });
    const id = await queue();
    await tryUntilOver(id);
    expect(await read(id)).toMatchObject({ state: 'accepted', uncertainTries: 0 });
    expect(fake.letters()).toHaveLength(1);
  });

  it('hands nothing to a server with a certificate nobody trusts', async () => {
    fake.setBehaviour({ mode: 'broken_tls' });
    const id = await queue();
    await sendDueMails();
    expect(await read(id)).toMatchObject({ state: 'refused', uncertainTries: 0 });
    expect((await read(id)).lastAnswer).toMatch(/certificate/i);
    expect(fake.letters()).toEqual([]);
  });

  it('does not wait for ever for a greeting, nor hold up the others', async () => {
    fake.setBehaviour({ mode: 'hang', times: 1 });
    const ids = await Promise.all([queue(), queue(), queue()]);
    await sendDueMails();
    const states = (await Promise.all(ids.map(read))).map(({ state }) => state).sort();
    expect(states).toEqual(['accepted', 'accepted', 'refused']);
  });

  it('sends each mail once when several senders work at the same time', async () => {
    await Promise.all(Array.from({ length: 12 }, (_, n) => queue({ subject: `Number ${n}` })));
    await Promise.all([sendDueMails(), sendDueMails(), sendDueMails()]);
    const subjects = fake.letters().map(({ subject }) => subject);
    expect(subjects).toHaveLength(12);
    expect(new Set(subjects).size).toBe(12);
  });

  it('frees a mail whose sender died, counts the try as uncertain, and refuses the late word of the dead', async () => {
    const id = await queue();
    const claimed = (await claimDueMail())!;
    expect(claimed.id).toBe(id);
    expect(await claimDueMail()).toBeNull();
    await Mail.update({ leaseUntil: new Date(0) }, { where: { id } });
    await freeAbandonedMails();
    expect(await read(id)).toMatchObject({ state: 'refused', uncertainTries: 1, leaseToken: null });
    expect(await recordTry(claimed, { kind: 'accepted', answer: '250 late' })).toBe(false);
    expect((await read(id)).state).toBe('refused');
    for (let round = 1; round < greatestUncertainTries; round++) {
      await claimDueMail();
      await Mail.update({ leaseUntil: new Date(0) }, { where: { id } });
      await freeAbandonedMails();
    }
    expect((await read(id)).state).toBe('dead');
  });

  it('goes out by itself soon after the commit', async () => {
    const stop = startMailSender();
    try {
      await queue({ subject: 'By itself' });
      await expect.poll(() => fake.letters().length, { timeout: 15_000 }).toBe(1);
    } finally {
      await stop();
    }
  });

  describe('again', () => {
    it('sends even what was accepted, as an act, with the same Message-ID', async () => {
      const id = await queue();
      await sendDueMails();
      const { body } = await admin.post(`/api/mail/${id}/resending`).send({}).expect(200);
      expect(body).toMatchObject({ state: 'queued', tries: 1 });
      await sendDueMails();
      const again = (await admin.get(`/api/mail/${id}`).expect(200)).body;
      expect(again).toMatchObject({ state: 'accepted', tries: 2 });
      expect(again.attempts).toHaveLength(2);
      expect(new Set(fake.letters().map(({ messageId }) => messageId)).size).toBe(1);
      expect(fake.letters()).toHaveLength(2);
      const entries = await HistoryEntry.findAll({ where: { recordType: 'mail', recordId: id } });
      expect(entries.map((entry) => entry.act)).toEqual(['mail.resend']);
    });

    it('revives a dead letter', async () => {
      fake.setBehaviour({ mode: 'refuse_for_good', times: 1 });
      const id = await queue();
      await sendDueMails();
      const quality = await api.agentFor('quality');
      await quality.post(`/api/mail/${id}/resending`).send({}).expect(200);
      await sendDueMails();
      expect((await read(id)).state).toBe('accepted');
    });

    it('is refused for what is being sent, to the auditor, and for what is not there', async () => {
      const id = await queue();
      await claimDueMail();
      const { body } = await admin.post(`/api/mail/${id}/resending`).send({}).expect(409);
      expect(body.error.code).toBe('mail.being_sent');
      const auditor = await api.agentFor('auditor');
      await auditor.post(`/api/mail/${id}/resending`).send({}).expect(403);
      await admin
        .post('/api/mail/00000000-0000-4000-8000-000000000000/resending')
        .send({})
        .expect(404);
    });
  });

  describe('a single-use link', () => {
    it('is shown by no page, wiped once sent, and then cannot be sent again', async () => {
      const secret = 'http://quartzhold.test/link/abcdefghijklmnop';
      const id = await queue({ secret: true, link: { label: 'Set a password', url: secret } });
      const seen = await admin.get(`/api/mail/${id}`).expect(200);
      expect(seen.text).not.toContain('abcdefghijklmnop');
      await sendDueMails();
      expect(fake.letters()[0]!.text).toContain(secret);
      const row = await read(id);
      expect(row.textBody + row.htmlBody + JSON.stringify(row.attempts)).not.toContain(
        'abcdefghijklmnop',
      );
      const { body } = await admin.post(`/api/mail/${id}/resending`).send({}).expect(409);
      expect(body.error.code).toBe('mail.wiped');
    });
  });

  it('is listed newest first, in pages, found by text that is no pattern', async () => {
    for (let n = 0; n < 5; n++) await queue({ subject: `Page ${n}%` });
    const all: { subject: string }[] = [];
    let after = '';
    do {
      const { body } = await admin
        .get(`/api/mail?limit=2&find=${encodeURIComponent('%')}${after && `&after=${after}`}`)
        .expect(200);
      all.push(...body.items);
      after = body.next ?? '';
    } while (after);
    expect(all.map(({ subject }) => subject)).toEqual([4, 3, 2, 1, 0].map((n) => `Page ${n}%`));
  });
});
