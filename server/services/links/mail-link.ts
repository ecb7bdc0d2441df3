import { type Transaction } from 'sequelize';
import { queueMail } from '../../mail/outbox';
import { type Person } from '../../models';
import { issueLink, linkHours } from './issue-link';

const roleWords = {
  technician: 'a line technician',
  quality_engineer: 'a quality engineer',
  supplier_contact: 'a supplier contact',
  auditor: 'an auditor',
  administrator: 'an administrator',
} as const;

/** Issues the link that fits the person's state and queues the mail that carries it; nobody else ever sees it. */
export async function mailLink(
  transaction: Transaction,
  person: Person,
  asked: 'by an administrator' | 'by somebody on the sign-in page',
): Promise<'invitation' | 'reset'> {
  const purpose = person.state === 'invited' ? 'invitation' : 'reset';
  const { url, link } = await issueLink(transaction, purpose, person.id);
  const hours = linkHours[purpose];
  const mailId = await queueMail(transaction, {
    personId: person.id,
    kind: `account.${purpose}`,
    secret: true,
    urgency: 'at_once',
    ...(purpose === 'invitation'
      ? {
          subject: 'Your invitation to Quartzhold',
          paragraphs: [
            `You are invited to Quartzhold as ${roleWords[person.role]}. Choose a password of 15 characters or more to begin; a sentence works well.`,
            `The link works once, within ${hours} hours. After that your administrator can send another.`,
          ],
          link: { label: 'Choose a password', url },
          why: 'You get this because an administrator entered your address.',
        }
      : {
          subject: 'Choose a new password',
          paragraphs: [
            `A new password for your Quartzhold account was asked for ${asked}.`,
            `The link works once, within ${hours === 1 ? 'one hour' : `${hours} hours`}. Your present password stays until you use it. If you did not ask, you need do nothing.`,
          ],
          link: { label: 'Choose a new password', url },
          why: 'You get this because it is your account.',
        }),
  });
  await link.update({ mailId }, { transaction });
  return purpose;
}
