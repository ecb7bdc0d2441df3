import { randomUUID } from 'node:crypto';
import { type Transaction } from 'sequelize';
import { bandStripSentence } from '@shared/band-strip/sentence';
import { type BandStripInput } from '@shared/band-strip/types';
import { config } from '../config';
import { Mail, Person } from '../models';
import { headerText, senderDomain } from './header-text';
import { htmlBody } from './html-body';
import { type MailContent, type MailPicture } from './message';
import { bandStripPicture, markPicture } from './pictures';
import { textBody } from './text-body';
import { wakeSender } from './wake';

export interface QueuedMail {
  /** Goes to the address the person has now. */
  personId: string;
  /** Dotted name of the occasion, such as `hold.notice`. */
  kind: string;
  subject: string;
  paragraphs: string[];
  facts?: [label: string, value: string][];
  /** `url` may be a path; the public address is put before it. */
  link?: { label: string; url: string };
  /** One sentence: why this person gets this mail. */
  why: string;
  /** `digest`: may wait for the daily digest of those who chose one. */
  urgency?: 'at_once' | 'digest';
  /** The link is single-use: the text is shown to nobody here and wiped once the mail is accepted. */
  secret?: boolean;
  holdId?: string;
  lotId?: string;
  /** Message-ID this one answers; mails of a hold thread by themselves. */
  inReplyTo?: string;
  strip?: BandStripInput;
}

/**
 * Writes a mail into the outbox in the transaction of the act it tells of: both happen or neither does. The sender
 * picks it up after the commit. Text, pictures and Message-ID are fixed here and never change.
 */
export async function queueMail(transaction: Transaction, mail: QueuedMail): Promise<string> {
  const person = await Person.findByPk(mail.personId, { transaction });
  if (!person) throw new Error('A mail needs a person it goes to.');
  const id = randomUUID();
  const { content, pictures } = compose(mail);
  const waits = mail.urgency === 'digest' && person.mailChoice === 'daily';
  await Mail.create(
    {
      id,
      messageId: `<${id}@${senderDomain(config().MAIL_FROM)}>`,
      inReplyTo: mail.inReplyTo ?? (await threadRoot(transaction, mail)),
      kind: mail.kind,
      urgency: waits ? 'digest' : 'at_once',
      personId: person.id,
      toName: person.name,
      toEmail: person.email,
      subject: content.subject,
      textBody: textBody(content),
      htmlBody: htmlBody(content),
      pictures,
      why: mail.why,
      secret: mail.secret ?? false,
      holdId: mail.holdId ?? null,
      lotId: mail.lotId ?? null,
      // What waits for the digest is due for no try of its own; all else is due from now on by the database's clock.
      ...(waits ? { nextTryAt: null } : {}),
    },
    { transaction },
  );
  transaction.afterCommit(() => wakeSender());
  return id;
}

function compose(mail: QueuedMail): { content: MailContent; pictures: MailPicture[] } {
  const strip = mail.strip ? bandStripPicture(mail.strip) : null;
  const mark = markPicture();
  const content: MailContent = {
    subject: headerText(mail.subject),
    paragraphs: mail.paragraphs,
    facts: mail.facts ?? [],
    link: mail.link ? { label: mail.link.label, url: absolute(mail.link.url) } : null,
    why: mail.why,
    strip: mail.strip ? { sentence: bandStripSentence(mail.strip), cid: strip?.cid ?? null } : null,
    markCid: mark?.cid ?? null,
    choiceUrl: absolute('/account'),
  };
  return { content, pictures: [mark, strip].filter((picture) => picture !== null) };
}

function absolute(url: string): string {
  return url.startsWith('/') ? `${config().PUBLIC_URL}${url}` : url;
}

/** The first mail this person got on the hold: a mailbox can only thread to what lies in it. */
async function threadRoot(transaction: Transaction, mail: QueuedMail): Promise<string | null> {
  if (!mail.holdId) return null;
  const root = await Mail.findOne({
    attributes: ['messageId'],
    where: { holdId: mail.holdId, personId: mail.personId, inReplyTo: null },
    order: [
      ['createdAt', 'ASC'],
      ['id', 'ASC'],
    ],
    transaction,
  });
  return root?.messageId ?? null;
}
