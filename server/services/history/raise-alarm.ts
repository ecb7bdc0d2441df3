import { act } from '../../history/act';
import { system } from '../../http/actor';
import { queueMail } from '../../mail/outbox';
import { Person } from '../../models';

/** Act `history.alarm`: the nightly check found something that was changed behind the product's back; auditors and administrators are told. */
export function raiseAlarm(faults: string[]): Promise<void> {
  return act(system, 'history.alarm', async (transaction) => {
    const people = await Person.findAll({
      where: { role: ['auditor', 'administrator'], state: 'active' },
      order: ['email'],
      transaction,
    });
    for (const person of people) {
      await queueMail(transaction, {
        personId: person.id,
        kind: 'history.alarm',
        subject: 'The history no longer holds together',
        paragraphs: [
          'The nightly check of the signed history found what must not be:',
          ...faults.slice(0, 10),
          'Records were changed in the database, past the product. Keep the database as it is, keep its backups and the checkpoint files, and find out who had access.',
        ],
        link: { label: 'Check the history now', url: '/history' },
        why: `You get this because you are ${person.role === 'auditor' ? 'an auditor' : 'an administrator'} of this product.`,
        urgency: 'at_once',
      });
    }
    return {
      result: undefined,
      entry: { recordType: 'history', recordId: 'chain', after: { faults, told: people.length } },
    };
  });
}
