import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { inTransaction } from '../../../server/database/connection';
import { atMinute } from '../../../server/jobs/handlers/clock';
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

  it('comes in the morning, and a worker that was down then makes up for it', async () => {
    const { quality } = api.people;
    const in3Days = (hour: number) => {
      const day = new Date(Date.now() + 3 * 24 * 3600 * 1000);
      day.setUTCHours(hour, 0, 0, 0);
      return day;
    };
    const id = await queue(quality.id, 'Five');
    const told = async () => (await Mail.findByPk(id))!.digestMailId !== null;
    await atMinute(in3Days(5));
    expect(await told()).toBe(false);
    await atMinute(in3Days(13));
    expect(await told()).toBe(false);
    await atMinute(in3Days(11));
    expect(await told()).toBe(true);
  });
});
