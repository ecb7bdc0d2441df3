import { Op } from 'sequelize';
import { countOf } from '@shared/format/counts';
import { timeOfDay } from '@shared/format/dates';
import { inTransaction } from '../../database/connection';
import { queueMail } from '../../mail/outbox';
import { Mail, Person } from '../../models';

/** A digest comes once a day, whatever calls for it. */
const leastHoursBetween = 20;

/**
 * One mail with everything that waits for the person's digest, never split. The person's row is locked: two workers
 * cannot each take a part. False when there is nothing, or a digest has gone out today already.
 */
export function sendDigest(personId: string, now = new Date()): Promise<boolean> {
  return inTransaction(async (transaction) => {
    const person = await Person.findByPk(personId, {
      transaction,
      lock: transaction.LOCK.UPDATE,
      skipLocked: true,
    });
    if (person?.state !== 'active') return false;
    const lately = await Mail.count({
      where: {
        personId,
        kind: 'digest',
        createdAt: { [Op.gt]: new Date(now.getTime() - leastHoursBetween * 3600 * 1000) },
      },
      transaction,
    });
    if (lately > 0) return false;
    const waiting = await Mail.findAll({
      where: { personId, urgency: 'digest', state: 'queued', digestMailId: null },
      order: [
        ['createdAt', 'ASC'],
        ['id', 'ASC'],
      ],
      transaction,
      lock: transaction.LOCK.UPDATE,
    });
    if (waiting.length === 0) return false;
    const digestMailId = await queueMail(transaction, {
      personId,
      kind: 'digest',
      subject: `${countOf(waiting.length, 'message')} for you`,
      paragraphs: ['This is what happened since your last digest; nothing of it was urgent.'],
      facts: waiting.map((mail) => [timeOfDay(mail.createdAt), mail.subject]),
      link: { label: 'Open my work', url: '/' },
      why: 'You get this mail because you chose a daily digest for what is not urgent.',
    });
    await Mail.update(
      { digestMailId },
      { where: { id: waiting.map(({ id }) => id) }, transaction },
    );
    return true;
  });
}
