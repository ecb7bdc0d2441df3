import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { inTransaction } from '../../../server/database/connection';
import { handleDigest } from '../../../server/jobs/handlers/digest';
import { startMailFake, type MailFake } from '../../../server/mail/fake';
import { queueMail } from '../../../server/mail/outbox';
import { sendDueMails } from '../../../server/mail/send-due';
import { Mail } from '../../../server/models';
import { startApi, type Api } from '../../support/api';

describe('the daily digest', () => {
  let fake: MailFake;
  let api: Api;
  beforeAll(async () => {
    fake = await startMailFake();
    api = await startApi({ SMTP_URL: fake.smtpUrl });
    for (const person of [api.people.quality, api.people.quality2])
      await person.update({ mailChoice: 'daily' });
  });
  afterAll(async () => {
    await api?.close();
    await fake?.stop();
  });

  const queue = (personId: string, subject: string) =>
    inTransaction((transaction) =>
      queueMail(transaction, {
        personId,
        kind: 'test',
        subject,
        paragraphs: ['x'],
        why: 'Because.',
        urgency: 'digest',
      }),
    );

  it('is one mail for each person with all that waits, never split, once a day', async () => {
    const { quality, quality2 } = api.people;
    const parts = [await queue(quality.id, 'One'), await queue(quality.id, 'Two')];
    await queue(quality2.id, 'Three');
    await sendDueMails();
    expect(fake.letters()).toEqual([]);
    await Promise.all([handleDigest(), handleDigest(), handleDigest()]);
    await sendDueMails();
    const letters = fake.letters();
    expect(letters.map(({ to }) => to[0]).sort()).toEqual([quality.email, quality2.email].sort());
    const own = letters.find(({ to }) => to[0] === quality.email)!;
    expect(own.subject).toBe('2 messages for you');
    expect(own.text).toMatch(/One[\s\S]*Two/);
    expect(own.text).not.toContain('Three');
    for (const id of parts) expect((await Mail.findByPk(id))!.state).toBe('accepted');

    await queue(quality.id, 'Four');
    expect(await handleDigest()).toBe(0);
    expect(await handleDigest(new Date(Date.now() + 24 * 3600 * 1000))).toBe(1);
    await sendDueMails();
    expect(fake.letters()[0]!.text).toContain('Four');
  });
});
