import { dateTime } from '@shared/format/dates';
import { act } from '../../history/act';
import { type Actor } from '../../http/actor';
import { HoldMessage } from '../../models';
import { mayAcknowledge } from '../../policies/holds';
import { lockHold, refuse } from './find-hold';
import { tellHouse } from './tell';

/** Act `hold.acknowledge`: the supplier has read the notice; reminders start anew for the answer. */
export function acknowledgeHold(actor: Actor, id: string, note: string): Promise<void> {
  return act(actor, 'hold.acknowledge', async (transaction) => {
    const context = await lockHold(transaction, actor, id);
    const { hold, lot, supplier } = context;
    if (!mayAcknowledge(actor, hold)) refuse(hold, 'acknowledge');
    const before = { state: hold.state };
    const acknowledgedAt = new Date();
    await hold.update(
      {
        state: 'acknowledged',
        acknowledgedAt,
        remindersSent: 0,
        lastReminderAt: null,
        version: hold.version + 1,
      },
      { transaction },
    );
    const message = await HoldMessage.create(
      { holdId: id, kind: 'acknowledgement', authorId: actor.id, side: 'supplier', text: note },
      { transaction },
    );
    await tellHouse(transaction, context, {
      kind: 'hold.acknowledged',
      subject: `${hold.number}: acknowledged`,
      paragraphs: [`${supplier.name} has acknowledged the notice.`, ...(note ? [note] : [])],
      facts: [
        ['Lot', lot.lotNumber],
        ['By', actor.name],
        ['Answer due', dateTime(hold.answerDueAt)],
      ],
      urgency: 'digest',
      linkLabel: 'Open the hold',
    });
    return {
      result: undefined,
      entry: {
        recordType: 'hold',
        recordId: id,
        lotId: lot.id,
        before,
        after: { state: 'acknowledged', messageId: message.id, note },
      },
    };
  });
}
