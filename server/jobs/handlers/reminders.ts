import { Hold } from '../../models';
import { remindHold } from '../../services/holds/remind-hold';

/** Queue `reminders`, once a minute: one reminder at most for each hold that waits for its supplier. */
export async function handleReminders(now = new Date()): Promise<number> {
  const holds = await Hold.findAll({
    attributes: ['id'],
    where: { state: ['open', 'acknowledged'] },
    order: [['openedAt', 'ASC']],
  });
  let sent = 0;
  for (const { id } of holds) if (await remindHold(id, now)) sent++;
  return sent;
}
