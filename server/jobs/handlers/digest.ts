import { Mail } from '../../models';
import { sendDigest } from '../../services/mail/send-digest';

/** Queue `digest`, once a day: one digest for each person something waits for. */
export async function handleDigest(now = new Date()): Promise<number> {
  const waiting = await Mail.findAll({
    attributes: ['personId'],
    where: { urgency: 'digest', state: 'queued', digestMailId: null },
    group: ['personId'],
  });
  let sent = 0;
  for (const { personId } of waiting) if (await sendDigest(personId, now)) sent++;
  return sent;
}
