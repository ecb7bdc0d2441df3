import { act } from '../../history/act';
import { type Actor } from '../../http/actor';
import { NotFound } from '../../http/errors';
import { Person } from '../../models';

/** Act `preference.mail`: at once, or a daily digest of what is not urgent. */
export function setMailChoice(actor: Actor, mailChoice: 'at_once' | 'daily'): Promise<void> {
  return act(actor, 'preference.mail', async (transaction) => {
    const person = await Person.findByPk(actor.id, { transaction });
    if (!person) throw new NotFound('This person');
    const before = { mailChoice: person.mailChoice };
    await person.update({ mailChoice }, { transaction });
    return {
      result: undefined,
      entry: { recordType: 'person', recordId: person.id, before, after: { mailChoice } },
    };
  });
}
