import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { bandStripSentence } from '../../../shared/band-strip/sentence';
import { act } from '../../../server/history/act';
import { queueMail, type QueuedMail } from '../../../server/mail/outbox';
import { Mail } from '../../../server/models';
import { inTransaction } from '../../../server/database/connection';
import { startApi, type Api } from '../../support/api';
import { actorFor, heldLot, strip } from '../../support/held-lot';

describe('the outbox', () => {
  let api: Api;
  beforeAll(async () => {
    api = await startApi();
  });
  afterAll(() => api?.close());

  const mail = (changes: Partial<QueuedMail> = {}): QueuedMail => ({
    personId: api.people.quality.id,
    kind: 'test',
    subject: 'A word',
    paragraphs: ['First.', 'Second.'],
    why: 'You get this mail because a test asks for it.',
    ...changes,
  });
  const queue = (changes: Partial<QueuedMail> = {}) =>
    inTransaction((transaction) => queueMail(transaction, mail(changes))).then((id) =>
      Mail.findByPk(id).then((row) => row!),
    );

  it('keeps no mail of an act that fails', async () => {
    const before = await Mail.count();
    await expect(
      act(actorFor(api.people.quality), 'test.fail', async (transaction) => {
        await queueMail(transaction, mail());
        throw new Error('The act fails after its mail.');
      }),
    ).rejects.toThrow('The act fails');
    expect(await Mail.count()).toBe(before);
  });

  it('fixes the Message-ID from the id and the sender’s domain', async () => {
    const row = await queue();
    expect(row.messageId).toBe(`<${row.id}@quartzhold.test>`);
    expect(row).toMatchObject({
      state: 'queued',
      tries: 0,
      toEmail: 'quality@quartzhold.test',
      inReplyTo: null,
    });
    expect(row.nextTryAt).not.toBeNull();
  });

  it('says the same in plain text and in HTML: words, facts, link, why, and how to choose', async () => {
    const row = await queue({
      facts: [['Lot', 'L-1']],
      link: { label: 'Open it', url: '/holds/1' },
      strip,
    });
    for (const body of [row.textBody, row.htmlBody]) {
      for (const words of [
        'A word',
        'First.',
        'Second.',
        'L-1',
        'Open it',
        'http://quartzhold.test/holds/1',
        bandStripSentence(strip),
        'because a test asks for it',
        'http://quartzhold.test/account',
      ])
        expect(body).toContain(words);
    }
    const picture = row.pictures.find(({ cid }) => cid.startsWith('band-strip'))!;
    expect(row.htmlBody).toContain(`cid:${picture.cid}`);
    const bytes = Buffer.from(picture.base64, 'base64');
    expect(bytes.toString('latin1', 1, 4)).toBe('PNG');
    expect(bytes.readUInt32BE(16)).toBe(1120);
  });

  it('keeps what people typed as text in HTML and out of the header lines', async () => {
    const row = await queue({
      subject: 'Hello\r\nBcc: all@example.com\u2028\u202E<b>',
      paragraphs: ['<script>alert(1)</script>\nnext line'],
      facts: [['Lot', '"><img src=x>']],
    });
    expect(row.subject).toBe('Hello Bcc: all@example.com <b>');
    expect(row.htmlBody).not.toContain('<script>');
    expect(row.htmlBody).not.toContain('<img src=x');
    expect(row.htmlBody).toContain('<br>next line');
  });

  it('lets only what is not urgent wait for those who chose a daily digest', async () => {
    const { quality } = api.people;
    expect((await queue({ urgency: 'digest' })).urgency).toBe('at_once');
    await quality.update({ mailChoice: 'daily' });
    try {
      expect(await queue({ urgency: 'digest' })).toMatchObject({
        urgency: 'digest',
        nextTryAt: null,
      });
      expect(await queue()).toMatchObject({ urgency: 'at_once' });
    } finally {
      await quality.update({ mailChoice: 'at_once' });
    }
  });

  it('threads the mails of a hold to the first one its reader got', async () => {
    const { hold } = await heldLot(api);
    const notice = (await Mail.findOne({ where: { holdId: hold.id, kind: 'hold.notice' } }))!;
    expect(notice.inReplyTo).toBeNull();
    const next = await queue({ personId: api.people.supplier.id, holdId: hold.id });
    const third = await queue({ personId: api.people.supplier.id, holdId: hold.id });
    expect([next.inReplyTo, third.inReplyTo]).toEqual([notice.messageId, notice.messageId]);
    // Somebody who never got the notice starts a thread of the own mailbox.
    expect((await queue({ holdId: hold.id })).inReplyTo).toBeNull();
  });
});
