import { dateTime } from '@shared/format/dates';
import { inTransaction } from '../../database/connection';
import { record } from '../../history/act';
import { system } from '../../http/actor';
import { Hold, HoldMessage, Lot, Supplier } from '../../models';
import { dueNow } from '../../policies/holds';
import { reminderDue } from './reminder-due';
import { tellHouse, tellSupplier } from './tell';

/**
 * Act `hold.remind` of the product itself, if one is due. The row is locked and judged again, so that two workers never
 * remind twice; a hold another worker has in hand is passed over.
 */
export function remindHold(id: string, now = new Date()): Promise<boolean> {
  return inTransaction(async (transaction) => {
    const hold = await Hold.findByPk(id, {
      transaction,
      lock: transaction.LOCK.UPDATE,
      skipLocked: true,
    });
    const reminder = hold && reminderDue(hold, now);
    if (!hold || !reminder) return false;
    const lot = (await Lot.findByPk(hold.lotId, { transaction }))!;
    const supplier = (await Supplier.findByPk(hold.supplierId, { transaction }))!;
    const due = dateTime(dueNow(hold));
    const what = hold.state === 'open' ? 'acknowledgement' : 'answer';
    const late = reminder.phase === 'overdue';
    const text = late ? `The ${what} was due ${due}.` : `The ${what} is due ${due}.`;
    await hold.update(
      { remindersSent: hold.remindersSent + 1, lastReminderAt: now, version: hold.version + 1 },
      { transaction },
    );
    const message = await HoldMessage.create(
      { holdId: id, kind: 'reminder', side: 'system', text },
      { transaction },
    );
    const context = { hold, lot, supplier };
    const words = {
      subject: `${hold.number}: ${what} ${late ? 'overdue' : 'due soon'}`,
      facts: [
        ['Lot', lot.lotNumber],
        [late ? 'Was due' : 'Due', due],
      ] as [string, string][],
    };
    await tellSupplier(transaction, context, {
      ...words,
      kind: 'hold.reminder',
      paragraphs: [text, hold.reason],
      linkLabel: hold.state === 'open' ? 'Read and acknowledge' : 'Read and answer',
    });
    if (reminder.escalate) {
      await tellHouse(transaction, context, {
        ...words,
        kind: 'hold.escalation',
        paragraphs: [
          `${supplier.name} is late: ${text} They have been reminded; a call may help more than another mail.`,
        ],
        linkLabel: 'Open the hold',
      });
    }
    await record(transaction, system, 'hold.remind', {
      recordType: 'hold',
      recordId: id,
      lotId: hold.lotId,
      after: {
        messageId: message.id,
        about: what,
        phase: reminder.phase,
        escalated: reminder.escalate,
      },
    });
    return true;
  });
}
